using System.Collections.Immutable;
using BenchCheck.Core.Quantities;

namespace BenchCheck.Core.Boards;

/// <summary>An inductor: its winding resistance at DC, to small signals its inductance in series with that.</summary>
public sealed record Inductor(string Designator, ImmutableArray<string> Nodes, Nominal Henries, Nominal WindingOhms)
    : Part(PartKind, Designator, Nodes)
{
    public static readonly PartKind PartKind = new("inductor", ["1", "2"], "L");

    public override ImmutableArray<PartParameter> Parameters => [new(ParameterKind.Resistance, WindingOhms), new(ParameterKind.Inductance, Henries)];

    public override void Describe(PartElements elements, string? setting) => elements.Add(new Conductor(0, 1, Coefficient.Of(0)));

    public override void DescribeSmallSignal(PartElements elements, string? setting) =>
        elements.Add(new Reactance(0, 1, Coefficient.Of(1), Coefficient.Of(0), false));
}
