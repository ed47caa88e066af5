using System.Globalization;
using System.Xml;
using System.Xml.Linq;
using BenchCheck.Plots.Typefaces;

namespace BenchCheck.Plots.Figures;

/// <summary>Makes of the drawing library's SVG one that scales, speaks, falls back to any font and can stand beside others on a page.</summary>
internal static class SvgDocument
{
    private const string FontFallback = CarriedFaces.Family + ", system-ui, sans-serif";
    private const string Reference = "url(#";

    private static readonly XNamespace Svg = "http://www.w3.org/2000/svg";

    /// <param name="drawn">SVG of everything but <paramref name="texts"/></param>
    public static string Finished(Stream drawn, Figure figure, IEnumerable<TextItem> texts, string idPrefix)
    {
        using var reader = XmlReader.Create(drawn, new XmlReaderSettings { DtdProcessing = DtdProcessing.Prohibit, IgnoreWhitespace = true });
        var root = XDocument.Load(reader).Root!;
        foreach (var clearing in Clearings(root).ToArray())
        {
            clearing.ElementsBeforeSelf().Remove();
            clearing.Remove();
        }

        foreach (var text in root.Descendants(Svg + "text")) Settle(text);
        ShareClips(root, idPrefix);
        root.Add(texts.Select(Text));
        root.SetAttributeValue("viewBox", FormattableString.Invariant($"0 0 {figure.Width} {figure.Height}"));
        root.SetAttributeValue("role", "img");
        root.SetAttributeValue("aria-labelledby", $"{idPrefix}title {idPrefix}description");
        root.AddFirst(
            new XElement(Svg + "title", new XAttribute("id", idPrefix + "title"), figure.Title),
            new XElement(Svg + "desc", new XAttribute("id", idPrefix + "description"), figure.Description));
        return root.ToString() + "\n";
    }

    /// <summary>
    /// The plotting library clears its place before it draws, and may draw twice until its axes stand still; in SVG that becomes a rectangle
    /// without a fill, which shows as black, over what it was meant to clear.
    /// </summary>
    private static IEnumerable<XElement> Clearings(XElement root) =>
        root.Descendants(Svg + "rect").Where(r => r.Attribute("fill") is null && r.Parent!.Name != Svg + "clipPath");

    /// <summary>
    /// The drawing library places every letter by itself, which tears words apart in any other font. Here a text keeps its start and its length,
    /// and the font in use is fitted to that.
    /// </summary>
    private static void Settle(XElement text)
    {
        text.Value = text.Value.Trim();
        foreach (var name in new[] { "x", "y" })
        {
            if (text.Attribute(name) is { } places) places.Value = places.Value.Split(',')[0];
        }

        var size = float.Parse(text.Attribute("font-size")!.Value, CultureInfo.InvariantCulture);
        Fit(text, FigureText.Width(text.Value, size, FigureText.Regular));
    }

    private static XElement Text(TextItem item)
    {
        var text = new XElement(
            Svg + "text", new XAttribute("fill", item.Color.ToStringRGB()), new XAttribute("font-size", item.Size), new XAttribute("x", Rounded(item.Left)),
            new XAttribute("y", Rounded(item.Baseline)), item.Text);
        if (item.Weight > FigureText.Regular) text.SetAttributeValue("font-weight", "bold");
        Fit(text, item.Width);
        return text;
    }

    private static void Fit(XElement text, float width)
    {
        text.SetAttributeValue("font-family", FontFallback);
        if (text.Value.Length < 2) return;
        text.SetAttributeValue("textLength", Rounded(width));
        text.SetAttributeValue("lengthAdjust", "spacingAndGlyphs");
    }

    /// <summary>Every clip is kept once, under a number of its own on this page; the drawing library counts on from picture to picture.</summary>
    private static void ShareClips(XElement root, string idPrefix)
    {
        var known = new Dictionary<string, string>();
        var renamed = new Dictionary<string, string>();
        foreach (var clip in root.Descendants(Svg + "clipPath").ToArray())
        {
            var shape = string.Concat(clip.Elements());
            var isNew = known.TryAdd(shape, string.Create(CultureInfo.InvariantCulture, $"{idPrefix}clip-{known.Count + 1}"));
            renamed[clip.Attribute("id")!.Value] = known[shape];
            if (isNew) clip.SetAttributeValue("id", known[shape]);
            else clip.Remove();
        }

        foreach (var use in root.Descendants().Attributes("clip-path"))
            use.Value = $"{Reference}{renamed[use.Value[Reference.Length..^1]]})";
    }

    private static string Rounded(float value) => value.ToString("0.##", CultureInfo.InvariantCulture);
}
