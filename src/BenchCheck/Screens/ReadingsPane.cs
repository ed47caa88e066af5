using System.Collections.Immutable;
using BenchCheck.Core.Metering;
using BenchCheck.Core.Quantities;

namespace BenchCheck.Screens;

/// <summary>The readings table: measured beside prediction, band, difference, En and verdict.</summary>
internal static class ReadingsPane
{
    /// <summary>Width from which the value after the fit and the note have room too.</summary>
    private const int Wide = 104;

    public static ImmutableArray<ScreenLine> Lines(BenchSession session, int width, int height)
    {
        var rows = session.Rows;
        var chosen = session.Suspect is { } s && session.Result is { } result && s < result.Suspects.Length ? result.Suspects[s] : null;
        var lines = ImmutableArray.CreateBuilder<ScreenLine>(height);
        lines.Add(Line(width, "  at", "measured", "predicted", chosen is null ? "band" : "this suspect says", "difference", "En", "verdict", "after fit", "note", Tone.Dim, Tone.Dim));
        var first = FirstRow(session, height);
        foreach (var row in rows.Skip(first).Take(height - 1))
        {
            var isCursor = row.Place == session.Cursor;
            var line = Row(session, row, chosen?.Explained ?? [], chosen is not null, isCursor, width);
            lines.Add(isCursor ? line.AsChosen() : line);
        }

        if (rows.IsEmpty) lines.Add(ScreenLine.Of("  No node is read one by one in this condition; add a reading with F6, or change the condition with F5.", Tone.Dim));
        return lines.ToImmutable();
    }

    /// <summary>Position of the row drawn first under the heading, so that the cursor stays in sight.</summary>
    public static int FirstRow(BenchSession session, int height) =>
        Math.Clamp(session.RowIndex - (height - 1) / 2, 0, Math.Max(0, session.Rows.Length - (height - 1)));

    private static ScreenLine Row(BenchSession session, ReadingRow row, ImmutableArray<double> explained, bool hasSuspect, bool isCursor, int width)
    {
        var unit = row.Place.Quantity.Unit();
        var name = (isCursor ? "> " : "  ") + (width < Wide ? row.Place.ShortName(session.Bench.Board) : row.Place.Name(session.Bench.Board));
        if (row.Reading is not { } reading)
        {
            return row.Expected is { } e
                ? Line(width, name, "-", Words.Number(e.Value, unit), hasSuspect ? "" : Words.Band(e.Low, e.High, unit), "", "", Mark(session, row.Place), "", "", Tone.Dim, Tone.Dim)
                : Line(width, name, "-", "", "", "", "", Mark(session, row.Place), "", "", Tone.Dim, Tone.Dim);
        }

        var measured = Words.Number(reading.Value, unit) + (reading.Repeats > 1 ? $" x{reading.Repeats}" : "");
        if (row.Result is not { } r) return Line(width, name, measured, "", "", "", "", "checking", "", reading.Note ?? "", Tone.Plain, Tone.Dim);
        var (word, tone) = Words.Of(r.Verdict);
        var position = session.Result!.Readings.IndexOf(r);
        var band = !hasSuspect ? Words.Band(r.BandLow, r.BandHigh, unit)
            : position >= 0 && position < explained.Length ? Words.Number(explained[position], unit) : "";
        return Line(width, name, measured, Words.Number(r.Predicted, unit), band, Words.Signed(r.Difference, unit), Words.En(r.En), word, Words.Number(r.Fitted, unit), reading.Note ?? "", Tone.Plain, tone);
    }

    private static string Mark(BenchSession session, Place place) => session.Suggested == place ? "next <" : "";

    private static ScreenLine Line(
        int width, string at, string measured, string predicted, string band, string difference, string en, string verdict, string fitted, string note, Tone plain, Tone tone)
    {
        if (width < Wide)
        {
            // What the eye compares goes last: first the difference gives way, then the band.
            var (hasBand, hasDifference) = (width >= 68, width >= 80);
            var narrow = Math.Max(8, width - 40 - (hasBand ? 18 : 0) - (hasDifference ? 11 : 0));
            return ScreenLine.Cells(
            [
                new Cell(at, narrow, plain), new Cell(measured, 11, plain, true), new Cell(predicted, 9, plain, true),
                .. hasBand ? [new Cell(band, 17, plain, true)] : Array.Empty<Cell>(), .. hasDifference ? [new Cell(difference, 10, plain, true)] : Array.Empty<Cell>(),
                new Cell(en, 5, tone, true), new Cell(verdict, 10, tone),
            ]);
        }

        var place = Math.Min(26, 14 + (width - Wide) / 3);
        return ScreenLine.Cells(
            new Cell(at, place, plain), new Cell(measured, 12, plain, true), new Cell(predicted, 10, plain, true), new Cell(band, 18, plain, true),
            new Cell(difference, 10, plain, true), new Cell(en, 6, tone, true), new Cell(verdict, 10, tone), new Cell(fitted, 10, plain, true), new Cell(note, Math.Max(4, width - place - 84), plain));
    }
}
