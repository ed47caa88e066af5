using System.Numerics;
using BenchCheck.Core.Boards;
using BenchCheck.Core.Metering;
using BenchCheck.Core.Quantities;
using CsCheck;
using Xunit;

namespace BenchCheck.Core.Tests.Equations.SmallSignal;

/// <summary>Small-signal readings of random networks against complex loop equations that share nothing with them, and against the balance of power.</summary>
public class RandomNetworkTests
{
    private const int Seeds = 600;

    [Theory]
    [InlineData(false)]
    [InlineData(true)]
    public void Readings_at_a_frequency_agree_with_independently_stamped_loop_equations(bool hasOpAmps)
    {
        var (skipped, compared) = (0, 0);
        for (var seed = 0; seed < Seeds; seed++)
        {
            var drawn = hasOpAmps ? LinearBoards.ReactiveWithOpAmps(seed) : LinearBoards.ReactiveWithControlledSources(seed);
            var random = new Random(seed);
            var hertz = 10 * Math.Pow(1e5, random.NextDouble());
            var (driven, seen) = (TwoOf(random, drawn), TwoOf(random, drawn));
            var sourceOhms = Math.Pow(1e4, random.NextDouble());
            var drive = new Drive(driven.High, driven.Low, 1, sourceOhms);

            var generator = new Supply("VG", [driven.High, driven.Low], Nominal.Exactly(1), Nominal.Exactly(sourceOhms));
            var dead = new Supply("VG", [driven.High, driven.Low], Nominal.Exactly(0), Nominal.Exactly(sourceOhms));
            var unit = new CurrentSource("IG", [seen.High, seen.Low], Nominal.Exactly(1));
            var (driving, into, outOf) = (Loops(drawn, hertz, generator), Loops(drawn, hertz, unit), Loops(drawn, hertz, unit, dead));
            if (driving is null || into is null || outOf is null)
            {
                skipped++;
                continue;
            }

            // Positive feedback drives an op-amp against its supply; there it passes no signal on.
            var atRest = new SolvedBoard(drawn).Point;
            if (drawn.Parts.OfType<OpAmp>().Any(u => atRest.State(u) != "linear")) continue;
            compared++;
            var board = new SignalBoard(drawn, hertz: hertz, drive: drive);
            Same(seed, "voltage", Across(driving, seen), board.Volts(seen.High, seen.Low), Largest(driving));
            Same(seed, "input resistance", Across(into, seen), board.InputOhms(seen.High, seen.Low), Largest(into));
            Same(seed, "output resistance", Across(outOf, seen), board.OutputOhms(seen.High, seen.Low), Largest(outOf));
            if (seen.High == "0" || driving[seen.High].Magnitude <= 1e-3 * Largest(driving)) continue;
            var ratio = driving[seen.Low] / driving[seen.High];
            var gain = board.Gain(seen.Low, seen.High);
            Same(seed, "gain", ratio, gain, Largest(driving) / driving[seen.High].Magnitude);
            if (Math.Abs(ratio.Real) > 1e-6 * ratio.Magnitude && ratio.Magnitude > 1e-6) Assert.Equal(Math.Sign(ratio.Real), Math.Sign(gain));
        }

        Assert.InRange(skipped, 0, Seeds / 20);
        Assert.True(compared > Seeds / 4, $"only {compared} networks compared");
    }

    /// <summary>Without a frequency: large capacitors and small inductors are shorts, the others are open.</summary>
    [Fact]
    public void Readings_without_a_frequency_are_those_of_a_network_with_shorts_and_opens() =>
        Gen.Int[0, 1_000_000].Sample(seed =>
        {
            var drawn = LinearBoards.Reactive(seed);
            var random = new Random(seed);
            var (driven, seen) = (TwoOf(random, drawn), TwoOf(random, drawn));
            var replaced = new Board("replaced", "0", BoardOrigin.NewBuild, [.. drawn.Parts.SelectMany(AtMiddleFrequencies)], []);
            var expected = Loops(replaced, 1, new Supply("VG", [driven.High, driven.Low], Nominal.Exactly(1), Nominal.Exactly(1e3)));
            if (expected is null) return;
            var board = new SignalBoard(drawn, drive: new Drive(driven.High, driven.Low, 1, 1e3));
            Assert.Equal(Across(expected, seen).Magnitude, board.Volts(seen.High, seen.Low), 1e-6);
        }, iter: 300);

    /// <summary>Sum of v · conj(i) over all branches is zero (Tellegen, Philips Res. Rep. 7 (1952)): |V| |I| at the generator is |P + jQ| of what is in the parts.</summary>
    [Fact]
    public void Power_of_the_generator_is_that_of_resistors_coils_and_capacitors_together() =>
        Gen.Int[0, 1_000_000].Sample(seed =>
        {
            var drawn = LinearBoards.Reactive(seed);
            var random = new Random(seed);
            var w = 2 * Math.PI * 10 * Math.Pow(1e4, random.NextDouble());
            var (high, low) = TwoOf(random, drawn);
            var board = new SignalBoard(drawn, hertz: w / (2 * Math.PI), drive: new Drive(high, low, 1, 0));
            var (watts, reactive) = (0.0, 0.0);
            foreach (var part in drawn.Parts)
            {
                var square = Math.Pow(board.Amperes(part.Designator), 2);
                watts += square * (part is Resistor r ? r.Ohms.Value : part is Inductor l ? l.WindingOhms.Value : 0);
                reactive += square * (part is Inductor coil ? w * coil.Henries.Value : part is Capacitor c ? -1 / (w * c.Farads.Value) : 0);
            }

            var apparent = 1 / board.InputOhms(high, low);
            Assert.True(Math.Abs(Math.Sqrt(watts * watts + reactive * reactive) - apparent) <= 1e-8 * apparent, $"seed {seed}: {watts} W, {reactive} var, {apparent} VA");
        }, iter: 150);

    [Fact]
    public void Derivatives_by_every_value_follow_the_loop_equations() =>
        Gen.Int[0, 1_000_000].Sample(seed =>
        {
            var drawn = LinearBoards.ReactiveWithOpAmps(seed);
            var random = new Random(seed);
            var hertz = 10 * Math.Pow(1e4, random.NextDouble());
            var (driven, seen) = (TwoOf(random, drawn), TwoOf(random, drawn));
            var board = new SignalBoard(drawn, hertz: hertz, drive: new Drive(driven.High, driven.Low, 1, 100));
            var atRest = new SolvedBoard(drawn).Point;
            if (drawn.Parts.OfType<OpAmp>().Any(u => atRest.State(u) != "linear")) return;
            var gradient = new double[board.Theta.Length];
            var value = board.Read(ReadingQuantity.Voltage, seen.High, seen.Low, board.Theta, gradient);
            for (var i = 0; i < gradient.Length; i++)
            {
                var (part, kind) = (board.Table.Entries[i].Part, board.Table.Entries[i].Kind);
                if (part is Supply || kind == ParameterKind.Offset) continue;
                double? At(double factor) =>
                    Loops(drawn.With([Scaled(part, kind, factor)], []), hertz, new Supply("VG", [driven.High, driven.Low], Nominal.Exactly(1), Nominal.Exactly(100))) is { } volts
                        ? Across(volts, seen).Magnitude : null;
                if (At(1.001) is not { } up || At(0.999) is not { } down || At(1) is not { } middle) return;

                // Where the curve bends much within the step, or nearly nothing is seen, the difference says little.
                if (Math.Abs(up + down - 2 * middle) > 1e-5 * value || value < 1e-3) continue;
                var byLogarithm = gradient[i] * board.Theta[i];
                Assert.True(Math.Abs((up - down) / 2e-3 - byLogarithm) <= 1e-4 * (value + Math.Abs(byLogarithm)), $"seed {seed}, {part.Designator} {kind}: {byLogarithm} for {(up - down) / 2e-3}");
            }
        }, iter: 60);

    [Theory]
    [InlineData(10e3, 100e-9, 159.154943)]
    [InlineData(4.7e3, 22e-9, 1539.2)]
    public void Bridge_of_resistors_and_capacitors_is_silent_at_balance_alone(double ohms, double farads, double balance)
    {
        // Wien's bridge (Ann. Phys. 44 (1891)): with equal arms balanced at 1/(2π R C), where the divider of the other arms gives 1/3.
        var sketch = new BoardSketch().Resistor("R1", "IN", "X", ohms).Capacitor("C1", "X", "A", farads).Resistor("R2", "A", "0", ohms).Capacitor("C2", "A", "0", farads)
            .Resistor("R3", "IN", "B", 2e3).Resistor("R4", "B", "0", 1e3);
        var hertz = 1 / (2 * Math.PI * ohms * farads);
        Assert.Equal(balance, hertz, 1e-3 * balance);
        double At(double f) => new SignalBoard(sketch, hertz: f, drive: new Drive("IN", "0", 1, 50)).Volts("A", "B");
        Assert.Equal(0, At(hertz), 1e-9);
        Assert.True(At(1.01 * hertz) > 1e-3 && At(0.99 * hertz) > 1e-3);
        Assert.Equal(1.0 / 3, new SignalBoard(sketch, hertz: hertz).Gain("A", "IN"), 1e-9);
    }

    /// <summary>Node voltages by loop equations with parts added, sources of the board dead; null where two trees do not agree: singular, or nearly so.</summary>
    private static Dictionary<string, Complex>? Loops(Board board, double hertz, params Part[] added)
    {
        Part[] parts =
        [
            .. board.Parts.Where(p => !p.Nodes.Contains("V+") || p is OpAmp).Where(p => !p.Nodes.Contains("V-") || p is OpAmp).Select(p => p switch
            {
                Supply s => s with { Volts = Nominal.Exactly(0) },
                CurrentSource i => i with { Amperes = Nominal.Exactly(0) },
                OpAmp u => new ControlledSource(ControlledSource.VoltageByVoltage, u.Designator, [u.Nodes[2], "0"], u.Gain!, new Control.NodePair(u.Nodes[0], u.Nodes[1])),
                _ => p,
            }),
            .. added,
        ];
        var linear = new Board("loops", "0", BoardOrigin.NewBuild, [.. parts], []);
        var (first, second) = (LoopEquations.Phasors(linear, new Random(1), 2 * Math.PI * hertz), LoopEquations.Phasors(linear, new Random(2), 2 * Math.PI * hertz));
        return first is null || second is null || first.Any(v => !((v.Value - second[v.Key]).Magnitude <= 1e-10 * Largest(first))) ? null : first;
    }

    private static IEnumerable<Part> AtMiddleFrequencies(Part part) => part switch
    {
        Capacitor c => c.Farads.Value >= 100e-9 ? [new Supply(c.Designator, c.Nodes, Nominal.Exactly(0), Nominal.Exactly(1e-6))] : [],
        Inductor l => l.Henries.Value < 1e-3 ? [new Resistor(l.Designator, l.Nodes, l.WindingOhms)] : [],
        _ => [part],
    };

    private static Part Scaled(Part part, ParameterKind kind, double factor) => part switch
    {
        Resistor r => r with { Ohms = Times(r.Ohms, factor) },
        Capacitor c => c with { Farads = Times(c.Farads, factor) },
        Inductor l => kind == ParameterKind.Inductance ? l with { Henries = Times(l.Henries, factor) } : l with { WindingOhms = Times(l.WindingOhms, factor) },
        ControlledSource e => e with { Gain = Times(e.Gain, factor) },
        OpAmp u => u with { Gain = Times(u.Gain!, factor) },
        _ => throw new NotSupportedException(part.Kind.Name),
    };

    private static Nominal Times(Nominal nominal, double factor) => Nominal.Exactly(nominal.Value * factor);

    private static (string High, string Low) TwoOf(Random random, Board board)
    {
        string[] nodes = [.. board.Nodes.Where(n => n is not "V+" and not "V-")];
        var high = random.Next(nodes.Length);
        return (nodes[high], nodes[(high + random.Next(1, nodes.Length)) % nodes.Length]);
    }

    private static Complex Across(Dictionary<string, Complex> volts, (string High, string Low) pair) => volts[pair.High] - volts[pair.Low];

    /// <summary>What an error is compared with: the generators give 1 V and 1 A.</summary>
    private static double Largest(Dictionary<string, Complex> volts) => Math.Max(1, volts.Values.Max(v => v.Magnitude));

    private static void Same(int seed, string what, Complex expected, double actual, double size) =>
        Assert.True(Math.Abs(expected.Magnitude - Math.Abs(actual)) <= 1e-9 * size, $"seed {seed}, {what}: loops {expected.Magnitude}, nodes {actual}, largest {size}");
}
