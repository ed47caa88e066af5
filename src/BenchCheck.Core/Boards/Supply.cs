using System.Collections.Immutable;
using BenchCheck.Core.Quantities;

namespace BenchCheck.Core.Boards;

/// <summary>A voltage supply, with a source resistance where stated.</summary>
public sealed record Supply(string Designator, ImmutableArray<string> Nodes, Nominal Volts, Nominal? SourceOhms = null)
    : Part(PartKind, Designator, Nodes)
{
    public static readonly PartKind PartKind = new("supply", ["plus", "minus"], "V");

    public override ImmutableArray<PartParameter> Parameters => SourceOhms is null
        ? [new(ParameterKind.Voltage, Volts)]
        : [new(ParameterKind.Voltage, Volts), new(ParameterKind.Resistance, SourceOhms)];

    public override void Describe(PartElements elements, string? setting) =>
        elements.Add(new VoltageBranch(0, 1, Coefficient.Of(0), SourceOhms is null ? default : Coefficient.Of(1), IsSupply: true));
}
