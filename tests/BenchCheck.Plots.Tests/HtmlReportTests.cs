using System.Globalization;
using System.Text.RegularExpressions;
using System.Xml.Linq;
using BenchCheck.Core.Checking;
using BenchCheck.Core.Metering;
using BenchCheck.Plots.Reports;
using CsCheck;
using Xunit;

namespace BenchCheck.Plots.Tests;

public sealed partial class HtmlReportTests
{
    private static readonly DateTimeOffset Morning = new(2031, 3, 1, 9, 12, 0, TimeSpan.FromHours(1));

    [Fact]
    public void The_page_opens_with_board_verdict_time_and_version()
    {
        var page = Parsed(Checks.Faulty);
        Assert.Equal("en", page.Attribute("lang")!.Value);
        Assert.Equal("Circulation-fan stage, serial 0041: Disagrees", page.Descendants("title").First().Value);
        Assert.Equal("Circulation-fan stage, serial 0041", page.Descendants("h1").Single().Value);
        Assert.Contains("Checked 2031-03-01 09:12:00 UTC+01:00 with BenchCheck 1.0.0", page.Value, StringComparison.Ordinal);
        Assert.Contains("The board disagrees with its parts list.", page.Value, StringComparison.Ordinal);
    }

    [Fact]
    public void Every_reading_stands_in_the_comparison_with_its_numbers()
    {
        var rows = Rows(Parsed(Checks.Healthy), "Readings");
        Assert.Equal(Checks.Healthy.Readings.Length, rows.Length);
        Assert.Equal(["C1", "in", "6.610 ± 0.092 V", "6.771 V", "6.105..7.437 V", "-161 mV", "-0.22", "6.650 V", "-0.11"], rows[2]);
        Assert.Equal("R3 current", rows[3][0]);
    }

    [Fact]
    public void A_residual_that_does_not_exist_is_said_in_words() => Assert.Equal("fitted exactly", Rows(Parsed(Checks.Faulty), "Readings")[3][^1]);

    [Fact]
    public void Estimates_of_a_disagreeing_board_are_headed_so()
    {
        Assert.Contains("Estimates, as if the board had no fault", Headings(Parsed(Checks.Faulty)));
        Assert.Contains("Estimates", Headings(Parsed(Checks.Healthy)));
    }

    [Fact]
    public void Suspects_next_readings_and_correlations_are_shown()
    {
        var result = Checks.Faulty;
        NamedFault Named(string text) => new("open", ["R3"], [], [], [], null, null, null, text);
        var page = Parsed(result with
        {
            Suspects = [new Suspect(0.873, Named("R3 open"), 4, 0.5, "R3 open. It explains C1.", [Named("R3's upper joint open"), Named("a"), Named("b"), Named("c")])],
            Next =
            [
                new NextReading("unpowered", ReadingQuantity.Resistance, "C1", "VCC", 0.91, [new Expectation(0, 1765, 51), new Expectation(1, 295, 9)], "Supplies off first.", "C1 against VCC (unpowered)"),
            ],
            Correlated = [new CorrelatedPair(result.Parameters[0], result.Parameters[1], -0.97)],
        });
        Assert.Contains("87 % R3 open. It explains C1.", page.Value, StringComparison.Ordinal);
        Assert.Contains("R3's upper joint open; a; b; c.", page.Value, StringComparison.Ordinal);
        Assert.Contains("0.91 bits C1 against VCC (unpowered)", page.Value, StringComparison.Ordinal);
        Assert.Contains("Supplies off first.", page.Value, StringComparison.Ordinal);
        Assert.Contains("1.765 ± 0.051 kΩ with R3 open; 295.0 ± 9.0 Ω with another suspect", page.Value, StringComparison.Ordinal);
        Assert.Contains("R1 resistance and R4 resistance: correlation -0.97", page.Value, StringComparison.Ordinal);
    }

    [Fact]
    public void Power_over_a_rating_is_marked() => Assert.Equal(["R3", "powered", "310 mW", "250 mW", "over its rating"], Rows(Parsed(Checks.Healthy), "Power").Single());

    [Fact]
    public void Cautions_and_assumptions_are_shown_and_a_hazard_stands_out()
    {
        var page = Parsed(Checks.Healthy with { Cautions = Cautions.For(230, "VCC") });
        foreach (var caution in Cautions.Usual) Assert.Contains(caution, page.Value, StringComparison.Ordinal);
        Assert.Contains("HAZARDOUS VOLTAGE: 230.0 V at VCC", page.Descendants("li").Single(e => (string?)e.Attribute("class") == "hazard").Value, StringComparison.Ordinal);
        Assert.Contains("C1: 20 % tolerance taken", page.Value, StringComparison.Ordinal);
    }

    [Fact]
    public void The_method_follows_the_settings()
    {
        var page = XDocument.Parse(HtmlReport.Of(Of(Checks.Healthy) with { Settings = CheckSettings.Default with { Confidence = 0.99, Bands = BandMethod.MonteCarlo, FindFaults = false } })).Root!;
        Assert.Contains("99 %", page.Value, StringComparison.Ordinal);
        Assert.Contains("at most 1 % of healthy boards", page.Value, StringComparison.Ordinal);
        Assert.Contains("JCGM 101:2008", page.Value, StringComparison.Ordinal);
        Assert.Contains("Faults were not searched for.", page.Value, StringComparison.Ordinal);
    }

    [Fact]
    public void Inputs_stand_line_by_line_as_they_were()
    {
        var page = Parsed(Checks.Healthy);
        Assert.Equal("at,value\nC1,6.61\n\tE1 & <b>,\"1\"\n", page.Descendants("pre").Single().Value);
        Assert.Contains("Readings file: fan-stage.csv", page.Descendants("h3").Select(h => h.Value));
    }

    [Fact]
    public void A_huge_input_is_cut_and_the_page_says_so()
    {
        var text = new string('7', 1_000_000);
        var page = HtmlReport.Of(Of(Checks.Healthy) with { Inputs = [new ReportInput("Readings file", "shelf.csv", text)] });
        Assert.True(page.Length < 500_000);
        Assert.Contains("The first 200000 of 1000000 characters are shown.", page, StringComparison.Ordinal);
    }

    [Fact]
    public void Three_pictures_stand_in_the_page_as_text_with_ids_of_their_own()
    {
        var page = Parsed(Checks.Healthy);
        Assert.Equal(3, page.Descendants("figure").Count());
        var ids = page.Descendants().Attributes("id").Select(a => a.Value).ToArray();
        Assert.Equal(ids.Length, ids.Distinct().Count());
        Assert.All(page.Descendants("figure"), f => Assert.Contains(f.Descendants(), e => e.Name.LocalName == "text"));
    }

    [Fact]
    public void Nothing_is_fetched_and_nothing_runs()
    {
        foreach (var result in new[] { Checks.Healthy, Checks.Odd })
        {
            var text = HtmlReport.Of(Of(result));
            var page = XDocument.Parse(text).Root!;
            Assert.DoesNotContain(page.Descendants(), e => e.Name.LocalName is "script" or "link" or "img" or "image" or "iframe" or "object" or "embed" or "use" or "a" or "foreignObject" or "form");
            Assert.DoesNotContain(page.Descendants().Attributes(), a => a.Name.LocalName.StartsWith("on", StringComparison.OrdinalIgnoreCase));
            Assert.DoesNotContain(page.Descendants().Attributes(), a => a.Name.LocalName is "src" or "href");
            var style = page.Descendants("style").Single().Value;
            Assert.DoesNotContain("@import", style, StringComparison.Ordinal);
            Assert.DoesNotContain("url(", style, StringComparison.Ordinal);
            Assert.Contains("default-src 'none'", text, StringComparison.Ordinal);
        }
    }

    [Fact]
    public void Hostile_text_is_escaped_and_cannot_steer()
    {
        var page = HtmlReport.Of(Of(Checks.Odd) with { ProgramVersion = Checks.Hostile, Inputs = [new ReportInput(Checks.Hostile, Checks.Hostile, Checks.Hostile)] });
        Assert.DoesNotContain("<script", page, StringComparison.OrdinalIgnoreCase);
        Assert.Contains("&lt;script&gt;", page, StringComparison.Ordinal);
        Assert.DoesNotContain(page, c => c is '\u202E' or '\u001b' or '\0');
    }

    [Fact]
    public void Any_text_gives_a_well_formed_page() => Gen.String.Sample(text =>
    {
        var result = Checks.Healthy with
        {
            BoardTitle = text, Serial = text, Reason = text, Assumed = [text], Cautions = [text], States = [new DeviceState(text, text, text, text)],
            Unmeasured = [new UnmeasuredNode(text, text, 1, 0, 2, 1)],
        };
        XDocument.Parse(HtmlReport.Of(Of(result) with { Inputs = [new ReportInput("Board file", text, text)] }));
    }, iter: 50);

    [Fact]
    public void Only_elements_without_content_are_closed_in_their_own_tag()
    {
        // In HTML <td/> opens a cell; only void elements, and those of SVG, may be written so.
        var outside = PictureText().Replace(HtmlReport.Of(Of(Checks.Odd)), "");
        Assert.All(SelfClosed().Matches(outside), m => Assert.Equal("meta", m.Groups[1].Value));
    }

    [Fact]
    public void Tables_have_captions_and_scopes_and_headings_descend_in_order()
    {
        var page = Parsed(Checks.Healthy);
        Assert.All(page.Descendants("table"), t => Assert.NotEmpty(t.Elements("caption").Single().Value));
        Assert.All(page.Descendants("th"), th => Assert.Contains(th.Attribute("scope")!.Value, (string[])["col", "row"]));
        var levels = page.Descendants().Where(e => Regex.IsMatch(e.Name.LocalName, "^h[1-6]$")).Select(e => e.Name.LocalName[1] - '0').ToArray();
        Assert.Equal(1, levels[0]);
        Assert.All(levels.Zip(levels.Skip(1)), pair => Assert.True(pair.Second <= pair.First + 1));
    }

    /// <summary>Contrast of text at least 4.5 to 1: WCAG 2.1, success criterion 1.4.3; relative luminance by its definition there (from memory).</summary>
    [Fact]
    public void Text_has_contrast_enough_in_the_light_and_in_the_dark()
    {
        var style = Parsed(Checks.Healthy).Descendants("style").Single().Value;
        var schemes = Variables().Matches(style).Select(m => Colour().Matches(m.Value).ToDictionary(c => c.Groups[1].Value, c => c.Groups[2].Value)).ToArray();
        Assert.Equal(2, schemes.Length);
        foreach (var scheme in schemes)
        {
            foreach (var ink in new[] { "ink", "quiet", "in", "doubtful", "out", "link" })
            {
                Assert.True(Contrast(scheme[ink], scheme["paper"]) >= 4.5, ink);
                Assert.True(Contrast(scheme[ink], scheme["shade"]) >= 4.5, ink);
            }
        }

        // The pictures' own letters, and what they become on a dark screen.
        Assert.True(Contrast("#1B2430", "#FFFFFF") >= 4.5 && Contrast("#566171", "#FFFFFF") >= 4.5);
        foreach (var onPaper in new[] { "#1B2430", "#566171" })
        {
            var onDark = Regex.Match(style, $@"\[fill=""{onPaper}""\] {{ fill: (#\w+)").Groups[1].Value;
            Assert.True(Contrast(onDark, schemes[1]["paper"]) >= 4.5, onPaper);
        }
    }

    [Fact]
    public void A_report_is_written_whole_and_only_as_html()
    {
        var folder = Directory.CreateTempSubdirectory("report").FullName;
        try
        {
            var report = Of(Checks.Healthy);
            Assert.Null(HtmlReport.Save(report, Path.Combine(folder, "a.html")));
            Assert.Equal(HtmlReport.Of(report), File.ReadAllText(Path.Combine(folder, "a.html")));
            Assert.Contains(".html", HtmlReport.Save(report, Path.Combine(folder, "a.pdf"))!.Message, StringComparison.Ordinal);
            Assert.Single(Directory.GetFileSystemEntries(folder));
        }
        finally
        {
            Directory.Delete(folder, true);
        }
    }

    private static Report Of(CheckResult result) =>
        new(result, CheckSettings.Default, [new ReportInput("Readings file", "fan-stage.csv", "at,value\r\nC1,6.61\r\n\tE1 & <b>,\"1\"\r\n")], "BenchCheck 1.0.0", Morning);

    private static XElement Parsed(CheckResult result) => XDocument.Parse(HtmlReport.Of(Of(result)), LoadOptions.PreserveWhitespace).Root!;

    private static string[] Headings(XElement page) => [.. page.Descendants("h2").Select(h => h.Value)];

    /// <summary>Cells of the body of a section's table.</summary>
    private static string[][] Rows(XElement page, string section) =>
        [.. page.Descendants("section").Single(s => s.Element("h2")?.Value == section).Descendants("tbody").Single().Elements("tr").Select(r => (string[])[.. r.Elements().Select(c => c.Value)])];

    private static double Contrast(string a, string b)
    {
        var (x, y) = (Luminance(a), Luminance(b));
        return (Math.Max(x, y) + 0.05) / (Math.Min(x, y) + 0.05);
    }

    private static double Luminance(string color)
    {
        double Channel(int at)
        {
            var value = int.Parse(color.AsSpan(at, 2), NumberStyles.HexNumber, CultureInfo.InvariantCulture) / 255.0;
            return value <= 0.03928 ? value / 12.92 : Math.Pow((value + 0.055) / 1.055, 2.4);
        }

        return 0.2126 * Channel(1) + 0.7152 * Channel(3) + 0.0722 * Channel(5);
    }

    [GeneratedRegex("<svg.*?</svg>", RegexOptions.Singleline)]
    private static partial Regex PictureText();

    [GeneratedRegex(@"<(\w+)[^<>]*/>")]
    private static partial Regex SelfClosed();

    [GeneratedRegex(@":root \{[^}]*\}")]
    private static partial Regex Variables();

    [GeneratedRegex(@"--(\w+): (#\w{6})")]
    private static partial Regex Colour();
}
