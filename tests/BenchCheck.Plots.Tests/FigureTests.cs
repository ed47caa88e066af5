using System.Xml.Linq;
using BenchCheck.Core.Checking;
using BenchCheck.Plots.Figures;
using CsCheck;
using Xunit;

namespace BenchCheck.Plots.Tests;

public sealed class FigureTests
{
    public static TheoryData<string> Names => [nameof(Checks.Healthy), nameof(Checks.Faulty), nameof(Checks.Empty), nameof(Checks.Sixty), nameof(Checks.Odd)];

    [Theory]
    [MemberData(nameof(Names))]
    public void A_png_decodes_with_the_size_of_the_figure_and_is_not_blank(string name)
    {
        foreach (var figure in All(name))
        {
            using var pixels = figure.Pixels();
            Assert.Equal(figure.Width * Figure.PngScale, pixels.Width);
            Assert.Equal(figure.Height * Figure.PngScale, pixels.Height);
            Assert.True(pixels.Pixels.Distinct().Skip(3).Any());
        }
    }

    [Theory]
    [MemberData(nameof(Names))]
    public void The_same_result_gives_the_same_bytes(string name)
    {
        foreach (var (first, second) in All(name).Zip(All(name)))
        {
            Assert.Equal(first.ToSvg(), second.ToSvg());
            Assert.Equal(first.ToPng(), second.ToPng());
        }
    }

    [Theory]
    [MemberData(nameof(Names))]
    public void An_svg_is_well_formed_has_a_title_and_refers_only_to_itself(string name)
    {
        foreach (var figure in All(name))
        {
            var svg = figure.ToSvg("a-");
            var root = XDocument.Parse(svg).Root!;
            Assert.Equal("img", root.Attribute("role")!.Value);
            Assert.Equal(figure.Title, root.Element(root.Name.Namespace + "title")!.Value);
            Assert.DoesNotContain(root.Descendants(), e => e.Name.LocalName is "script" or "image" or "use" or "foreignObject");
            Assert.All(root.Descendants().Attributes("id"), id => Assert.StartsWith("a-", id.Value));
            Assert.DoesNotContain(root.Descendants().Attributes(), a => !a.IsNamespaceDeclaration && a.Value.Contains("http", StringComparison.OrdinalIgnoreCase));
        }
    }

    [Fact]
    public void Every_text_falls_back_to_a_generic_font()
    {
        var root = XDocument.Parse(ReadingPlot.Of(Checks.Healthy).ToSvg()).Root!;
        Assert.All(root.Descendants(root.Name.Namespace + "text"), t => Assert.EndsWith("sans-serif", t.Attribute("font-family")!.Value));
    }

    [Fact]
    public void Hostile_names_are_text_without_control_or_reordering_characters()
    {
        var texts = All(nameof(Checks.Odd)).SelectMany(f => f.Texts()).ToArray();
        Assert.Contains(texts, t => t.StartsWith("<script>", StringComparison.Ordinal));
        Assert.DoesNotContain(texts, t => t.Any(c => char.IsControl(c) || c == '\u202E'));
        Assert.Contains("节点", texts);
    }

    [Fact]
    public void A_long_name_is_shortened() =>
        Assert.DoesNotContain(ReadingPlot.Of(Checks.Odd).Texts(), t => t.Contains("WWWWWWWWWWWWWWWWWWWWWWWWWWWWWWWWWWWWWWWWWW", StringComparison.Ordinal));

    [Fact]
    public void Any_name_gives_a_well_formed_picture() =>
        Gen.String.Sample(name => XDocument.Parse(ReadingPlot.Bands(Checks.Of(BoardVerdict.Agrees, [Checks.Volts(name, 1, 1.05, 0.1)])).ToSvg()) is not null, iter: 200);

    [Fact]
    public void A_picture_is_written_by_the_ending_of_its_name()
    {
        var folder = Directory.CreateTempSubdirectory("plots").FullName;
        try
        {
            var figure = ReadingPlot.Of(Checks.Healthy);
            Assert.Null(figure.Save(Path.Combine(folder, "a.PNG")));
            Assert.Null(figure.Save(Path.Combine(folder, "a.svg")));
            Assert.Equal(figure.ToPng(), File.ReadAllBytes(Path.Combine(folder, "a.PNG")));
            Assert.Equal(figure.ToSvg(), File.ReadAllText(Path.Combine(folder, "a.svg")));
            Assert.Null(figure.Save(Path.Combine(folder, "a.svg")));
            Assert.Equal(2, Directory.GetFileSystemEntries(folder).Length);
        }
        finally
        {
            Directory.Delete(folder, true);
        }
    }

    [Theory]
    [InlineData("picture.bmp", ".png or .svg")]
    [InlineData("picture", ".png or .svg")]
    [InlineData("no-such-folder/picture.png", "its folder does not exist")]
    [InlineData("pic\0ture.png", "no path")]
    public void A_file_that_cannot_be_written_is_said_and_leaves_nothing(string name, string reason)
    {
        var folder = Directory.CreateTempSubdirectory("plots").FullName;
        try
        {
            var fault = ReadingPlot.Of(Checks.Healthy).Save(Path.Combine(folder, name));
            Assert.Contains(reason, fault!.ToString(), StringComparison.Ordinal);
            Assert.DoesNotContain('\0', fault.ToString());
            Assert.Empty(Directory.GetFileSystemEntries(folder));
        }
        finally
        {
            Directory.Delete(folder, true);
        }
    }

    private static Figure[] All(string name)
    {
        var result = (CheckResult)typeof(Checks).GetField(name)!.GetValue(null)!;
        return [ReadingPlot.Of(result), ReadingPlot.Bands(result), ReadingPlot.Residuals(result), EstimatePlot.Of(result), EstimatePlot.Narrow(result)];
    }
}
