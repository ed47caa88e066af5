using System.Collections.Immutable;
using System.Globalization;
using System.Text;
using System.Xml.Linq;
using BenchCheck.Core.Checking;
using BenchCheck.Plots.Figures;

namespace BenchCheck.Plots.Reports;

/// <summary>A check as one printable page that stands alone: no script, nothing fetched, readable on paper, on a phone and in the dark.</summary>
public static class HtmlReport
{
    /// <summary>Forbids the page whatever it does not need, should a hostile name ever get through.</summary>
    private const string Policy = "default-src 'none'; style-src 'unsafe-inline'; base-uri 'none'; form-action 'none'";

    /// <summary>The whole page.</summary>
    public static string Of(Report report)
    {
        ArgumentNullException.ThrowIfNull(report);
        var result = report.Result;
        var title = Heading.BoardAndSerial(result);
        var page = Html.Of("html", new XAttribute("lang", "en"),
            Html.Of("head",
                new XElement("meta", new XAttribute("charset", "utf-8")),
                new XElement("meta", new XAttribute("http-equiv", "Content-Security-Policy"), new XAttribute("content", Policy)),
                new XElement("meta", new XAttribute("name", "viewport"), new XAttribute("content", "width=device-width, initial-scale=1")),
                Html.Of("title", $"{title}: {Words.Of(result.Verdict)}"),
                Html.Of("style", ReportStyle.Text())),
            Html.Of("body", Html.Of("main",
                Html.Of("header", Html.Of("h1", title), Html.Of("p", Html.Class("about"), $"Checked {Time(report)} with {Html.Text(report.ProgramVersion)}")),
                Verdict(result),
                Cautions(result),
                ReadingSections.Of(result),
                Pictures(result),
                FaultSections.Of(result),
                EstimateSections.Of(result),
                MethodSection.Of(report),
                Inputs(report.Inputs),
                Html.Of("footer", Html.Of("p", "A verdict is a computation on the readings, not a safety test. Local rules and the judgement of a qualified person come first.")))));
        return "<!DOCTYPE html>\n" + page.ToString(SaveOptions.DisableFormatting) + "\n";
    }

    /// <summary>Writes the page whole or not at all.</summary>
    /// <returns>null when written, else what is wrong</returns>
    public static FileFault? Save(Report report, string path)
    {
        ArgumentNullException.ThrowIfNull(path);
        return Path.GetExtension(path).ToUpperInvariant() is ".HTML" or ".HTM"
            ? WholeFile.Write(path, Encoding.UTF8.GetBytes(Of(report)))
            : new FileFault(path, "a report is written as .html; give the file such a name");
    }

    private static XElement Verdict(CheckResult result)
    {
        var symbol = result.Verdict switch { BoardVerdict.Agrees => "in", BoardVerdict.Undecided => "doubtful", _ => "out" };
        var sentence = result.Verdict switch
        {
            BoardVerdict.Agrees => "The board agrees with its parts list.",
            BoardVerdict.Undecided => "Undecided whether the board agrees with its parts list.",
            _ => "The board disagrees with its parts list.",
        };
        var chance = result.PValue < 1e-4 ? "p < 0.0001" : string.Create(CultureInfo.InvariantCulture, $"p = {result.PValue:G2}");
        var chiSquared = string.Create(CultureInfo.InvariantCulture, $"χ² = {result.ChiSquared:G4} with {result.DegreesOfFreedom} degrees of freedom, {chance}");
        var mark = Html.MarkOf(symbol);
        mark.SetAttributeValue("class", symbol);
        return Html.Of("section", Html.Class($"verdict is-{symbol}"), new XAttribute("aria-label", "Verdict"), mark, Html.Of("div",
            Html.Of("p", Html.Class("sentence"), Html.Of("strong", Html.Class(symbol), sentence), " " + Html.Text(result.Reason)),
            Html.Of("p", Html.Class("small"), chiSquared)));
    }

    private static XElement Cautions(CheckResult result) => Html.Of("section", Html.Class("cautions"),
        Html.Of("h2", "Cautions"),
        Html.Of("ul", result.Cautions.Select(c => Html.Of("li", c.StartsWith("HAZARD", StringComparison.Ordinal) ? Html.Class("hazard") : null, Html.Text(c)))));

    private static XElement Pictures(CheckResult result)
    {
        (Figure Figure, string Id)[] plots = [(ReadingPlot.Bands(result), "bands-"), (ReadingPlot.Residuals(result), "residuals-"), (EstimatePlot.Narrow(result), "estimates-")];
        return Html.Section("Pictures", Html.Of("div", Html.Class("plots"), plots.Select(p => Html.Plot(p.Figure, p.Id))));
    }

    private static XElement Inputs(ImmutableArray<ReportInput> inputs) => Html.Section(
        "Inputs", inputs.Select(i => Html.Of("div", Html.Of("h3", $"{Html.Text(i.Role)}: {Html.Text(i.Name)}"), Html.Verbatim(i.Text))));

    private static string Time(Report report) => report.Time.ToString("yyyy-MM-dd HH:mm:ss 'UTC'zzz", CultureInfo.InvariantCulture);
}
