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

    /// <summary>Rows that do not fit are left out at the end; the cursor's is kept in sight.</summary>
    public static ImmutableArray<ScreenLine> Lines(BenchSession session, int width, int height)
    {
        if (session.Result is not { Readings.IsEmpty: false } result) return [ScreenLine.Of("Nothing read yet: there is nothing to plot.", Tone.Dim)];
        var lines = ImmutableArray.CreateBuilder<ScreenLine>();
        var half = Math.Max(10, (width - NameWidth - 4) / 2);
        lines.Add(ScreenLine.Cells(new Cell("", NameWidth), new Cell("measured in its band", half, Tone.Strong), new Cell("residual after the fit", half, Tone.Strong)));
        lines.Add(ScreenLine.Cells(new Cell("", NameWidth), new Cell(Axis(half, "-3 En", "0", "+3 En"), half, Tone.Dim), new Cell(Axis(half, "-4 sd", "0", "+4 sd"), half, Tone.Dim)));
        var room = Math.Max(1, height - 4);
        var at = Math.Max(0, Array.FindIndex([.. result.Readings], r => Place.Of(r.Reading, session.Bench.Board) == session.Cursor));
        var first = Math.Clamp(at - room / 2, 0, Math.Max(0, result.Readings.Length - room));
        foreach (var r in result.Readings.Skip(first).Take(room))
        {
            var (_, tone) = Words.Of(r.Verdict);
            var name = Place.Of(r.Reading, session.Bench.Board).Name(session.Bench.Board);
            lines.Add(ScreenLine.Cells(
                new Cell(name, NameWidth), new Cell(Range(r, half), half, tone),
                new Cell(double.IsFinite(r.NormalisedResidual) ? Track(half, r.NormalisedResidual / WidestResidual, Mark(r.Verdict), 2 / WidestResidual) : "(the fit passes through it)", half, tone)));
        }

        lines.Add(ScreenLine.Empty);
        lines.Add(ScreenLine.Of("[ ] limits   o in   ? doubtful   X out   < > beyond the scale", Tone.Dim));
        return lines.ToImmutable();
    }

    private static string Range(ReadingResult r, int width) => Track(width, r.En / WidestEn, Mark(r.Verdict), 1 / WidestEn);

    private static char Mark(ReadingVerdict verdict) => verdict switch { ReadingVerdict.In => 'o', ReadingVerdict.Doubtful => '?', _ => 'X' };

    /// <param name="position">−1 to 1 is the scale from end to end</param>
    /// <param name="limit">where the brackets stand, on the same scale</param>
    private static string Track(int width, double position, char mark, double limit)
    {
        var track = new StringBuilder(new string('.', width));
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
