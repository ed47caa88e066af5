using System.Collections.Immutable;
using BenchCheck.Core.Quantities;

namespace BenchCheck.Core.Boards;

/// <summary>A diode, an LED or, with a breakdown voltage, a zener.</summary>
/// <param name="Drop">forward voltage at <see cref="ReferenceAmperes"/></param>
/// <param name="Breakdown">reverse voltage at which a zener conducts; null for the other kinds</param>
public sealed record Diode(PartKind Kind, string Designator, ImmutableArray<string> Nodes, Nominal Drop, Nominal? Breakdown = null)
    : Part(Kind, Designator, Nodes)
{
    public static readonly PartKind Plain = new("diode", ["anode", "cathode"], "D");
    public static readonly PartKind Led = new("led", ["anode", "cathode"], "D");
    public static readonly PartKind Zener = new("zener", ["anode", "cathode"], "D");

    /// <summary>Forward voltage of a silicon junction at 1 mA taken when none is stated: common practice, no source.</summary>
    public static readonly Nominal UsualDrop = Nominal.Within(0.65, Tolerance.Absolute(0.12));

    /// <summary>Forward voltage of an indicator LED of unstated colour: common practice, no source.</summary>
    public static readonly Nominal UsualLedDrop = Nominal.Between(1.6, 3.4);

    /// <summary>Emission coefficients met in small diodes and LEDs, and the softness of a zener's knee: common practice, no source.</summary>
    private static readonly Nominal UsualIdeality = Nominal.Within(1.1, Tolerance.Percent(60));

    private static readonly Nominal UsualLedIdeality = Nominal.Within(2, Tolerance.Percent(25));
    private static readonly Nominal UsualSeriesOhms = Nominal.Between(0.1, 3);
    private static readonly Nominal UsualLedSeriesOhms = Nominal.Between(1, 12);
    private static readonly Nominal UsualKnee = Nominal.Between(0.8, 3.2);

    /// <summary>Current at which a zener's breakdown is stated; where none is, 5 mA: common practice, no source.</summary>
    public double BreakdownAmperes { get; init; } = 5e-3;

    /// <summary>Current at which the forward voltage is stated: 1 mA for a silicon junction, 5 mA for an LED.</summary>
    public double ReferenceAmperes { get; init; } = ReferenceEquals(Kind, Led) ? 5e-3 : 1e-3;

    public override ImmutableArray<PartParameter> Parameters
    {
        get
        {
            PartParameter drop = new(ParameterKind.Drop, Drop);
            PartParameter ideality = new(ParameterKind.Ideality, ReferenceEquals(Kind, Led) ? UsualLedIdeality : UsualIdeality);
            PartParameter series = new(ParameterKind.SeriesResistance, ReferenceEquals(Kind, Led) ? UsualLedSeriesOhms : UsualSeriesOhms);
            return Breakdown is null
                ? [drop, ideality, series]
                : [drop, ideality, series, new(ParameterKind.Breakdown, Breakdown), new(ParameterKind.Ideality, UsualKnee)];
        }
    }

    public override void Describe(PartElements elements, string? setting)
    {
        var one = Coefficient.Constant(1);
        elements.Add(new Junction(0, 1, Coefficient.Of(0), default, one, -1, -1, ReferenceAmperes, Coefficient.Of(1), Coefficient.Of(2), JunctionRole.Forward));
        if (Breakdown is not null)
            elements.Add(new Junction(1, 0, Coefficient.Of(3), default, one, -1, -1, BreakdownAmperes, Coefficient.Of(4), Coefficient.Of(2), JunctionRole.Breakdown));
    }
}
