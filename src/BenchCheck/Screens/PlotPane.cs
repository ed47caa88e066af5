using System.Collections.Immutable;
using System.Text;
using BenchCheck.Core.Checking;
using BenchCheck.Core.Metering;

namespace BenchCheck.Screens;

/// <summary>The readings as a picture in text: where each stands against its band, and its normalised residual after the fit.</summary>
internal static class PlotPane
{
    private const int NameWidth = 14;
    private const double WidestEn = 3;
    private const double WidestResidual = 4;
    private const string Key = "= band of the parts   [ ] limits   o in   ? doubtful   X out   < > off the scale";

    /// <summary>The readings of the condition at the cursor. Rows that do not fit are left out; the cursor's is kept in sight.</summary>
    public static ImmutableArray<ScreenLine> Lines(BenchSession session, int width, int height)
    {
        ReadingResult[] readings = [.. (session.Result?.Readings ?? []).Where(r => r.Reading.Condition == session.Condition)];
        if (readings.Length == 0)
            return [ScreenLine.Of($"Nothing read in the condition {session.Condition} yet: there is nothing to plot. F5 goes to the next condition.", Tone.Dim)];
        var lines = ImmutableArray.CreateBuilder<ScreenLine>();
        var half = Math.Max(10, (width - NameWidth - 2) / 2);
        lines.Add(ScreenLine.Cells(new Cell(session.Condition, NameWidth, Tone.Strong), new Cell("measured against its band", half, Tone.Strong), new Cell("residual after the fit", half, Tone.Strong)));
        lines.Add(ScreenLine.Cells(new Cell("", NameWidth), new Cell(Axis(half, "-3 En", "0", "+3 En"), half, Tone.Dim), new Cell(Axis(half, "-4 sd", "0", "+4 sd"), half, Tone.Dim)));
        var room = Math.Max(1, height - 4);
        var at = Math.Max(0, Array.FindIndex(readings, r => Place.Of(r.Reading, session.Bench.Board) == session.Cursor));
        var first = Math.Clamp(at - room / 2, 0, Math.Max(0, readings.Length - room));
        for (var i = first; i < Math.Min(readings.Length, first + room); i++)
        {
            var r = readings[i];
            var (_, tone) = Words.Of(r.Verdict);
            var place = Place.Of(r.Reading, session.Bench.Board);
            var line = ScreenLine.Cells(
                new Cell((place == session.Cursor ? "> " : "  ") + place.Name(session.Bench.Board), NameWidth), new Cell(Range(r, half), half, tone),
                new Cell(double.IsFinite(r.NormalisedResidual) ? Track(half, r.NormalisedResidual / WidestResidual, Mark(r.Verdict), 2 / WidestResidual) : "(the fit passes through it)", half, tone));
            lines.Add(line);
        }

        lines.Add(ScreenLine.Empty);
        lines.Add(ScreenLine.Of(Key, Tone.Dim));
        return lines.ToImmutable();
    }

    /// <summary>Rows that the picture of the condition wants.</summary>
    public static int Height(BenchSession session) => 4 + (session.Result?.Readings.Count(r => r.Reading.Condition == session.Condition) ?? 0);

    /// <summary>The reading and the band of the parts on the scale of En, as the pictures of the report draw them.</summary>
    private static string Range(ReadingResult r, int width)
    {
        var scale = WidestEn * r.ExpandedUncertainty;
        return Track(width, r.En / WidestEn, Mark(r.Verdict), 1 / WidestEn, (r.BandLow - r.Predicted) / scale, (r.BandHigh - r.Predicted) / scale);
    }

    private static char Mark(ReadingVerdict verdict) => verdict switch { ReadingVerdict.In => 'o', ReadingVerdict.Doubtful => '?', _ => 'X' };

    /// <param name="position">−1 to 1 is the scale from end to end</param>
    /// <param name="limit">where the brackets stand, on the same scale</param>
    /// <param name="low">where a band begins, on the same scale</param>
    /// <param name="high">where it ends; as low where there is none</param>
    private static string Track(int width, double position, char mark, double limit, double low = 0, double high = 0)
    {
        var track = new StringBuilder(new string('.', width));
        if (high > low) for (var i = Column(width, low); i <= Column(width, high); i++) track[i] = '=';
        track[Column(width, 0)] = '|';
        track[Column(width, -limit)] = '[';
        track[Column(width, limit)] = ']';
        track[Math.Clamp(Column(width, position), 1, width - 2)] = mark;
        if (position < -1) track[0] = '<';
        if (position > 1) track[width - 1] = '>';
        return track.ToString();
    }

    private static int Column(int width, double position) => (int)Math.Round((Math.Clamp(double.IsNaN(position) ? 0 : position, -1, 1) + 1) / 2 * (width - 1));

    private static string Axis(int width, string low, string middle, string high)
    {
        var left = ScreenLine.Fit(low, (width - middle.Length) / 2);
        return left + middle + ScreenLine.Fit(high, width - left.Length - middle.Length, true);
    }
}
