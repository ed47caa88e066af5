using System.Collections.Immutable;
using BenchCheck.Core.Quantities;

namespace BenchCheck.Core.Boards;

/// <summary>A capacitor: open at DC, a capacitance to small signals.</summary>
public sealed record Capacitor(string Designator, ImmutableArray<string> Nodes, Nominal Farads) : Part(PartKind, Designator, Nodes)
{
    public static readonly PartKind PartKind = new("capacitor", ["1", "2"], "C");

    public override ImmutableArray<PartParameter> Parameters => [new(ParameterKind.Capacitance, Farads)];

    public override void Describe(PartElements elements, string? setting)
    {
        // Open at DC.
    }

    public override void DescribeSmallSignal(PartElements elements, string? setting) =>
        elements.Add(new Reactance(0, 1, Coefficient.Of(0), default, true));
}
