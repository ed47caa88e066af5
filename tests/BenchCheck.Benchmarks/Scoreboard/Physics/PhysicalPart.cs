using System.Collections.Immutable;
using System.Text;
using BenchCheck.Core.Boards;

namespace BenchCheck.Benchmarks.Scoreboard.Physics;

/// <summary>One real component as it sits on the board: its nodes and the numbers that this specimen has.</summary>
public abstract record PhysicalPart(string Designator, ImmutableArray<string> Nodes)
{
    /// <summary>Puts the part into the netlist of a condition.</summary>
    public abstract void Place(TruthCircuit circuit, Condition condition);

    /// <summary>Designator and nodes as the reports print them.</summary>
    protected virtual bool PrintMembers(StringBuilder builder)
    {
        ArgumentNullException.ThrowIfNull(builder);
        builder.Append(Designator).Append(' ').AppendJoin(' ', Nodes);
        return true;
    }

    /// <summary>The part with one pin on another node.</summary>
    public PhysicalPart Moved(int pin, string node) => this with { Nodes = Nodes.SetItem(pin, node) };

    /// <summary>The part with two pins exchanged.</summary>
    public PhysicalPart Exchanged(int pin, int other) =>
        this with { Nodes = Nodes.SetItem(pin, Nodes[other]).SetItem(other, Nodes[pin]) };
}

/// <summary>A resistor, a jumper or the winding of an inductor.</summary>
public sealed record PhysicalResistor(string Designator, ImmutableArray<string> Nodes, double Ohms) : PhysicalPart(Designator, Nodes)
{
    public override void Place(TruthCircuit circuit, Condition condition) =>
        circuit.AddResistor(circuit.Node(Nodes[0]), circuit.Node(Nodes[1]), Ohms);
}

/// <summary>A capacitor: nothing at DC, but its nodes exist.</summary>
public sealed record PhysicalCapacitor(string Designator, ImmutableArray<string> Nodes) : PhysicalPart(Designator, Nodes)
{
    public override void Place(TruthCircuit circuit, Condition condition)
    {
        foreach (var node in Nodes) circuit.Node(node);
    }
}

public sealed record PhysicalPotentiometer(string Designator, ImmutableArray<string> Nodes, double Ohms, double Position)
    : PhysicalPart(Designator, Nodes)
{
    /// <summary>What is left between wiper and track at either end.</summary>
    private const double EndOhms = 0.5;

    public override void Place(TruthCircuit circuit, Condition condition)
    {
        var wiper = circuit.Node(Nodes[1]);
        circuit.AddResistor(circuit.Node(Nodes[0]), wiper, EndOhms + Position * Ohms);
        circuit.AddResistor(wiper, circuit.Node(Nodes[2]), EndOhms + (1 - Position) * Ohms);
    }
}

/// <param name="IsFlipped">the fault: it stands in the other position, whatever a condition says</param>
public sealed record PhysicalSwitch(string Designator, ImmutableArray<string> Nodes, bool IsClosed, double Ohms, bool IsFlipped)
    : PhysicalPart(Designator, Nodes)
{
    public override void Place(TruthCircuit circuit, Condition condition)
    {
        var (a, b) = (circuit.Node(Nodes[0]), circuit.Node(Nodes[1]));
        var isClosed = condition.Switches.TryGetValue(Designator, out var position) ? position == Switch.Closed : IsClosed;
        if (isClosed != IsFlipped) circuit.AddResistor(a, b, Ohms);
    }
}
