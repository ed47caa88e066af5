using System.Collections.Immutable;
using BenchCheck.Core.Quantities;

namespace BenchCheck.Core.Boards;

/// <summary>An op-amp: v(output) = gain · (v(plus) − v(minus) + offset) between limits set by its supply pins; ideal when no gain is stated.</summary>
/// <param name="Headroom">volts that the output keeps from either supply pin</param>
public sealed record OpAmp(string Designator, ImmutableArray<string> Nodes, Nominal? Gain, Nominal Offset, double Headroom)
    : Part(PartKind, Designator, Nodes)
{
    public static readonly PartKind PartKind = new("opamp", ["plus", "minus", "output", "positive_supply", "negative_supply"], "U");

    /// <summary>Input offset taken when none is stated: 5 mV either way, common practice, no source.</summary>
    public static readonly Nominal UsualOffset = Nominal.Within(0, Tolerance.Absolute(5e-3));

    /// <summary>Volts between output limit and supply pin taken when none are stated: common practice, no source.</summary>
    public const double UsualHeadroom = 1.5;

    public override ImmutableArray<PartParameter> Parameters => Gain is null
        ? [new(ParameterKind.Offset, Offset)]
        : [new(ParameterKind.Offset, Offset), new(ParameterKind.Gain, Gain)];

    public override void Describe(PartElements elements, string? setting)
    {
        elements.Add(new AmplifierBranch(0, 1, 2, Coefficient.Of(0), Gain is null ? default : Coefficient.Of(1)));
        elements.Add(new Limit(2, 3, Coefficient.Constant(Headroom), true));
        elements.Add(new Limit(2, 4, Coefficient.Constant(Headroom), false));
    }
}
