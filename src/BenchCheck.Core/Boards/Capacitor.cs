using System.Collections.Immutable;
using BenchCheck.Core.Quantities;

namespace BenchCheck.Core.Boards;

/// <summary>A capacitor: open at DC.</summary>
public sealed record Capacitor(string Designator, ImmutableArray<string> Nodes, Nominal Farads) : Part(PartKind, Designator, Nodes)
{
    public static readonly PartKind PartKind = new("capacitor", ["1", "2"], "C");

    /// <summary>Empty: no direct reading tells its capacitance.</summary>
    public override ImmutableArray<PartParameter> Parameters => [];

    public override void Describe(PartElements elements, string? setting) =>
        elements.Add(new Reactance(0, 1, Coefficient.Constant(Farads.Value), true));
}
