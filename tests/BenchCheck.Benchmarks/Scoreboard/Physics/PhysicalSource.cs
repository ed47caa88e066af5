using System.Collections.Immutable;
using BenchCheck.Core.Boards;

namespace BenchCheck.Benchmarks.Scoreboard.Physics;

/// <summary>A bench supply behind the resistance of its leads.</summary>
/// <param name="Set">voltage in the conditions that set it</param>
public sealed record PhysicalSource(
    string Designator, ImmutableArray<string> Nodes, double Volts, double Ohms, ImmutableDictionary<string, double> Set) : PhysicalPart(Designator, Nodes)
{
    public override void Place(TruthCircuit circuit, Condition condition)
    {
        var (plus, minus) = (circuit.Node(Nodes[0]), circuit.Node(Nodes[1]));
        if (!condition.SuppliesRemoved) circuit.AddSource(plus, minus, Set.GetValueOrDefault(condition.Name, Volts), Ohms);
    }

    /// <summary>The same supply with its voltage, in every condition, put through a change.</summary>
    public PhysicalSource Changed(Func<double, double> change) =>
        this with { Volts = change(Volts), Set = Set.ToImmutableDictionary(s => s.Key, s => change(s.Value)) };
}

public sealed record PhysicalCurrentSource(string Designator, ImmutableArray<string> Nodes, double Amperes) : PhysicalPart(Designator, Nodes)
{
    public override void Place(TruthCircuit circuit, Condition condition)
    {
        var (plus, minus) = (circuit.Node(Nodes[0]), circuit.Node(Nodes[1]));
        if (!condition.SuppliesRemoved) circuit.AddCurrent(minus, plus, Amperes);
    }
}
