using System.Collections.Immutable;
using BenchCheck.Core.Boards;
using BenchCheck.Core.Checking;
using BenchCheck.Core.Metering;

namespace BenchCheck.Plots.Tests;

/// <summary>Results of checks as the pictures and the report receive them, built by hand.</summary>
internal static class Checks
{
    public const string Hostile = "<script>alert(1)</script>\u001b[31m\u202Eexe.\u0000\"'&]]>";

    public static readonly CheckResult Healthy = Of(
        BoardVerdict.Agrees,
        [
            Volts("VCC", 12.02, 12, 0.11), Volts("B1", 2.013, 1.973, 0.12), Volts("C1", 6.610, 6.771, 0.74),
            Taken(ReadingQuantity.Current, "R3", null, 0.002874, 0.002905, 0.0004), Taken(ReadingQuantity.Resistance, "B1", "GND", 8213, 8246, 330),
        ]);

    public static readonly CheckResult Faulty = Of(
        BoardVerdict.Disagrees,
        [Volts("VCC", 12.02, 12, 0.11), Volts("B1", 2.1, 1.973, 0.12), Volts("C1", 11.16, 6.771, 0.74) with { NormalisedResidual = 34.2 }, Volts("E1", 1.467, 1.299, 0.15) with { NormalisedResidual = double.NaN }]);

    public static readonly CheckResult Empty = Of(BoardVerdict.Undecided, []);

    public static readonly CheckResult Sixty = Of(
        BoardVerdict.Agrees, [.. Enumerable.Range(1, 60).Select(i => Volts($"N{i}", 5 + 0.01 * i, 5 + 0.012 * i, 0.2))]);

    public static readonly CheckResult Odd = Of(
        BoardVerdict.Undecided,
        [
            Volts(Hostile + new string('W', 500), 1, 1, 0.1), Volts("", double.MaxValue, -double.MaxValue, 1e-300), Volts("节点", 0, 0, 0),
            Volts("C1", 1, double.NaN, double.NaN), Volts("E1", 1, double.PositiveInfinity, 1),
        ]) with
    {
        BoardTitle = Hostile, Serial = Hostile, Reason = Hostile, Cautions = [Hostile], Assumed = [Hostile], Remarks = [Hostile],
        Parameters =
        [
            Fitted(Hostile, ParameterKind.Resistance, double.NaN, double.NaN, double.NaN, 0, double.NaN, 0, double.PositiveInfinity, Determination.No),
            Fitted("R2", ParameterKind.Resistance, 1e3, 1e3, 1e3, 1e3, 0, 1e3, 1e3, Determination.Yes),
        ],
    };

    public static CheckResult Of(BoardVerdict verdict, ImmutableArray<ReadingResult> readings) => new()
    {
        BoardTitle = "Circulation-fan stage",
        Reference = "GND",
        Serial = "0041",
        Verdict = verdict,
        Reason = "The readings are what a healthy board may show (chance of worse: 62 %).",
        ChiSquared = 4.2,
        DegreesOfFreedom = readings.Length,
        PValue = 0.62,
        Readings = readings,
        Parameters =
        [
            Fitted("R1", ParameterKind.Resistance, 47e3, 44.65e3, 49.35e3, 48.2e3, 600, 47.1e3, 49.4e3, Determination.Partly),
            Fitted("R4", ParameterKind.Resistance, 470, 446.5, 493.5, 4680, 70, 4550, 4820, Determination.Yes),
            Fitted("Q1", ParameterKind.Gain, 173, 100, 300, 190, 60, 95, 380, Determination.No),
            Fitted("R9", ParameterKind.Resistance, double.NaN, double.NaN, double.NaN, 1200, 30, 1140, 1260, Determination.Yes),
        ],
        States = [new DeviceState("Q1", "powered", "active")],
        Dissipation = [new Dissipation("R3", "powered", 0.31, 0.25)],
        Cautions = Cautions.Usual,
        Assumed = ["C1: 20 % tolerance taken"],
    };

    public static ReadingResult Volts(string at, double measured, double predicted, double expanded) => Taken(ReadingQuantity.Voltage, at, "GND", measured, predicted, expanded);

    public static ReadingResult Taken(ReadingQuantity quantity, string at, string? against, double measured, double predicted, double expanded)
    {
        var difference = measured - predicted;
        var en = difference / expanded;
        var verdict = Math.Abs(en) <= 1 ? ReadingVerdict.In : Math.Abs(en) <= 1.4 ? ReadingVerdict.Doubtful : ReadingVerdict.Out;
        return new ReadingResult(
            new Reading([2], "powered", quantity, at, against, measured), expanded / 8, predicted, predicted - 0.9 * expanded, predicted + 0.9 * expanded,
            difference, en, verdict, measured - difference / 4, en / 2) { ExpandedUncertainty = expanded };
    }

    private static Estimate Fitted(
        string part, ParameterKind kind, double nominal, double nominalLow, double nominalHigh, double value, double uncertainty, double low, double high, Determination determined) =>
        new(part, kind, null, nominal, nominalLow, nominalHigh, value, uncertainty, low, high, determined);
}
