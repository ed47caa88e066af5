using System.Collections.Immutable;
using BenchCheck.Core.Quantities;

namespace BenchCheck.Core.Boards;

/// <summary>A resistor between two like pins.</summary>
public sealed record Resistor(string Designator, ImmutableArray<string> Nodes, Nominal Ohms) : Part(PartKind, Designator, Nodes)
{
    public static readonly PartKind PartKind = new("resistor", ["1", "2"], "R");

    public override ImmutableArray<PartParameter> Parameters => [new(ParameterKind.Resistance, Ohms)];

    public override void Describe(PartElements elements, string? setting) => elements.Add(new Conductor(0, 1, Coefficient.Of(0)));
}
