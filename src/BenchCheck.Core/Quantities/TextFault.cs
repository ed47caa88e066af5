using System.Globalization;
using System.Text;

namespace BenchCheck.Core.Quantities;

/// <summary>Why a text could not be taken: what was read, what was expected, and what to do about it.</summary>
public sealed record TextFault(string Read, string Expected, string? Hint = null)
{
    private const int LongestQuote = 60;

    /// <summary>A text from outside as it may stand in a message: in quotes, clipped, with control and invisible characters written out.</summary>
    public static string Quote(ReadOnlySpan<char> text)
    {
        var shown = new StringBuilder("\"");
        foreach (var c in text.Length > LongestQuote ? text[..LongestQuote] : text)
        {
            if (char.IsControl(c) || char.IsSurrogate(c)
                || char.GetUnicodeCategory(c) is UnicodeCategory.Format or UnicodeCategory.LineSeparator or UnicodeCategory.ParagraphSeparator)
                shown.Append(CultureInfo.InvariantCulture, $"\\u{(int)c:x4}");
            else
                shown.Append(c);
        }

        return shown.Append(text.Length > LongestQuote ? "\u2026\"" : "\"").ToString();
    }
}
