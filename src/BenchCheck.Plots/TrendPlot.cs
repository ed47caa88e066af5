using System.Collections.Immutable;
using System.Globalization;
using BenchCheck.Core.Quantities;
using BenchCheck.Plots.Figures;
using BenchCheck.Plots.Typefaces;
using ScottPlot;

namespace BenchCheck.Plots;

/// <summary>One parameter over many checks.</summary>
/// <param name="Title">the board or the batch</param>
/// <param name="Parameter">what is followed: "Q1 gain"</param>
/// <param name="Limits">of the parts list, in the unit</param>
public sealed record Trend(string Title, string Parameter, Unit Unit, ImmutableArray<TrendPoint> Points, Limits Limits);

/// <summary>The parameter in one check.</summary>
/// <param name="Label">which board: its serial</param>
/// <param name="Low">lower end of the coverage interval; NaN for none</param>
public sealed record TrendPoint(string Label, DateTimeOffset? Time, double Value, double Low, double High);

/// <summary>A parameter over serials or over time, with the limits of the parts list.</summary>
public static class TrendPlot
{
    /// <summary>Points whose interval is still worth drawing.</summary>
    private const int MostIntervals = 200;

    /// <summary>Points that are all drawn; of more, those outside the limits and every so-many-th other.</summary>
    private const int MostPoints = 4000;

    private const float LabelRoom = 90;

    /// <summary>The points side by side in the order given, named by their labels.</summary>
    public static Figure InOrder(Trend trend)
    {
        ArgumentNullException.ThrowIfNull(trend);
        return Draw(trend, [.. trend.Points.Select((p, i) => new Placed(p, i))], (plot, points) =>
        {
            plot.Axes.SetLimitsX(-0.5, trend.Points.Length - 0.5);
            var most = (int)(ChartFigure.Width / LabelRoom) - 1;
            var every = Math.Max(1, (trend.Points.Length + most - 1) / most);
            var ticks = new ScottPlot.TickGenerators.NumericManual();
            for (var i = 0; i < trend.Points.Length; i += every)
                ticks.AddMajor(i, FigureText.Fitted(FigureText.Clean(trend.Points[i].Label), LabelRoom - 8, PanelPlot.LetterSize, FigureText.Regular));
            plot.Axes.Bottom.TickGenerator = ticks;
            plot.Axes.Bottom.Label.Text = "in order";
        });
    }

    /// <summary>The points along the time of each; one without a time is left out and counted.</summary>
    public static Figure InTime(Trend trend)
    {
        ArgumentNullException.ThrowIfNull(trend);
        return Draw(trend, [.. trend.Points.Where(p => p.Time is not null).Select(p => new Placed(p, p.Time!.Value.UtcDateTime.ToOADate()))], (plot, points) =>
        {
            var (first, last) = (points.Min(p => p.X), points.Max(p => p.X));
            var air = Math.Max(0.03 * (last - first), 1.0 / 24);
            plot.Axes.SetLimitsX(first - air, last + air);
            plot.Axes.Bottom.TickGenerator = new ScottPlot.TickGenerators.DateTimeAutomatic { LabelFormatter = t => TimeText(t, last - first) };
            plot.Axes.Bottom.Label.Text = "time (UTC)";
        });
    }

    private static Figure Draw(Trend trend, ImmutableArray<Placed> placed, Action<Plot, ImmutableArray<Placed>> lay)
    {
        var limits = trend.Limits;
        ImmutableArray<Placed> finite = [.. placed.Where(p => double.IsFinite(p.Point.Value))];
        var name = FigureText.Clean(trend.Parameter);
        var outside = limits.AreKnown ? string.Create(CultureInfo.InvariantCulture, $", {finite.Count(p => limits.Exclude(p.Point.Value))} outside {limits.Text(trend.Unit)}") : "";
        var heading = new Heading(FigureText.Clean(trend.Title), string.Create(CultureInfo.InvariantCulture, $"{name}: {finite.Length} {(finite.Length == 1 ? "value" : "values")}{outside}"), null);
        if (finite.IsEmpty) return ChartFigure.Compose(heading, null, [], "There are no values to draw.");

        var range = ValueRange.Of([.. finite.Select(p => p.Point.Value)], limits);
        var every = (finite.Length + MostPoints - 1) / MostPoints;
        ImmutableArray<Placed> shown = [.. finite.Where((p, i) => i % every == 0 || limits.Exclude(p.Point.Value))];
        var plot = PanelPlot.Empty();
        lay(plot, finite);
        plot.Axes.SetLimitsY(range.Low, range.High);
        plot.Axes.Left.TickGenerator = new EngineeringTicks(trend.Unit);
        plot.Axes.Left.Label.Text = FigureText.Fitted(name, 300, PanelPlot.LetterSize, FigureText.Regular);
        if (limits.AreKnown) PanelPlot.Expect(plot.Add.VerticalSpan(limits.Low, limits.High));
        if (double.IsFinite(limits.Nominal)) plot.Add.HorizontalLine(limits.Nominal, 1, Ink.Limit, LinePattern.Dashed);
        AddPoints(plot, shown, limits, range);
        KeyEntry[] key =
        [
            new MarkKey(Mark.In, limits.AreKnown ? "within the limits" : "estimate"), .. limits.AreKnown ? [new MarkKey(Mark.Out, "outside")] : Array.Empty<KeyEntry>(),
            .. shown.Length <= MostIntervals && shown.Any(p => double.IsFinite(p.Point.Low)) ? [new UprightKey(Ink.Quiet, 1, "coverage interval")] : Array.Empty<KeyEntry>(),
            .. PanelPlot.LimitKey(limits),
        ];
        return ChartFigure.Compose(heading, plot, key, Note(trend.Points.Length - finite.Length, finite, shown.Length, range, trend.Unit));
    }

    private static void AddPoints(Plot plot, ImmutableArray<Placed> points, Limits limits, ValueRange range)
    {
        var size = points.Length <= MostIntervals ? 10 : points.Length <= 1000 ? 7 : 5;
        foreach (var (point, x) in points)
        {
            if (points.Length <= MostIntervals && double.IsFinite(point.Low) && double.IsFinite(point.High))
                plot.Add.Line(x, Math.Clamp(point.Low, range.Low, range.High), x, Math.Clamp(point.High, range.Low, range.High)).LineStyle = new LineStyle { Color = Ink.Quiet, Width = 1 };
            var mark = !range.Contains(point.Value) ? point.Value > range.High ? Mark.BeyondTop : Mark.BeyondBottom : limits.Exclude(point.Value) ? Mark.Out : Mark.In;
            var inset = 0.02 * (range.High - range.Low);
            var marker = plot.Add.Marker(x, Math.Clamp(point.Value, range.Low + inset, range.High - inset));
            marker.MarkerStyle = new MarkerStyle { CustomRenderer = mark, Size = size };
        }
    }

    private static string Note(int missing, ImmutableArray<Placed> points, int shown, ValueRange range, Unit unit)
    {
        var beyond = points.Count(p => !range.Contains(p.Point.Value));
        string[] parts =
        [
            .. beyond > 0
                ? [string.Create(CultureInfo.InvariantCulture, $"Triangles at the edge: {beyond} beyond the axis (all lie between {Words.Value(points.Min(p => p.Point.Value), unit)} and {Words.Value(points.Max(p => p.Point.Value), unit)})")]
                : Array.Empty<string>(),
            .. shown < points.Length ? [string.Create(CultureInfo.InvariantCulture, $"{points.Length - shown} of {points.Length}, all within the limits, are not drawn")] : Array.Empty<string>(),
            .. missing > 0 ? [string.Create(CultureInfo.InvariantCulture, $"{missing} without a value or time are left out")] : Array.Empty<string>(),
        ];
        return parts.Length == 0 ? "" : $"{string.Join("; ", parts)}.";
    }

    private static string TimeText(DateTime time, double days) =>
        time.ToString(days switch { > 200 => "yyyy-MM", > 3 => "yyyy-MM-dd", > 0.5 => "MM-dd HH:mm", _ => "HH:mm" }, CultureInfo.InvariantCulture);

    /// <summary>A point with its place on the axis along.</summary>
    private readonly record struct Placed(TrendPoint Point, double X);
}
