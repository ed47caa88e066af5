using System.CommandLine;
using System.Globalization;
using BenchCheck.Core.Quantities;
using BenchCheck.Files;
using BenchCheck.Records;
using Spectre.Console;

namespace BenchCheck.Commands.Log;

/// <summary>How commands ask for records and show them.</summary>
internal static class FiledRecords
{
    public static Argument<long> Number(string name) => new(name) { Description = "Number of a record, as log list shows it." };

    /// <summary>The record, with its result read; null when there is none, which is then said.</summary>
    public static (LogRecord Record, ResultSummary Result)? Find(BenchLog log, long number, Terminal terminal)
    {
        if (log.Find(number) is not { } record) terminal.Error.WriteLine($"there is no record {number}; log list shows what there is");
        else if (ResultSummary.Parse(record.Result) is not { } result) terminal.Error.WriteLine($"the result of record {number} is not one that this program can read; log export gives it as it is");
        else return (record, result);
        return null;
    }

    /// <summary>"2026-03-01 09:30:12".</summary>
    public static string Time(LogEntry entry) => entry.FiledAt.Length >= 19 ? entry.FiledAt[..19].Replace('T', ' ') : entry.FiledAt;

    /// <summary>When it was filed; null where that cannot be read.</summary>
    public static DateTimeOffset? Instant(LogEntry entry) =>
        DateTimeOffset.TryParse(entry.FiledAt, CultureInfo.InvariantCulture, DateTimeStyles.AssumeUniversal, out var time) ? time : null;

    public static Style StyleOf(string verdict) => verdict switch
    {
        "agrees" or "in" => new Style(Color.Green),
        "disagrees" or "out" => new Style(Color.Red, decoration: Decoration.Bold),
        _ => new Style(Color.Yellow),
    };

    public static string Place(FiledReading reading, string reference) =>
        (reading.Quantity == "voltage" ? "" : reading.Quantity + " ") + reading.At + (reading.Against is null || reading.Against == reference ? "" : $" to {reading.Against}");

    /// <summary>The number with its unit, as every table writes it.</summary>
    public static string Text(double value, string unit) => EngineeringNotation.Format(value, UnitOf(unit));

    public static string Text(FiledEstimate estimate) => EngineeringNotation.FormatWithUncertainty(estimate.Value, estimate.StandardUncertainty, UnitOf(estimate.Unit));

    public static string Limits(FiledEstimate estimate) =>
        double.IsNaN(estimate.NominalLow) ? "?" : EngineeringNotation.Range(estimate.NominalLow, estimate.NominalHigh, UnitOf(estimate.Unit));

    public static Unit UnitOf(string symbol) => new(symbol);
}
