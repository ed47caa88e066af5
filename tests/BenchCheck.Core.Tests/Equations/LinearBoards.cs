using BenchCheck.Core.Boards;
using BenchCheck.Core.Quantities;

namespace BenchCheck.Core.Tests.Equations;

/// <summary>
/// Linear boards drawn from a seed: connected resistors, supplies with and without resistance, current sources, the four controlled sources, capacitors,
/// inductors, op-amps of finite gain.
/// </summary>
internal sealed class LinearBoards
{
    private readonly Random random;
    private readonly string[] nodes;
    private readonly List<Part> parts = [];
    private readonly NodeGroups stiff;

    private LinearBoards(int seed)
    {
        random = new Random(seed);
        nodes = [.. Enumerable.Range(0, random.Next(3, 11)).Select(i => i == 0 ? "0" : $"N{i}")];
        stiff = new NodeGroups(nodes);
        for (var i = 1; i < nodes.Length; i++) Resistor(nodes[i], nodes[random.Next(i)]);
        for (var i = random.Next(nodes.Length); i > 0; i--)
        {
            var (from, to) = Pair();
            Resistor(from, to);
        }
    }

    public static Board Resistors(int seed) => new LinearBoards(seed).Finish();

    public static Board WithSources(int seed)
    {
        var draw = new LinearBoards(seed);
        draw.Sources();
        return draw.Finish();
    }

    public static Board WithControlledSources(int seed)
    {
        var draw = new LinearBoards(seed);
        draw.Sources();
        draw.ControlledSources();
        return draw.Finish();
    }

    public static Board Reactive(int seed)
    {
        var draw = new LinearBoards(seed);
        draw.Reactances();
        return draw.Finish();
    }

    public static Board ReactiveWithControlledSources(int seed)
    {
        var draw = new LinearBoards(seed);
        draw.Sources();
        draw.Reactances();
        draw.ControlledSources();
        return draw.Finish();
    }

    /// <summary>At rest at zero volts, so that every op-amp is in its linear range.</summary>
    public static Board ReactiveWithOpAmps(int seed)
    {
        var draw = new LinearBoards(seed);
        draw.Reactances();
        draw.ControlledSources();
        draw.OpAmps();
        return draw.Finish();
    }

    private Board Finish() => new("random", "0", BoardOrigin.NewBuild, [.. parts], []);

    private (string From, string To) Pair()
    {
        var from = random.Next(nodes.Length);
        return (nodes[from], nodes[(from + random.Next(1, nodes.Length)) % nodes.Length]);
    }

    private double LogBetween(double low, double high) => low * Math.Pow(high / low, random.NextDouble());

    private double Signed(double low, double high) => LogBetween(low, high) * (random.Next(2) * 2 - 1);

    private void Resistor(string from, string to) => parts.Add(new Resistor($"R{parts.Count}", [from, to], Nominal.Exactly(LogBetween(10, 1e6))));

    private void Sources()
    {
        for (var i = random.Next(1, 4); i > 0; i--)
        {
            var (plus, minus) = Pair();
            var isStiff = random.Next(2) == 0 && !stiff.AreTied(plus, minus);
            if (isStiff) stiff.Tie(plus, minus);
            parts.Add(new Supply($"V{i}", [plus, minus], Nominal.Exactly(Signed(1, 30)), isStiff ? null : Nominal.Exactly(LogBetween(0.1, 1e3))));
        }

        for (var i = random.Next(3); i > 0; i--)
        {
            var (plus, minus) = Pair();
            parts.Add(new CurrentSource($"I{i}", [plus, minus], Nominal.Exactly(Signed(1e-6, 1e-2))));
        }
    }

    private void Reactances()
    {
        for (var i = random.Next(1, 4); i > 0; i--)
        {
            var (from, to) = Pair();
            parts.Add(new Capacitor($"C{i}", [from, to], Nominal.Exactly(LogBetween(1e-9, 10e-6))));
        }

        for (var i = random.Next(3); i > 0; i--)
        {
            var (from, to) = Pair();
            parts.Add(new Inductor($"L{i}", [from, to], Nominal.Exactly(LogBetween(10e-6, 0.1)), Nominal.Exactly(LogBetween(1, 100))));
        }
    }

    private void OpAmps()
    {
        parts.Add(new Supply("VP", ["V+", "0"], Nominal.Exactly(15)));
        parts.Add(new Supply("VN", ["0", "V-"], Nominal.Exactly(15)));
        for (var i = random.Next(1, 3); i > 0; i--)
        {
            var output = nodes[random.Next(1, nodes.Length)];
            if (stiff.AreTied(output, "0")) continue;
            stiff.Tie(output, "0");
            var (plus, minus) = Pair();
            parts.Add(new OpAmp($"U{i}", [plus, minus, output, "V+", "V-"], Nominal.Exactly(LogBetween(10, 1e4)), Nominal.Exactly(0), 1.5));
        }
    }

    private void ControlledSources()
    {
        for (var i = random.Next(1, 5); i > 0; i--)
        {
            var (plus, minus) = Pair();
            var (kind, gain, isVoltage) = random.Next(4) switch
            {
                0 => (ControlledSource.VoltageByVoltage, Signed(0.1, 5), true),
                1 => (ControlledSource.CurrentByVoltage, Signed(1e-6, 1e-3), false),
                2 => (ControlledSource.VoltageByCurrent, Signed(1, 1e4), true),
                _ => (ControlledSource.CurrentByCurrent, Signed(0.1, 5), false),
            };
            if (isVoltage && stiff.AreTied(plus, minus)) continue;
            if (isVoltage) stiff.Tie(plus, minus);
            var (high, low) = Pair();
            Control control = ReferenceEquals(kind, ControlledSource.VoltageByVoltage) || ReferenceEquals(kind, ControlledSource.CurrentByVoltage)
                ? new Control.NodePair(high, low)
                : new Control.PartCurrent(parts[random.Next(parts.Count)].Designator);
            parts.Add(new ControlledSource(kind, $"K{i}", [plus, minus], Nominal.Exactly(gain), control));
        }
    }
}
