using System.Collections.Immutable;
using BenchCheck.Core.Quantities;

namespace BenchCheck.Core.Boards;

/// <summary>A three-terminal regulator of a fixed positive voltage between output and common.</summary>
/// <remarks>
/// An inner node is fed from the input by the regulator's own current and held down by two ideal clamps: at the stated voltage above common,
/// and at the drop-out voltage below the input. The output follows that node through a stage that can only deliver current, so it
/// regulates, drops out, or is off.
/// </remarks>
/// <param name="DropOut">least voltage between input and output at which it still regulates</param>
/// <param name="IdleAmperes">its own current, from input to common</param>
public sealed record Regulator(string Designator, ImmutableArray<string> Nodes, Nominal Volts, Nominal DropOut, Nominal IdleAmperes)
    : Part(PartKind, Designator, Nodes)
{
    public static readonly PartKind PartKind = new("regulator", ["input", "output", "common"], "U");

    public const int Input = 0;
    public const int Output = 1;
    public const int Common = 2;

    /// <summary>Drop-out taken when none is stated: from low-drop types to the classic ones; common practice, no source.</summary>
    public static readonly Nominal UsualDropOut = Nominal.Between(0.8, 2.2);

    /// <summary>Current of its own taken when none is stated: common practice, no source.</summary>
    public static readonly Nominal UsualIdleAmperes = Nominal.Between(2e-3, 8e-3);

    /// <summary>Ties the inner node, beside the current that feeds it; too large to be seen from outside.</summary>
    private const double FeedOhms = 1e6;

    /// <summary>How little of the output current the inner node has to give.</summary>
    private const double StageGain = 1e6;

    public override ImmutableArray<PartParameter> Parameters =>
        [new(ParameterKind.Voltage, Volts), new(ParameterKind.DropOut, DropOut), new(ParameterKind.IdleCurrent, IdleAmperes)];

    public override void Describe(PartElements elements, string? setting)
    {
        var inner = elements.AddInnerNode(PartKind.Pins.Length);
        var (one, none) = (Coefficient.Constant(1), default(Coefficient));
        elements.Add(new Conductor(Input, inner, Coefficient.Constant(FeedOhms)));
        elements.Add(new CurrentBranch(Input, inner, Coefficient.Of(2)));
        elements.Add(new Junction(inner, Common, Coefficient.Of(0), none, one, -1, -1, 1, none, none, JunctionRole.Reference));
        elements.Add(new Junction(inner, Input, Coefficient.Of(1, -1), none, one, -1, -1, 1, none, none, JunctionRole.DropOut));
        elements.Add(new Junction(inner, Output, none, none, Coefficient.Constant(StageGain), Input, Output, 1, none, none, JunctionRole.Delivery));
    }
}
