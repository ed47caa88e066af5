using System.Collections.Immutable;
using BenchCheck.Core.Quantities;

namespace BenchCheck.Core.Boards;

/// <summary>A wire link or zero-ohm resistor.</summary>
public sealed record Jumper(string Designator, ImmutableArray<string> Nodes, Nominal Ohms) : Part(PartKind, Designator, Nodes)
{
    public static readonly PartKind PartKind = new("jumper", ["1", "2"], "W");

    /// <summary>Resistance taken when none is stated: 50 mΩ, common practice, no source.</summary>
    public static readonly Nominal UsualOhms = Nominal.Between(0.01, 0.25);

    public override ImmutableArray<PartParameter> Parameters => [new(ParameterKind.Resistance, Ohms)];

    public override void Describe(PartElements elements, string? setting) => elements.Add(new Conductor(0, 1, Coefficient.Of(0)));
}
