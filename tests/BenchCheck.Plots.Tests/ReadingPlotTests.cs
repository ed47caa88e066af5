using System.Globalization;
using System.Xml.Linq;
using BenchCheck.Core.Checking;
using SkiaSharp;
using Xunit;

namespace BenchCheck.Plots.Tests;

public sealed class ReadingPlotTests
{
    private static readonly XNamespace Svg = "http://www.w3.org/2000/svg";

    [Fact]
    public void Names_numbers_and_verdict_stand_in_the_picture_as_text()
    {
        var texts = ReadingPlot.Of(Checks.Healthy).Texts();
        Assert.Contains("Circulation-fan stage, serial 0041", texts);
        Assert.Contains(texts, t => t.StartsWith("Agrees: The readings are what a healthy board may show", StringComparison.Ordinal));
        foreach (var expected in new[] { "VCC", "C1", "R3 current", "B1", "12.02 V", "6.610 V", "6.771 V", "2.874 mA", "2.905 mA", "8.213 kΩ", "-0.22" })
            Assert.Contains(expected, texts);
    }

    [Fact]
    public void A_reading_beyond_the_axis_shows_its_value_at_the_edge()
    {
        var texts = ReadingPlot.Bands(Checks.Faulty).Texts();
        Assert.Contains("+5.93", texts);
        Assert.Contains("+34", ReadingPlot.Residuals(Checks.Faulty).Texts());
    }

    [Fact]
    public void A_residual_that_does_not_exist_says_so() => Assert.Contains("fitted exactly", ReadingPlot.Residuals(Checks.Faulty).Texts());

    [Fact]
    public void A_mark_stands_where_its_En_puts_it()
    {
        // The axis numbers of the SVG give the scale; the disc of the one reading is looked for in it.
        var result = Checks.Of(BoardVerdict.Agrees, [Checks.Volts("C1", 5.05, 5, 0.1)]);
        var root = XDocument.Parse(ReadingPlot.Bands(result).ToSvg()).Root!;
        double Tick(string label)
        {
            var text = root.Descendants(Svg + "text").Single(t => t.Value == label);
            var moved = text.Attribute("transform")!.Value["translate(".Length..].Split(' ')[0];
            return double.Parse(moved, CultureInfo.InvariantCulture) + Number(text, "x") + Number(text, "textLength") / 2;
        }

        var perUnit = (Tick("+2") - Tick("-2")) / 4;
        var disc = root.Descendants(Svg + "circle").Concat(root.Descendants(Svg + "ellipse")).First(e => (string?)e.Attribute("fill") == "#1F6B4F");
        var middle = (Tick("+2") + Tick("-2")) / 2;
        Assert.Equal(0.5, (Number(disc, "cx") - middle) / perUnit, 0.03);
    }

    [Fact]
    public void Conditions_are_named_only_where_there_are_several()
    {
        var one = Checks.Volts("C1", 1, 1.02, 0.1);
        var other = one with { Reading = one.Reading with { Condition = "bright" } };
        Assert.Contains("C1", ReadingPlot.Of(Checks.Of(BoardVerdict.Agrees, [one])).Texts());
        var texts = ReadingPlot.Of(Checks.Of(BoardVerdict.Agrees, [one, other])).Texts();
        Assert.Contains("C1, powered", texts);
        Assert.Contains("C1, bright", texts);
    }

    [Fact]
    public void Sixty_readings_each_have_a_row_and_the_picture_grows()
    {
        var few = ReadingPlot.Of(Checks.Healthy);
        var many = ReadingPlot.Of(Checks.Sixty);
        Assert.True(many.Height > few.Height + 55 * 20);
        var texts = many.Texts();
        for (var i = 1; i <= 60; i++) Assert.Contains(string.Create(CultureInfo.InvariantCulture, $"N{i}"), texts);
    }

    [Fact]
    public void Of_very_many_readings_the_worst_are_drawn_and_the_rest_is_counted()
    {
        var readings = Enumerable.Range(0, 500).Select(i => Checks.Volts($"N{i}", 5, i == 321 ? 4 : 5.001, 0.2));
        var texts = ReadingPlot.Of(Checks.Of(BoardVerdict.Disagrees, [.. readings])).Texts();
        Assert.Contains("N321", texts);
        Assert.Contains(texts, t => t.Contains("300 nearer to their prediction are not", StringComparison.Ordinal));
    }

    [Fact]
    public void No_readings_give_a_picture_that_says_so() =>
        Assert.Contains("There are no readings to draw.", ReadingPlot.Of(Checks.Empty).Texts());

    [Fact]
    public void Verdicts_differ_in_shape_not_only_in_colour()
    {
        // The same row with each verdict, drawn and turned to grey: the marks must differ by many pixels.
        SKBitmap With(ReadingVerdict verdict) =>
            ReadingPlot.Bands(Checks.Of(BoardVerdict.Agrees, [Checks.Volts("C1", 5, 5, 0.1) with { Verdict = verdict }])).Pixels();
        var (inside, doubtful, outside) = (With(ReadingVerdict.In), With(ReadingVerdict.Doubtful), With(ReadingVerdict.Out));
        Assert.True(Differing(inside, doubtful) > 60);
        Assert.True(Differing(inside, outside) > 60);
        Assert.True(Differing(doubtful, outside) > 60);

        static int Differing(SKBitmap a, SKBitmap b) => a.Pixels.Zip(b.Pixels).Count(p => Math.Abs(Grey(p.First) - Grey(p.Second)) > 60);
        static double Grey(SKColor c) => 0.299 * c.Red + 0.587 * c.Green + 0.114 * c.Blue;
    }

    private static double Number(XElement element, string attribute) => double.Parse(element.Attribute(attribute)!.Value, CultureInfo.InvariantCulture);
}
