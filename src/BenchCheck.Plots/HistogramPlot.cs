using System.Globalization;
using BenchCheck.Core.Quantities;
using BenchCheck.Plots.Figures;
using BenchCheck.Plots.Typefaces;
using MathNet.Numerics.Statistics;
using ScottPlot;

namespace BenchCheck.Plots;

/// <summary>How one number is spread over a batch, with the range that the design allows.</summary>
public static class HistogramPlot
{
    private const int MostBins = 80;

    /// <param name="title">the board or the batch</param>
    /// <param name="parameter">what is counted: "Q1 gain"</param>
    /// <param name="values">in the unit; those that are not finite are left out and counted</param>
    public static Figure Of(string title, string parameter, Unit unit, IReadOnlyList<double> values, Limits limits)
    {
        ArgumentNullException.ThrowIfNull(values);
        double[] finite = [.. values.Where(double.IsFinite)];
        var name = FigureText.Clean(parameter);
        var heading = new Heading(FigureText.Clean(title), Finding(name, unit, finite, limits), null);
        if (finite.Length == 0) return ChartFigure.Compose(heading, null, [], "There are no values to draw.");

        var range = ValueRange.Of(finite, limits);
        var drawn = finite.Where(range.Contains).ToArray();
        var width = BinWidth(drawn, range);
        var first = Math.Floor(range.Low / width);
        var counts = drawn.GroupBy(v => Math.Floor(v / width) - first).ToDictionary(g => g.Key, g => g.Count());
        var plot = PanelPlot.Empty();
        plot.Axes.SetLimits(range.Low, range.High, 0, counts.Values.Max() * 1.08);
        if (limits.AreKnown) PanelPlot.Expect(plot.Add.HorizontalSpan(limits.Low, limits.High));
        foreach (var (bin, count) in counts)
        {
            var bar = plot.Add.Rectangle((first + bin) * width, (first + bin + 1) * width, 0, count);
            bar.FillColor = Ink.Band;
            bar.LineColor = Ink.Paper;
            bar.LineWidth = 1;
        }

        foreach (var at in new[] { limits.Low, limits.High }.Where(double.IsFinite)) plot.Add.VerticalLine(at, 1.5f, Ink.Limit);
        if (double.IsFinite(limits.Nominal)) plot.Add.VerticalLine(limits.Nominal, 1, Ink.Limit, LinePattern.Dashed);
        plot.Axes.Bottom.TickGenerator = new EngineeringTicks(unit);
        plot.Axes.Left.TickGenerator = new ScottPlot.TickGenerators.NumericAutomatic { IntegerTicksOnly = true };
        plot.Axes.Bottom.Label.Text = FigureText.Fitted(name, ChartFigure.Width / 2, PanelPlot.LetterSize, FigureText.Regular);
        plot.Axes.Left.Label.Text = "boards";
        KeyEntry[] key = [new BarKey(Ink.Band, 11, "boards"), .. PanelPlot.LimitKey(limits)];
        return ChartFigure.Compose(heading, plot, key, Note(values.Count - finite.Length, finite, range, unit));
    }

    private static string Finding(string name, Unit unit, double[] values, Limits limits)
    {
        var outside = limits.AreKnown ? string.Create(CultureInfo.InvariantCulture, $", {values.Count(limits.Exclude)} outside {limits.Text(unit)}") : "";
        return string.Create(CultureInfo.InvariantCulture, $"{name}: {values.Length} {(values.Length == 1 ? "value" : "values")}{outside}");
    }

    /// <summary>Twice the interquartile range over the cube root of the count (Freedman and Diaconis 1981), widened to 1, 2 or 5 times a power of ten.</summary>
    private static double BinWidth(double[] values, ValueRange range)
    {
        var span = range.High - range.Low;
        var width = Math.Clamp(2 * values.InterquartileRange() / Math.Cbrt(values.Length), span / MostBins, span / 4);
        var power = Math.Pow(10, Math.Floor(Math.Log10(width)));
        return power * (width / power) switch { <= 1 => 1, <= 2 => 2, <= 5 => 5, _ => 10 };
    }

    private static string Note(int missing, double[] values, ValueRange range, Unit unit)
    {
        var (below, above) = (values.Count(v => v < range.Low), values.Count(v => v > range.High));
        string[] parts =
        [
            .. below > 0 ? [string.Create(CultureInfo.InvariantCulture, $"{below} below the axis, down to {Words.Value(values.Min(), unit)}")] : Array.Empty<string>(),
            .. above > 0 ? [string.Create(CultureInfo.InvariantCulture, $"{above} above it, up to {Words.Value(values.Max(), unit)}")] : Array.Empty<string>(),
            .. missing > 0 ? [string.Create(CultureInfo.InvariantCulture, $"{missing} without a value")] : Array.Empty<string>(),
        ];
        return parts.Length == 0 ? "" : $"Not drawn: {string.Join("; ", parts)}.";
    }
}
