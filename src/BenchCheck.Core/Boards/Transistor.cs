using System.Collections.Immutable;
using BenchCheck.Core.Quantities;

namespace BenchCheck.Core.Boards;

/// <summary>A bipolar transistor, npn or pnp, as two junctions and the collector current that they control.</summary>
/// <remarks>
/// Transport form (Ebers and Moll, Proc. IRE 42 (1954)): with z_F and z_R the currents that the base-emitter and the base-collector junction
/// control, i_C = z_F − z_R − z_R/β_R and i_B = z_F/β + z_R/β_R. Active: z_R = 0, so i_C = β i_B. Off: both zero. Saturated: both
/// conduct, so the collector-emitter voltage is the difference of the two drops and i_C/i_B is less than β.
/// </remarks>
/// <param name="Drop">base-emitter voltage at a collector current of <see cref="ReferenceAmperes"/>, positive for both polarities</param>
/// <param name="Saturation">collector-emitter voltage in saturation under the constant-drop law, positive for both polarities</param>
public sealed record Transistor(PartKind Kind, string Designator, ImmutableArray<string> Nodes, Nominal Gain, Nominal Drop, Nominal Saturation)
    : Part(Kind, Designator, Nodes)
{
    public static readonly PartKind Npn = new("npn", ["collector", "base", "emitter"], "Q");
    public static readonly PartKind Pnp = new("pnp", ["collector", "base", "emitter"], "Q");

    public const int Collector = 0;
    public const int Base = 1;
    public const int Emitter = 2;

    /// <summary>Base-emitter voltage at 1 mA taken when none is stated: common practice, no source.</summary>
    public static readonly Nominal UsualDrop = Nominal.Within(0.65, Tolerance.Absolute(0.12));

    /// <summary>Collector-emitter saturation voltage taken when none is stated; data sheets of small types give 0.05 V to 0.25 V.</summary>
    public static readonly Nominal UsualSaturation = Nominal.Within(0.12, Tolerance.Absolute(0.1));

    /// <summary>Gain of a small transistor of unstated type: plausibility band, common practice, no source.</summary>
    public static readonly Nominal UsualGain = Nominal.Between(40, 600);

    /// <summary>Reverse gain of a small transistor: common practice, no source.</summary>
    public static readonly Nominal UsualReverseGain = Nominal.Between(0.5, 10);

    /// <summary>Emission coefficient with what the temperature of the junctions adds to it: common practice, no source.</summary>
    private static readonly Nominal UsualIdeality = Nominal.Within(1.02, Tolerance.Percent(4));

    /// <summary>Emitter lead, and base resistance over the gain, as the collector current meets them: common practice, no source.</summary>
    private static readonly Nominal UsualSeriesOhms = Nominal.Between(0.1, 2);

    /// <summary>Collector current at which gain and drop are stated; null when none is, which then means 1 mA for the drop.</summary>
    public double? StatedAmperes { get; init; }

    public double ReferenceAmperes => StatedAmperes ?? UsualAmperes;

    private const double UsualAmperes = 1e-3;

    /// <summary>Resistance between collector and emitter at the operating point, as small signals meet it; null when it is left out.</summary>
    public Nominal? OutputOhms { get; init; }

    public bool IsNpn => ReferenceEquals(Kind, Npn);

    public override ImmutableArray<PartParameter> Parameters =>
    [
        new(ParameterKind.Gain, Gain), new(ParameterKind.Drop, Drop), new(ParameterKind.ReverseGain, UsualReverseGain),
        new(ParameterKind.Offset, Saturation), new(ParameterKind.Ideality, UsualIdeality),
        new(ParameterKind.SeriesResistance, UsualSeriesOhms),
        .. OutputOhms is null ? ImmutableArray<PartParameter>.Empty : [new(ParameterKind.OutputResistance, OutputOhms)],
    ];

    public override void Describe(PartElements elements, string? setting)
    {
        var drop = Coefficient.Of(1);
        var less = Coefficient.Of(3, -1);
        var (forward, reverse, ideality, series) = (Coefficient.Of(0), Coefficient.Of(2), Coefficient.Of(4), Coefficient.Of(5));
        if (IsNpn)
        {
            elements.Add(new Junction(Base, Emitter, drop, default, forward, Collector, Emitter, ReferenceAmperes, ideality, series, JunctionRole.BaseEmitter));
            elements.Add(new Junction(Base, Collector, drop, less, reverse, Emitter, Collector, ReferenceAmperes, ideality, series, JunctionRole.BaseCollector));
        }
        else
        {
            elements.Add(new Junction(Emitter, Base, drop, default, forward, Emitter, Collector, ReferenceAmperes, ideality, series, JunctionRole.BaseEmitter));
            elements.Add(new Junction(Collector, Base, drop, less, reverse, Collector, Emitter, ReferenceAmperes, ideality, series, JunctionRole.BaseCollector));
        }
    }

    public override void DescribeSmallSignal(PartElements elements, string? setting)
    {
        Describe(elements, setting);
        if (OutputOhms is not null) elements.Add(new Conductor(Collector, Emitter, Coefficient.Of(6)));
    }
}
