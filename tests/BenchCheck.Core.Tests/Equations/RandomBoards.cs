using System.Collections.Immutable;
using BenchCheck.Core.Boards;
using BenchCheck.Core.Quantities;

namespace BenchCheck.Core.Tests.Equations;

/// <summary>Boards wired at random from a seed: far-off values, floating nodes, opened pins, shorted supplies. The same seed gives the same board.</summary>
internal sealed class RandomBoards
{
    private readonly Random random;
    private readonly List<Part> parts = [];
    private readonly NodeGroups stiff;
    private readonly string[] nodes;

    private RandomBoards(int seed)
    {
        random = new Random(seed);
        nodes = [.. Enumerable.Range(0, random.Next(3, 9)).Select(i => i == 0 ? "0" : $"N{i}")];
        stiff = new NodeGroups([.. nodes]);
    }

    /// <summary>Resistors, supplies, diodes, zeners and up to four transistors.</summary>
    public static Board Passive(int seed)
    {
        var draw = new RandomBoards(seed);
        draw.Sources();
        draw.Resistors();
        draw.Semiconductors(4);
        return draw.Finish();
    }

    /// <summary>The same with one or two op-amps, each between supplies of the right order.</summary>
    public static Board WithOpAmps(int seed)
    {
        var draw = new RandomBoards(seed);
        draw.Sources();
        draw.Resistors();
        draw.Semiconductors(2);
        draw.OpAmps();
        return draw.Finish();
    }

    /// <summary>The same with MOSFETs and a three-terminal regulator, its common at the reference or not.</summary>
    public static Board WithSwitches(int seed)
    {
        var draw = new RandomBoards(seed);
        draw.Sources();
        draw.Resistors();
        draw.Semiconductors(1);
        draw.Switches();
        return draw.Finish();
    }

    private string Node() => nodes[random.Next(nodes.Length)];

    private string OtherThan(string node)
    {
        string other;
        do other = Node();
        while (other == node);
        return other;
    }

    private bool Chance(double probability) => random.NextDouble() < probability;

    private double Between(double low, double high) => low + (high - low) * random.NextDouble();

    private double LogBetween(double low, double high) => Math.Exp(Between(Math.Log(low), Math.Log(high)));

    private void Sources()
    {
        for (var i = random.Next(1, 4); i > 0; i--)
        {
            var plus = Node();
            var minus = Chance(0.7) && plus != "0" ? "0" : OtherThan(plus);
            var hasResistance = Chance(0.5) || stiff.AreTied(plus, minus);
            if (!hasResistance) stiff.Tie(plus, minus);
            var volts = Nominal.Exactly(Between(-15, 30));
            parts.Add(new Supply($"V{i}", [plus, minus], volts, hasResistance ? Nominal.Exactly(LogBetween(1e-3, 100)) : null));
            // A short across a supply that has a resistance of its own.
            if (hasResistance && Chance(0.1)) parts.Add(new Jumper($"W{i}", [plus, minus], Nominal.Exactly(0.01)));
        }
    }

    private void Resistors()
    {
        for (var i = random.Next(nodes.Length - 1, 2 * nodes.Length); i > 0; i--)
        {
            var from = Node();
            parts.Add(new Resistor($"R{i}", [from, OtherThan(from)], Nominal.Exactly(LogBetween(1, 100e6))));
        }
    }

    private void Semiconductors(int transistors)
    {
        for (var i = random.Next(0, transistors + 1); i > 0; i--)
        {
            var kind = Chance(0.5) ? Transistor.Npn : Transistor.Pnp;
            parts.Add(new Transistor(kind, $"Q{i}", [Node(), Node(), Node()], Nominal.Exactly(LogBetween(1, 1000)),
                Nominal.Exactly(Between(0.55, 0.75)), Nominal.Exactly(Between(0.02, 0.2))));
        }

        for (var i = random.Next(0, 3); i > 0; i--)
        {
            var anode = Node();
            parts.Add(new Diode(Chance(0.8) ? Diode.Plain : Diode.Led, $"D{i}", [anode, OtherThan(anode)], Nominal.Exactly(Between(0.3, 2.5))));
        }

        for (var i = random.Next(0, 2); i > 0; i--)
        {
            var anode = Node();
            parts.Add(new Diode(Diode.Zener, $"Z{i}", [anode, OtherThan(anode)], Nominal.Exactly(Between(0.6, 0.75)), Nominal.Exactly(Between(2.4, 12))));
        }
    }

    private void Switches()
    {
        for (var i = random.Next(1, 4); i > 0; i--)
        {
            var kind = Chance(0.5) ? Mosfet.NChannel : Mosfet.PChannel;
            parts.Add(new Mosfet(kind, $"M{i}", [Node(), Node(), Node()], Nominal.Exactly(LogBetween(0.02, 20)), Nominal.Exactly(Between(0.8, 4))));
        }

        if (!Chance(0.6)) return;
        var (input, output) = (Node(), Node());
        parts.Add(new Regulator("U1", [input, output, Chance(0.7) ? "0" : Node()], Nominal.Exactly(Between(1.2, 12)), Nominal.Exactly(Between(0.2, 2)),
            Nominal.Exactly(LogBetween(1e-5, 8e-3))));
    }

    private void OpAmps()
    {
        for (var i = random.Next(1, 3); i > 0; i--)
        {
            string[] free = [.. nodes.Where(n => !stiff.AreTied(n, "0"))];
            if (free.Length == 0) return;
            var output = free[random.Next(free.Length)];
            stiff.Tie(output, "0");
            parts.Add(new Supply($"VP{i}", [$"P{i}", "0"], Nominal.Exactly(Between(5, 15))));
            parts.Add(new Supply($"VN{i}", [$"M{i}", "0"], Nominal.Exactly(Between(-15, 0))));
            parts.Add(new OpAmp($"U{i}", [Node(), Node(), output, $"P{i}", $"M{i}"], Chance(0.7) ? null : Nominal.Exactly(LogBetween(1e3, 1e6)),
                Nominal.Exactly(Between(-5e-3, 5e-3)), Between(0, 2)));
        }
    }

    /// <summary>Shorts a few nodes and opens a few joints: the pin moves to a node of its own.</summary>
    private Board Finish()
    {
        if (Chance(0.15))
        {
            var from = Node();
            parts.Add(new Resistor("RS", [from, OtherThan(from)], Nominal.Exactly(0.05)));
        }

        for (var i = 0; i < parts.Count; i++)
        {
            if (!Chance(0.08) || parts[i] is OpAmp || parts[i].Designator.StartsWith("VP") || parts[i].Designator.StartsWith("VN")) continue;
            parts[i] = parts[i] with { Nodes = parts[i].Nodes.SetItem(random.Next(parts[i].Nodes.Length), $"X{i}") };
        }

        return new Board("random", "0", BoardOrigin.NewBuild, [.. parts], []);
    }
}
