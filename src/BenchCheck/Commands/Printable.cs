using System.Globalization;
using System.Text;

namespace BenchCheck.Commands;

/// <summary>Text from files made fit for a terminal: whatever would steer it is replaced by a visible mark.</summary>
internal static class Printable
{
    private const int Longest = 200;

    /// <summary>Control, format, surrogate and line characters become "·"; very long text is cut with "…".</summary>
    public static string Text(string text)
    {
        var result = new StringBuilder(Math.Min(text.Length, Longest));
        foreach (var rune in text.EnumerateRunes())
        {
            if (result.Length >= Longest) return result.Append('…').ToString();
            var isSafe = Rune.GetUnicodeCategory(rune) is not (UnicodeCategory.Control or UnicodeCategory.Format or UnicodeCategory.LineSeparator
                or UnicodeCategory.ParagraphSeparator or UnicodeCategory.PrivateUse or UnicodeCategory.OtherNotAssigned or UnicodeCategory.Surrogate);
            if (isSafe && rune != Rune.ReplacementChar) result.Append(rune.ToString());
            else result.Append('·');
        }

        return result.ToString();
    }
}
