using System.Collections.Immutable;
using BenchCheck.Core.Quantities;

namespace BenchCheck.Core.Boards;

/// <summary>A current source; its current leaves the plus pin into the board.</summary>
public sealed record CurrentSource(string Designator, ImmutableArray<string> Nodes, Nominal Amperes) : Part(PartKind, Designator, Nodes)
{
    public static readonly PartKind PartKind = new("current source", ["plus", "minus"], "I");

    public override ImmutableArray<PartParameter> Parameters => [new(ParameterKind.Current, Amperes)];

    public override void Describe(PartElements elements, string? setting) =>
        elements.Add(new CurrentBranch(1, 0, Coefficient.Of(0), IsSupply: true));
}
