using System.Globalization;
using System.Text;
using System.Xml.Linq;
using BenchCheck.Plots.Figures;
using BenchCheck.Plots.Typefaces;

namespace BenchCheck.Plots.Reports;

/// <summary>Elements of the report. Text is escaped when the page is written, and whatever would steer or reorder it is replaced by "·".</summary>
internal static class Html
{
    /// <summary>Longest text of a file that the page repeats, in characters.</summary>
    private const int LongestText = 200_000;

    private const int LongestName = 60;

    private static readonly XNamespace Svg = "http://www.w3.org/2000/svg";

    public static XElement Of(string name, params object?[] content) => new(name, [.. content, ""]);

    public static XAttribute Class(string name) => new("class", name);

    /// <summary>A sentence that may hold text from a file.</summary>
    public static string Text(string text) => FigureText.Clean(text);

    /// <summary>A name from a file, cut where it is longer than any sensible one; the input below the tables has it whole.</summary>
    public static string Name(string name) => FigureText.Clean(name, LongestName);

    public static XElement Section(string title, params object?[] content) => Of("section", Of("h2", title), content);

    public static XElement List(IEnumerable<string> entries) => Of("ul", entries.Select(e => Of("li", Text(e))));

    /// <summary>A table that scrolls by itself on a narrow screen.</summary>
    /// <param name="headers">those of columns of numbers start with "&gt;"</param>
    /// <param name="rows">cells; the first of a row names it</param>
    public static XElement Table(string caption, IReadOnlyList<string> headers, IEnumerable<IReadOnlyList<object>> rows)
    {
        var isNumber = headers.Select(h => h.StartsWith('>')).ToArray();
        return Of("div", Class("wide"), new XAttribute("role", "region"), new XAttribute("aria-label", caption), new XAttribute("tabindex", "0"), Of("table",
            Of("caption", Of("span", caption)),
            Of("thead", Of("tr", headers.Select((h, i) => Cell("th", isNumber[i], new XAttribute("scope", "col"), h.TrimStart('>'))))),
            Of("tbody", rows.Select(row => Of("tr", row.Select((content, i) =>
                i == 0 ? Cell("th", false, new XAttribute("scope", "row"), content) : Cell("td", isNumber[i], content)))))));
    }

    /// <summary>A mark of the pictures, drawn beside the word that says the same.</summary>
    /// <param name="symbol">in, doubtful or out</param>
    public static XElement MarkOf(string symbol) => new(
        Svg + "svg", Class("mark"), new XAttribute("viewBox", "0 0 12 12"), new XAttribute("aria-hidden", "true"),
        symbol switch
        {
            "in" => [new XElement(Svg + "circle", Attributes("cx", "6", "cy", "6", "r", "5", "fill", "currentColor"))],
            "doubtful" => [new XElement(Svg + "path", Attributes("d", "M6 1.4 10.6 6 6 10.6 1.4 6Z", "fill", "none", "stroke", "currentColor", "stroke-width", "2"))],
            _ => new object[]
            {
                new XElement(Svg + "path", Attributes("d", "M1 1H11V11H1Z", "fill", "currentColor")),
                new XElement(Svg + "path", Attributes("d", "M3.2 3.2 8.8 8.8M8.8 3.2 3.2 8.8", "style", "stroke: var(--paper)", "stroke-width", "2")),
            },
        });

    public static XElement Plot(Figure figure, string idPrefix) =>
        Of("figure", Of("div", Class("wide"), new XAttribute("role", "region"), new XAttribute("aria-label", figure.Title), new XAttribute("tabindex", "0"), XElement.Parse(figure.ToSvg(idPrefix))),
            Of("figcaption", figure.Description));

    /// <summary>A file as it was read, line by line.</summary>
    public static IEnumerable<XElement> Verbatim(string text)
    {
        var shown = new StringBuilder(Math.Min(text.Length, LongestText));
        foreach (var rune in (text.Length > LongestText ? text.AsSpan(0, LongestText) : text).EnumerateRunes())
        {
            if (rune.Value is '\n' or '\t') shown.Append((char)rune.Value);
            else if (rune.Value != '\r') shown.Append(FigureText.Shown(rune));
        }

        yield return Of("pre", new XAttribute("tabindex", "0"), shown.ToString());
        if (text.Length > LongestText)
            yield return Of("p", string.Create(CultureInfo.InvariantCulture, $"The first {LongestText} of {text.Length} characters are shown."));
    }

    private static XElement Cell(string name, bool isNumber, params object[] content) => Of(name, isNumber ? Class("number") : null, content);

    private static IEnumerable<XAttribute> Attributes(params string[] pairs)
    {
        for (var i = 0; i < pairs.Length; i += 2) yield return new XAttribute(pairs[i], pairs[i + 1]);
    }
}
