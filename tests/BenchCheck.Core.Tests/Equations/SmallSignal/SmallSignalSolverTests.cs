using BenchCheck.Core.Boards;
using BenchCheck.Core.Equations;
using BenchCheck.Core.Metering;
using BenchCheck.Core.Quantities;
using Xunit;

namespace BenchCheck.Core.Tests.Equations.SmallSignal;

/// <summary>Small-signal readings against closed forms, and their derivatives against differences.</summary>
public class SmallSignalSolverTests
{
    [Theory]
    [InlineData(10)]
    [InlineData(1591.549)]
    [InlineData(100e3)]
    public void Low_pass_of_one_resistor_and_one_capacitor(double hertz)
    {
        var board = new SignalBoard(new BoardSketch().Supply("V1", "P", 5).Resistor("R1", "IN", "OUT", 1e3).Capacitor("C1", "OUT", "0", 100e-9).Resistor("R0", "IN", "P", 1e4), hertz: hertz);
        var w = 2 * Math.PI * hertz * 1e3 * 100e-9;
        Assert.Equal(1 / Math.Sqrt(1 + w * w), board.Gain("OUT", "IN"), 1e-9);
    }

    [Theory]
    [InlineData(4e3)]
    [InlineData(5032.9)]
    [InlineData(7e3)]
    public void Series_resonance_of_resistor_inductor_and_capacitor(double hertz)
    {
        // R 50 Ω (with the winding), L 10 mH, C 100 nF: resonance at 5.033 kHz, |Z| = sqrt(R² + (ωL − 1/ωC)²).
        var inductor = new Inductor("L1", ["A", "B"], Nominal.Exactly(10e-3), Nominal.Exactly(20));
        var board = new SignalBoard(new BoardSketch().Resistor("R1", "IN", "A", 30).Add(inductor).Capacitor("C1", "B", "0", 100e-9), hertz: hertz, drive: new Drive("IN", "0", 1, 0));
        var x = 2 * Math.PI * hertz * 10e-3 - 1 / (2 * Math.PI * hertz * 100e-9);
        var z = Math.Sqrt(50 * 50 + x * x);
        Assert.Equal(z, board.InputOhms("IN"), 1e-6 * z);
        Assert.Equal(1 / (2 * Math.PI * hertz * 100e-9) / z, board.Volts("B"), 1e-6);
    }

    [Fact]
    public void A_voltmeter_loads_the_output_and_a_dead_generator_keeps_its_resistance()
    {
        var sketch = new BoardSketch().Resistor("R1", "IN", "OUT", 1e6).Resistor("R2", "OUT", "0", 1e6);
        var board = new SignalBoard(sketch, drive: new Drive("IN", "0", 2, 500e3));
        var meter = new Meter("m", 1e6, 6000, null);
        Assert.Equal(1.0 / 3, board.Gain("OUT", "IN", meter), 1e-9);
        Assert.Equal(0.5, board.Gain("OUT", "IN"), 1e-9);
        Assert.Equal(1e6 * 1.5e6 / 2.5e6, board.OutputOhms("OUT"), 1);
        Assert.Equal(2 / 2.5, board.Volts("OUT"), 1e-6);
        Assert.Equal(2e6, board.InputOhms("IN"), 1);
    }

    [Fact]
    public void Where_no_signal_arrives_there_is_no_gain_to_read()
    {
        var board = new SignalBoard(new BoardSketch().Resistor("R1", "IN", "0", 1e3).Resistor("R2", "A", "0", 1e3).Resistor("R3", "A", "B", 1e3).Resistor("R4", "B", "0", 1e3), drive: new Drive("IN", "0", 1, 50));
        var gradient = new double[board.Theta.Length];
        Assert.Equal(0, board.Read(ReadingQuantity.Gain, "B", "A", board.Theta, gradient));
        Assert.All(gradient, slope => Assert.Equal(0, slope));
    }

    [Fact]
    public void A_transistor_multiplies_its_base_current_by_its_gain()
    {
        var sketch = new BoardSketch().Supply("V1", "VCC", 12).Resistor("RB", "VCC", "B", 470e3).Resistor("RC", "VCC", "C", 3e3).Npn("Q1", "C", "B", "0", 137);
        Assert.Equal(137, new SignalBoard(sketch).CurrentGain("Q1.collector", "Q1.base"), 1e-6);
    }

    [Fact]
    public void A_stated_transconductance_makes_the_gain_of_a_MOSFET_stage()
    {
        // Common source with its source grounded: −g_m R_D; as a follower g_m R_S / (1 + g_m R_S).
        Mosfet Q(string drain, string source) => new(Mosfet.NChannel, "Q1", [drain, "G", source], Nominal.Exactly(50), Nominal.Exactly(2)) { Siemens = Nominal.Exactly(12e-3) };
        var stage = new BoardSketch().Supply("V1", "VCC", 12).Resistor("R1", "VCC", "G", 1e6).Resistor("R2", "G", "0", 226e3).Resistor("R3", "VCC", "D", 680).Add(Q("D", "0"));
        Assert.Equal(-12e-3 * 680, new SignalBoard(stage).Gain("D", "G"), 1e-6);
        Assert.Equal(1e6 * 226e3 / 1.226e6, new SignalBoard(stage).InputOhms("G"), 1);
        var follower = new BoardSketch().Supply("V1", "VCC", 12).Resistor("R1", "VCC", "G", 1e6).Resistor("R2", "G", "0", 1e6).Add(Q("VCC", "S")).Resistor("R3", "S", "0", 470);
        Assert.Equal(12e-3 * 470 / (1 + 12e-3 * 470), new SignalBoard(follower).Gain("S", "G"), 1e-6);
    }

    [Theory]
    [InlineData(ReadingQuantity.Gain, "OUT", "IN", null)]
    [InlineData(ReadingQuantity.Gain, "OUT", "IN", 120.0)]
    [InlineData(ReadingQuantity.InputResistance, "IN", "0", null)]
    [InlineData(ReadingQuantity.OutputResistance, "OUT", "0", 300.0)]
    [InlineData(ReadingQuantity.Voltage, "OUT", "E", 300.0)]
    [InlineData(ReadingQuantity.CurrentGain, "Q2.emitter", "Q1.base", 2000.0)]
    public void Derivatives_follow_every_parameter_also_through_the_operating_point(ReadingQuantity quantity, string at, string against, double? hertz)
    {
        foreach (var law in new[] { JunctionLaw.ConstantDrop, JunctionLaw.Exponential })
        {
            var inductor = new Inductor("L1", ["C2", "C1"], Nominal.Exactly(0.5e-3), Nominal.Exactly(20));
            var output = new Transistor(Transistor.Npn, "Q2", ["VCC", "C2", "OUT"], Nominal.Exactly(80), Nominal.Exactly(0.66), Nominal.Exactly(0.2))
            {
                OutputOhms = Nominal.Exactly(40e3),
            };
            var sketch = new BoardSketch().Supply("V1", "VCC", 12).Resistor("R1", "VCC", "B", 47e3).Resistor("R2", "B", "0", 10e3).Resistor("R3", "VCC", "C1", 4.7e3)
                .Resistor("R4", "E", "0", 1e3).Npn("Q1", "C1", "B", "E", 150).Capacitor("C1", "E", "0", 2e-6).Capacitor("C2", "IN", "B", 1e-6).Add(inductor).Add(output)
                .Resistor("R5", "OUT", "0", 1e3);
            var board = new SignalBoard(sketch, hertz: hertz, drive: new Drive("IN", "0", 0.01, 600), law: law);
            var theta = board.Theta.ToArray();
            for (var i = 0; i < theta.Length; i++)
            {
                if (board.Table.Entries[i].Kind == ParameterKind.SeriesResistance) theta[i] = 0.7;
            }

            var gradient = new double[theta.Length];
            board.Read(quantity, at, against, theta, gradient);
            for (var i = 0; i < theta.Length; i++)
            {
                var step = 1e-5 * Math.Abs(theta[i]);
                if (step == 0) continue;
                double At(double sign)
                {
                    var moved = theta.ToArray();
                    moved[i] += sign * step;
                    return board.Read(quantity, at, against, moved, []);
                }

                var difference = (At(1) - At(-1)) / (2 * step);
                var scale = Math.Abs(board.Read(quantity, at, against, theta, [])) / Math.Abs(theta[i]);
                Assert.True(Math.Abs(difference - gradient[i]) < 1e-5 * scale, $"{law}, {board.Table.Entries[i].Part.Designator} {board.Table.Entries[i].Kind}: {gradient[i]} for {difference}");
            }
        }
    }
}
