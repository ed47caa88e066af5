using System.Collections.Immutable;
using System.Globalization;
using BenchCheck.Core.Checking;
using BenchCheck.Core.Metering;
using BenchCheck.Core.Quantities;

namespace BenchCheck.Screens;

/// <summary>The reading at the cursor: what it should be and why, which parts move it, what each suspect makes of it.</summary>
internal static class DetailPane
{
    private const int MostParts = 6;
    private const int MostSuspects = 6;

    public static ImmutableArray<ScreenLine> Lines(BenchSession session, int width)
    {
        var lines = ImmutableArray.CreateBuilder<ScreenLine>();
        if (session.Row is not { } row) return [ScreenLine.Of("No reading chosen.", Tone.Dim)];
        var unit = row.Place.Quantity.Unit();
        lines.Add(ScreenLine.Of($"{row.Place.Name(session.Bench.Board)}, {row.Place.Condition}", Tone.Strong));
        foreach (var (text, tone) in Comparison(row, unit)) lines.AddRange(ScreenLine.Paragraph(text, width, tone));
        lines.AddRange(Suspects(session, row, unit, width));
        if (row.Reading is { } reading) lines.AddRange(ScreenLine.Paragraph(Taken(reading, session.Bench, row.Result, unit), width, Tone.Dim, "Taken     "));
        var influences = row.Result?.Influences ?? row.Expected?.Influences ?? [];
        if (!influences.IsDefaultOrEmpty)
        {
            lines.AddRange(ScreenLine.Paragraph(
                string.Join("; ", influences.Take(MostParts).Select(i => Moves(i, unit))), width, Tone.Plain, "Moved by  "));
        }

        return lines.ToImmutable();
    }

    private static IEnumerable<(string Text, Tone Tone)> Comparison(ReadingRow row, Unit unit)
    {
        if (row.Result is { } r)
        {
            yield return ($"Measured {Words.Number(r.Reading.Value, unit)}; nominal parts give {Words.Number(r.Predicted, unit)} on this meter; tolerances allow "
                + $"{Words.Band(r.BandLow, r.BandHigh, unit)}.", Tone.Plain);
            var (word, tone) = Words.Of(r.Verdict);
            yield return ($"Difference {Words.Signed(r.Difference, unit)}, En {Words.En(r.En)}: {word.TrimEnd('!', '?', ' ')}. After the fit the board gives {Words.Number(r.Fitted, unit)}"
                + (double.IsFinite(r.NormalisedResidual) ? $", a normalised residual of {Words.En(r.NormalisedResidual)}." : "."), tone);
        }
        else if (row.Reading is { } reading)
        {
            yield return ($"Measured {Words.Number(reading.Value, unit)}; the check is running.", Tone.Plain);
        }
        else if (row.Expected is { } e)
        {
            yield return ($"Not read yet. A healthy board shows {Words.Number(e.Value, unit)}; tolerances allow {Words.Band(e.Low, e.High, unit)}.", Tone.Plain);
        }
        else
        {
            yield return ("Not read yet.", Tone.Plain);
        }
    }

    private static string Moves(Influence influence, Unit unit)
    {
        var step = influence.Parameter.IsRatioScale ? "+1 %" : "+10 mV";
        return $"{influence.Part} {influence.Parameter} {Words.Percent(influence.Share)} of the band ({step}: {Words.Signed(influence.PerUnit, unit)})";
    }

    private static IEnumerable<ScreenLine> Suspects(BenchSession session, ReadingRow row, Unit unit, int width)
    {
        if (session.Result is not { } result) yield break;
        var says = new List<string>();
        var position = row.Result is { } r ? result.Readings.IndexOf(r) : -1;
        if (position >= 0)
        {
            says.AddRange(result.Suspects.Where(s => position < s.Explained.Length).Take(MostSuspects)
                .Select(s => $"{s.Fault.Text}: {Words.Number(s.Explained[position], unit)}"));
        }
        else if (result.Next.FirstOrDefault(n => Place.Of(n, session.Bench.Board) == row.Place) is { } next)
        {
            says.AddRange(next.Expect.Where(e => e.Suspect >= 0 && e.Suspect < result.Suspects.Length).Take(MostSuspects).Select(e =>
                $"{result.Suspects[e.Suspect].Fault.Text}: {EngineeringNotation.FormatWithUncertainty(e.Value, e.StandardUncertainty, unit)}"));
        }

        if (says.Count == 0) yield break;
        foreach (var line in ScreenLine.Paragraph(string.Join("; ", says), width, Tone.Plain, "If it is  ")) yield return line;
    }

    private static string Taken(Reading reading, Bench bench, ReadingResult? result, Unit unit)
    {
        var meter = bench.MeterOf(reading).Name;
        var repeats = reading.Repeats > 1 ? $", mean of {reading.Repeats} repeats" : "";
        var doubt = result is null ? "" : $", standard uncertainty {EngineeringNotation.Format(result.StandardUncertainty, unit, 2)}";
        var time = reading.Time is { } t ? t.ToString(", yyyy-MM-dd HH:mm", CultureInfo.InvariantCulture) : "";
        var note = reading.Note is null ? "" : $", note: {reading.Note}";
        return $"with {meter}{repeats}{doubt}{time}{note}";
    }
}
