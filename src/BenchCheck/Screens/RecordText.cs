using System.Collections.Immutable;
using System.Globalization;
using BenchCheck.Commands.Log;
using BenchCheck.Files;
using BenchCheck.Records;

namespace BenchCheck.Screens;

/// <summary>A filed record as the screen shows it.</summary>
internal static class RecordText
{
    private const int MostSuspects = 6;

    /// <summary>"2026-03-01 09:30  0042  disagrees", for a list.</summary>
    public static string Line(LogEntry entry) => $"{Time(entry)}  {entry.Verdict}{(entry.Serial is { } serial ? $"  serial {serial}" : "")}";

    public static ImmutableArray<ScreenLine> Lines(LogRecord record, ResultSummary result, int width)
    {
        var lines = ImmutableArray.CreateBuilder<ScreenLine>();
        var entry = record.Entry;
        lines.AddRange(ScreenLine.Paragraph(result.Board + (result.Serial is null ? "" : $", serial {result.Serial}"), width, Tone.Strong));
        lines.AddRange(ScreenLine.Paragraph(result.Reason, width, Tone.Plain, $"{entry.Verdict.ToUpperInvariant()}  "));
        lines.AddRange(ScreenLine.Paragraph($"filed {FiledRecords.Time(entry)} UTC by {entry.Program}", width, Tone.Dim));
        lines.Add(ScreenLine.Empty);
        lines.Add(Row("condition", "at", "measured", "predicted", "En", "verdict", Tone.Dim));
        foreach (var r in result.Readings)
        {
            lines.Add(Row(
                r.Condition, FiledRecords.Place(r, result.Reference), FiledRecords.Text(r.Measured, r.Unit), FiledRecords.Text(r.Predicted, r.Unit), Words.En(r.En), r.Verdict,
                r.Verdict switch { "in" => Tone.Plain, "out" => Tone.Bad, _ => Tone.Doubt }));
        }

        if (!result.Suspects.IsEmpty) lines.AddRange(ScreenLine.Empty, ScreenLine.Of("Suspects", Tone.Strong));
        foreach (var suspect in result.Suspects.Take(MostSuspects)) lines.AddRange(ScreenLine.Paragraph(suspect.Text, width, Tone.Plain, $"{Words.Percent(suspect.Probability),5} "));
        lines.AddRange(ScreenLine.Empty, ScreenLine.Of("Estimates", Tone.Strong));
        foreach (var e in result.Parameters.Where(e => e.Determined != "no"))
            lines.Add(ScreenLine.Cells(new Cell(e.Name, 22), new Cell(FiledRecords.Text(e), 20, IsRight: true), new Cell($"listed {FiledRecords.Limits(e)}", 26, Tone.Dim)));
        lines.Add(ScreenLine.Empty);
        lines.AddRange(ScreenLine.Paragraph(entry.Hash, width, Tone.Dim, "hash "));
        lines.AddRange(ScreenLine.Paragraph($"benchcheck log again {entry.Number.ToString(CultureInfo.InvariantCulture)} checks it anew; log compare and log trend set records side by side.", width, Tone.Dim));
        return lines.ToImmutable();
    }

    private static string Time(LogEntry entry) => FiledRecords.Time(entry) is { Length: >= 16 } time ? time[..16] : FiledRecords.Time(entry);

    private static ScreenLine Row(string condition, string at, string measured, string predicted, string en, string verdict, Tone tone) => ScreenLine.Cells(
        new Cell(condition, 12, tone == Tone.Dim ? tone : Tone.Plain), new Cell(at, 20, tone == Tone.Dim ? tone : Tone.Plain), new Cell(measured, 11, tone == Tone.Dim ? tone : Tone.Plain, true),
        new Cell(predicted, 11, tone == Tone.Dim ? tone : Tone.Plain, true), new Cell(en, 6, tone, true), new Cell(verdict, 10, tone));
}
