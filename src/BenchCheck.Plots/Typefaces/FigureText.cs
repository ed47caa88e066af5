using System.Globalization;
using System.Text;
using SkiaSharp;

namespace BenchCheck.Plots.Typefaces;

/// <summary>Text as the pictures set it: which face, how wide, and which characters from a file may stand in it.</summary>
internal static class FigureText
{
    public const int Regular = 400;
    public const int Bold = 700;

    private const char Ellipsis = '…';
    private const string Mark = "·";

    /// <summary>Characters of a name that are looked at before it is cut to the width there is.</summary>
    private const int LongestRead = 400;

    /// <summary>
    /// A font that shows <paramref name="text"/>: the carried typeface or, for characters it lacks (another script), one that this machine has.
    /// </summary>
    public static SKFont Font(string text, float size, int weight)
    {
        var face = CarriedFaces.Nearest(weight);
        var missing = text.EnumerateRunes().FirstOrDefault(r => face.GetGlyph(r.Value) == 0);
        if (missing != default && SKFontManager.Default.MatchCharacter(missing.Value) is { } other) face = other;
        return new SKFont(face, size) { Subpixel = true, Hinting = SKFontHinting.None, Edging = SKFontEdging.Antialias };
    }

    public static float Width(string text, float size, int weight)
    {
        using var font = Font(text, size, weight);
        return font.MeasureText(text);
    }

    /// <summary>Text from a file made fit for a picture: characters that steer, hide or reorder text become "·", white space one space.</summary>
    /// <param name="longest">characters after which it is cut with "…"</param>
    public static string Clean(string text, int longest = LongestRead)
    {
        var result = new StringBuilder(Math.Min(text.Length, longest));
        foreach (var rune in text.EnumerateRunes())
        {
            if (result.Length >= longest) return result.Append(Ellipsis).ToString();
            if (rune.Value is '\t' or '\n' or '\r' || Rune.GetUnicodeCategory(rune) == UnicodeCategory.SpaceSeparator) result.Append(' ');
            else result.Append(Shown(rune));
        }

        return result.ToString().Trim();
    }

    /// <summary>The text, its end replaced by "…" when it is wider than there is room.</summary>
    public static string Fitted(string text, float width, float size, int weight)
    {
        if (Width(text, size, weight) <= width) return text;
        var clusters = StringInfo.ParseCombiningCharacters(text);
        for (var count = clusters.Length - 1; count > 0; count--)
        {
            var cut = text[..clusters[count]].TrimEnd() + Ellipsis;
            if (Width(cut, size, weight) <= width) return cut;
        }

        return Ellipsis.ToString();
    }

    /// <summary>The text in at most <paramref name="most"/> lines of a width, broken at spaces, the last one shortened when more would be needed.</summary>
    public static IReadOnlyList<string> Lines(string text, float width, float size, int weight, int most)
    {
        var lines = new List<string>();
        var rest = text;
        while (rest.Length > 0)
        {
            var taken = lines.Count == most - 1 ? rest : FirstLine(rest, width, size, weight);
            lines.Add(Fitted(taken, width, size, weight));
            rest = rest[taken.Length..].TrimStart();
        }

        return lines;
    }

    /// <summary>As many whole words as fit, at least one.</summary>
    private static string FirstLine(string text, float width, float size, int weight)
    {
        var line = "";
        foreach (var word in text.Split(' '))
        {
            var longer = line.Length == 0 ? word : $"{line} {word}";
            if (line.Length > 0 && Width(longer, size, weight) > width) break;
            line = longer;
        }

        return line;
    }

    /// <summary>The character itself, or "·" for one that steers, hides or reorders text.</summary>
    public static string Shown(Rune rune) => rune == Rune.ReplacementChar || Rune.GetUnicodeCategory(rune) is UnicodeCategory.Control or UnicodeCategory.Format
        or UnicodeCategory.LineSeparator or UnicodeCategory.ParagraphSeparator or UnicodeCategory.PrivateUse or UnicodeCategory.OtherNotAssigned or UnicodeCategory.Surrogate
        ? Mark : rune.ToString();
}
