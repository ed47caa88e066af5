using System.Collections.Immutable;
using BenchCheck.Core.Quantities;

namespace BenchCheck.Core.Boards;

/// <summary>One of the four linear controlled sources: gain · control between plus and minus.</summary>
/// <remarks>A controlled voltage makes v(plus) − v(minus); a controlled current leaves the plus pin into the board.</remarks>
public sealed record ControlledSource(PartKind Kind, string Designator, ImmutableArray<string> Nodes, Nominal Gain, Control Control)
    : Part(Kind, Designator, Nodes)
{
    public static readonly PartKind VoltageByVoltage = new("vcvs", ["plus", "minus"], "E");
    public static readonly PartKind CurrentByVoltage = new("vccs", ["plus", "minus"], "G");
    public static readonly PartKind VoltageByCurrent = new("ccvs", ["plus", "minus"], "H");
    public static readonly PartKind CurrentByCurrent = new("cccs", ["plus", "minus"], "F");

    public override ImmutableArray<PartParameter> Parameters =>
    [
        new(ReferenceEquals(Kind, CurrentByVoltage) ? ParameterKind.Transconductance
            : ReferenceEquals(Kind, VoltageByCurrent) ? ParameterKind.Resistance
            : ParameterKind.Gain, Gain),
    ];

    public override void Describe(PartElements elements, string? setting)
    {
        if (ReferenceEquals(Kind, VoltageByVoltage) || ReferenceEquals(Kind, VoltageByCurrent))
            elements.Add(new VoltageBranch(0, 1, default, default, Control, Coefficient.Of(0)));
        else
            elements.Add(new CurrentBranch(1, 0, default, Control, Coefficient.Of(0)));
    }
}
