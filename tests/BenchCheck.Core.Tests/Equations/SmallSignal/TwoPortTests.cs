using BenchCheck.Core.Boards;
using BenchCheck.Core.Equations;
using BenchCheck.Core.Quantities;
using CsCheck;
using Xunit;

namespace BenchCheck.Core.Tests.Equations.SmallSignal;

/// <summary>Identities of two-ports, put together from readings: Desoer and Kuh, Basic Circuit Theory (1969), chapter 17, from memory.</summary>
/// <remarks>A port is shorted by a dead supply, whose current is then read.</remarks>
public class TwoPortTests
{
    [Fact]
    public void Chain_parameters_of_resistor_networks_have_determinant_one() =>
        Gen.Int[0, 1_000_000].Sample(seed =>
        {
            var (board, one, two) = Ports(LinearBoards.Resistors(seed), seed);
            var (open, shorted) = (new SignalBoard(board, drive: new Drive(one, "0", 1, 50)), new SignalBoard(Shorted(board, two), drive: new Drive(one, "0", 1, 50)));
            var gain = open.Gain(two, one);
            // Ports that see nothing of one another have no chain parameters.
            if (gain < 1e-9) return;
            var back = shorted.CurrentGain("VS.plus");
            var (a, c, d) = (1 / gain, 1 / (gain * open.InputOhms(one)), 1 / back);
            var b = shorted.InputOhms(one) / back;
            Assert.True(Math.Abs(a * d - b * c - 1) <= 1e-8 * (1 + Math.Abs(a * d)), $"seed {seed}: AD {a * d}, BC {b * c}");
        }, iter: 400);

    [Fact]
    public void Transfer_impedances_of_networks_without_sources_are_the_same_both_ways() =>
        Gen.Select(Gen.Int[0, 1_000_000], Gen.Double[1, 6]).Sample((seed, decade) =>
        {
            foreach (var hertz in new double?[] { null, Math.Pow(10, decade) })
            {
                var (board, one, two) = Ports(LinearBoards.Reactive(seed), seed);
                var read = new SignalBoard(board, hertz: hertz);
                var (forward, backward) = (Math.Abs(read.Gain(two, one)) * read.InputOhms(one), Math.Abs(read.Gain(one, two)) * read.InputOhms(two));
                var size = read.InputOhms(one) + read.InputOhms(two);
                Assert.True(Math.Abs(forward - backward) <= 1e-9 * size, $"seed {seed}, {hertz} Hz: {forward} Ω, {backward} Ω");
            }
        }, iter: 300);

    /// <summary>h11 = z11 − z12 z21 / z22, h12 = z12 / z22, h21 = −z21 / z22, h22 = 1 / z22, reciprocal or not.</summary>
    [Fact]
    public void Hybrid_parameters_read_directly_are_those_that_follow_from_the_open_circuit_ones() =>
        Gen.Int[0, 1_000_000].Sample(seed =>
        {
            var random = new Random(seed);
            double Draw(double low, double high) => low * Math.Pow(high / low, random.NextDouble());
            var q = new Transistor(Transistor.Npn, "Q1", ["C", "B", "E"], Nominal.Exactly(Draw(30, 600)), Nominal.Exactly(0.65), Nominal.Exactly(0.1)) { OutputOhms = Nominal.Exactly(Draw(5e3, 200e3)) };
            var board = new BoardSketch().Supply("V1", "VCC", 12).Resistor("RB", "VCC", "B", Draw(500e3, 1e6)).Resistor("RC", "VCC", "C", Draw(300, 1e3)).Resistor("RE", "E", "0", Draw(1, 300))
                .Resistor("RF", "C", "X", Draw(10e3, 1e6)).Capacitor("CF", "X", "B", 1e-6).Add(q).Capacitor("C1", "IN", "B", 1e-6).Capacitor("C2", "C", "OUT", 1e-6).Board;
            var open = new SignalBoard(board);
            var (z11, z22) = (open.InputOhms("IN"), open.InputOhms("OUT"));
            var (z21, z12) = (open.Gain("OUT", "IN") * z11, open.Gain("IN", "OUT") * z22);
            var shorted = new SignalBoard(Shorted(board, "OUT"), drive: new Drive("IN", "0", 1, 50));
            Assert.Equal(z11 - z12 * z21 / z22, shorted.InputOhms("IN"), 1e-7 * z11);
            Assert.Equal(z21 / z22, shorted.CurrentGain("VS.plus"), 1e-7 * Math.Abs(z21 / z22));
            Assert.Equal(z12 / z22, open.Gain("IN", "OUT"), 1e-9);
        }, iter: 100);

    [Fact]
    public void Hybrid_parameters_of_a_transistor_alone_are_its_gain_and_its_two_resistances()
    {
        // h_fe = β, h_ie = β V_T / I_C, h_oe = 1/r_o, h_re = 0 in this model (Boylestad and Nashelsky 10e, 5.19, from memory).
        var q = new Transistor(Transistor.Npn, "Q1", ["C", "B", "0"], Nominal.Exactly(180), Nominal.Exactly(0.7), Nominal.Exactly(0.2)) { OutputOhms = Nominal.Exactly(47e3) };
        var board = new BoardSketch().Supply("V1", "VCC", 10).Current("I1", "B", "VCC", 5e-6).Resistor("R1", "VCC", "C", 5e3).Add(q).Capacitor("C1", "C", "OUT", 1e-3)
            .Resistor("R2", "OUT", "0", 1e9).Board;
        Assert.Equal(0.026 / 5e-6, new SignalBoard(Shorted(board, "OUT")).InputOhms("B"), 0.01);
        Assert.Equal(180, new SignalBoard(Shorted(board, "OUT"), drive: new Drive("B", "0", null, 0)).CurrentGain("Q1.collector", "Q1.base"), 1e-6);
        Assert.Equal(1 / (1 / 47e3 + 1 / 5e3 + 1e-9), new SignalBoard(board).OutputOhms("C"), 1e-3);
        Assert.Equal(0, new SignalBoard(board).Gain("B", "C"), 1e-9);
    }

    /// <summary>Thevenin and Norton: the open voltage over the short-circuit current is the resistance looking in, whatever linear network it is.</summary>
    [Fact]
    public void Open_voltage_over_short_circuit_current_is_the_resistance_looking_in() =>
        Gen.Select(Gen.Int[0, 1_000_000], Gen.Double[1, 6]).Sample((seed, decade) =>
        {
            var (board, one, two) = Ports(LinearBoards.ReactiveWithControlledSources(seed), seed);
            var drive = new Drive(one, "0", 1, 600);
            var hertz = Math.Pow(10, decade);
            double volts, amperes, ohms;
            try
            {
                (volts, ohms) = (new SignalBoard(board, hertz: hertz, drive: drive).Volts(two), new SignalBoard(board, hertz: hertz, drive: drive).OutputOhms(two));
                amperes = new SignalBoard(Shorted(board, two), hertz: hertz, drive: drive).Amperes("VS");
            }
            catch (NoOperatingStateException)
            {
                // a controlled source can make a board singular; a supply already sets the output
                return;
            }

            if (ohms < 1e-3 || volts < 1e-6 || amperes < 1e-12) return;
            Assert.True(Math.Abs(volts / amperes - ohms) <= 1e-6 * ohms, $"seed {seed}: {volts} V / {amperes} A, {ohms} Ω");
        }, iter: 300);

    [Fact]
    public void Thevenin_and_Norton_hold_for_a_transistor_stage_too()
    {
        var sketch = new BoardSketch().Supply("V1", "VCC", 12).Resistor("R1", "VCC", "B", 47e3).Resistor("R2", "B", "0", 10e3).Resistor("RC", "VCC", "C", 3.3e3).Resistor("RE", "E", "0", 1e3)
            .Npn("Q1", "C", "B", "E", 200).Capacitor("C1", "IN", "B", 1e-6).Capacitor("CE", "E", "X", 47e-6).Resistor("RX", "X", "0", 33).Capacitor("C2", "C", "OUT", 1e-6).Resistor("RL", "OUT", "0", 10e3);
        var drive = new Drive("IN", "0", 5e-3, 600);
        foreach (var hertz in new double?[] { null, 40, 1e3 })
        {
            var open = new SignalBoard(sketch.Board, hertz: hertz, drive: drive);
            var amperes = new SignalBoard(Shorted(sketch.Board, "OUT"), hertz: hertz, drive: drive).Amperes("VS");
            Assert.Equal(1, open.Volts("OUT") / amperes / open.OutputOhms("OUT"), 1e-8);
        }
    }

    private static (Board Board, string One, string Two) Ports(Board board, int seed)
    {
        var one = 1 + new Random(seed).Next(board.Nodes.Length - 1);
        var two = 1 + one % (board.Nodes.Length - 1);
        return (board, board.Nodes[one], board.Nodes[two]);
    }

    private static Board Shorted(Board board, string node) => board.With([], [new Supply("VS", [node, board.Reference], Nominal.Exactly(0))]);
}
