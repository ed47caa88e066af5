using System.Globalization;
using System.Xml.Linq;
using BenchCheck.Core.Batches;
using BenchCheck.Core.Quantities;
using BenchCheck.Plots.Figures;
using CsCheck;
using Xunit;

namespace BenchCheck.Plots.Tests;

public sealed class BatchPlotTests
{
    private static readonly Limits Gain = new(100, 173.2, 300);

    [Fact]
    public void A_histogram_counts_values_outside_the_range_of_the_parts_list()
    {
        var texts = HistogramPlot.Of("Shelf 7", "Q1 gain", Unit.One, [90, 110, 150, 160, 180, 210, 301], Gain).Texts();
        Assert.Contains("Shelf 7", texts);
        Assert.Contains("Q1 gain: 7 values, 2 outside 100..300", texts);
        Assert.Contains("200", texts);
    }

    [Fact]
    public void The_bars_of_a_histogram_hold_every_value_that_is_drawn()
    {
        // The bars are of equal width, so their heights are as the counts; the highest is read off the axis.
        double[] values = [.. Enumerable.Range(0, 90).Select(i => 150 + 0.5 * i)];
        var root = XDocument.Parse(HistogramPlot.Of("Shelf 7", "Q1 gain", Unit.One, values, Limits.None).ToSvg()).Root!;
        var bars = root.Descendants(root.Name.Namespace + "rect").Where(r => (string?)r.Attribute("fill") == "#9DB6D3" && Number(r, "height") > 12).ToArray();
        var texts = root.Descendants(root.Name.Namespace + "text").ToLookup(t => t.Value);
        var perCount = (Height(texts["0"].Single()) - Height(texts["10"].Single())) / 10;
        Assert.Equal(90, bars.Sum(b => Number(b, "height")) / perCount, 1.0);

        static double Height(XElement text) => double.Parse(text.Attribute("transform")!.Value.Split(' ', ')')[1], CultureInfo.InvariantCulture);
        static double Number(XElement element, string name) => double.Parse(element.Attribute(name)!.Value, CultureInfo.InvariantCulture);
    }

    [Fact]
    public void Values_far_off_the_rest_are_named_below_a_histogram()
    {
        var values = Enumerable.Range(0, 50).Select(i => 47e3 + 10.0 * i).Append(4.7e3).Append(double.NaN).ToArray();
        Assert.Contains("Not drawn: 1 below the axis, down to 4.700 kΩ; 1 without a value.", HistogramPlot.Of("Shelf 7", "R1 resistance", Unit.Ohm, values, Limits.None).Texts());
    }

    [Fact]
    public void A_trend_names_serials_limits_and_units()
    {
        var texts = TrendPlot.InOrder(Voltages(40)).Texts();
        Assert.Contains("V1 voltage: 40 values, 1 outside 11.88..12.12 V", texts);
        Assert.Contains("S000", texts);
        Assert.Contains("12.00 V", texts);
        Assert.DoesNotContain("S001", texts);
    }

    [Fact]
    public void A_trend_in_time_shows_dates_and_counts_what_has_none()
    {
        var trend = Voltages(40);
        var texts = TrendPlot.InTime(trend with { Points = trend.Points.Add(new TrendPoint("x", null, 12, double.NaN, double.NaN)) }).Texts();
        Assert.Contains("2031-03-15", texts);
        Assert.Contains("1 without a value or time are left out.", texts);
    }

    [Fact]
    public void Of_very_many_points_those_outside_the_limits_are_still_drawn()
    {
        var trend = Voltages(9000);
        var svg = TrendPlot.InOrder(trend).ToSvg();
        Assert.Contains("of 9000, all within the limits, are not drawn", svg, StringComparison.Ordinal);
        // Each point outside is a square with a cross cut out; one more stands in the key.
        Assert.Equal(trend.Points.Count(p => trend.Limits.Exclude(p.Value)) + 1, XDocument.Parse(svg).Descendants().Count(e => (string?)e.Attribute("fill") == "#B3261E"));
    }

    [Fact]
    public void Boxes_stand_with_their_numbers()
    {
        var texts = BoxPlot.Of("Shelf 7", [Row("R1 resistance", 1), Row("R9 resistance", 1) with { Limits = Limits.None }]).Texts();
        foreach (var expected in new[] { "R1 resistance", "44.65..49.35 kΩ", "47.00 kΩ", "101", "2 parameters of 101 boards", "no tolerance to compare with", "?" }) Assert.Contains(expected, texts);
    }

    [Fact]
    public void An_outlier_beyond_the_axis_shows_how_far()
    {
        // 470 kΩ on 47 kΩ ± 2.35 kΩ lies 180 tolerances off.
        Assert.Contains("+180", BoxPlot.Of("Shelf 7", [Row("R1 resistance", 10)]).Texts());
    }

    [Fact]
    public void Nothing_to_draw_is_said()
    {
        Assert.Contains("There are no values to draw.", HistogramPlot.Of("x", "y", Unit.Volt, [double.NaN], Limits.None).Texts());
        Assert.Contains("There are no values to draw.", TrendPlot.InOrder(Voltages(40) with { Points = [] }).Texts());
        Assert.Contains("There are no values to draw.", TrendPlot.InTime(Voltages(40) with { Points = [] }).Texts());
        Assert.Contains("There are no estimates to draw.", BoxPlot.Of("x", []).Texts());
    }

    [Fact]
    public void Any_values_and_limits_give_a_picture() =>
        Gen.Select(Gen.Double.Array[0, 8], Gen.Double, Gen.Double).Sample((values, a, b) =>
        {
            var limits = double.IsNaN(a) || double.IsNaN(b) ? Limits.None : new Limits(Math.Min(a, b), Math.Min(a, b), Math.Max(a, b));
            foreach (var figure in All(values, limits)) XDocument.Parse(figure.ToSvg());
        }, iter: 100);

    [Fact]
    public void Names_from_files_are_cleaned()
    {
        var hostile = Checks.Hostile;
        var point = new TrendPoint(hostile, DateTimeOffset.UnixEpoch, 1, double.NaN, double.NaN);
        var trend = new Trend(hostile, hostile, Unit.Volt, [point], Limits.None);
        Figure[] figures =
        [
            HistogramPlot.Of(hostile, hostile, Unit.Volt, [1, 2], Limits.None), TrendPlot.InOrder(trend), TrendPlot.InTime(trend),
            BoxPlot.Of(hostile, [Row(hostile, 1)]),
        ];
        foreach (var figure in figures) Assert.DoesNotContain(figure.Texts(), t => t.Any(c => char.IsControl(c) || c == '\u202E'));
    }

    private static Figure[] All(double[] values, Limits limits)
    {
        var trend = new Trend("x", "y", Unit.Volt, [.. values.Select((v, i) => new TrendPoint($"{i}", DateTimeOffset.UnixEpoch.AddHours(i), v, v, v))], limits);
        return [HistogramPlot.Of("x", "y", Unit.Volt, values, limits), TrendPlot.InOrder(trend), TrendPlot.InTime(trend)];
    }

    private static Trend Voltages(int count)
    {
        var start = new DateTimeOffset(2031, 3, 1, 8, 0, 0, TimeSpan.Zero);
        return new Trend(
            "Circulation-fan stage", "V1 voltage", Unit.Volt,
            [.. Enumerable.Range(0, count).Select(i => new TrendPoint(string.Create(CultureInfo.InvariantCulture, $"S{i:000}"), start.AddDays(i), i % 100 == 7 ? 12.2 : 12 + 0.001 * (i % 30), double.NaN, double.NaN))],
            new Limits(11.88, 12, 12.12));
    }

    private static BoxRow Row(string name, double factorOfLast)
    {
        var builder = new DistributionBuilder();
        for (var i = -50; i < 50; i++) builder.Add(null, 47e3 + 10 * i);
        builder.Add("0042", 47e3 * factorOfLast);
        return new BoxRow(name, Unit.Ohm, builder.Build()!, new Limits(44.65e3, 47e3, 49.35e3));
    }
}
