using System.Collections.Immutable;
using BenchCheck.Core.Quantities;

namespace BenchCheck.Core.Checking;

/// <summary>The usual cautions for work on live circuits, stronger where a voltage is hazardous.</summary>
/// <remarks>
/// Limits: 60 V DC, 30 V RMS, 42.4 V peak (IEC 61010-1:2010 with amendment 1:2016, clause 6.3.1, from memory; hand-held meter manuals warn at the
/// same figures). Bench habits: common practice, no source.
/// </remarks>
public static class Cautions
{
    public const double HazardousVoltsDc = 60;

    public const double HazardousVoltsRms = 30;

    public static readonly ImmutableArray<string> Usual =
    [
        "Measure resistance only with the supplies removed and the capacitors discharged.",
        "Use probes and a meter rated for the highest voltage present; keep one hand clear of the board.",
        "Local rules come first; work on mains circuits is for a licensed person.",
    ];

    /// <param name="volts">highest voltage predicted or measured anywhere on the board, against the reference</param>
    public static ImmutableArray<string> For(double volts, string place) => Math.Abs(volts) > HazardousVoltsDc
        ?
        [
            $"HAZARDOUS VOLTAGE: {EngineeringNotation.Format(Math.Abs(volts), Unit.Volt)} at {place}, above {HazardousVoltsDc} V DC. "
            + "Do not touch the live board; isolate, discharge and check it dead before any work; a second person present.",
            .. Usual,
        ]
        : Usual;

    /// <summary>The strong caution for a signal; null where it is not hazardous.</summary>
    /// <param name="volts">RMS</param>
    public static string? ForSignal(double volts, string place) => Math.Abs(volts) <= HazardousVoltsRms
        ? null
        : $"HAZARDOUS VOLTAGE: a signal of {EngineeringNotation.Format(Math.Abs(volts), Unit.Volt)} at {place}, above {HazardousVoltsRms} V RMS. "
            + "Do not touch the live board; switch the generator down before any work.";

    public static bool IsHazardous(double volts) => Math.Abs(volts) > HazardousVoltsDc;
}
