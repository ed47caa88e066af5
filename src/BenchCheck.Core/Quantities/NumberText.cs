using System.Globalization;

namespace BenchCheck.Core.Quantities;

/// <summary>The number at the start of a text: sign, digits with decimal point or comma, thousands separators, exponent.</summary>
/// <remarks>
/// A single comma is a decimal comma, because values at the bench carry prefixes and not thousands. Where point and comma both occur, the
/// last one is the decimal mark and the other must part groups of three digits; one mark that occurs twice or more parts thousands.
/// Spaces (also the narrow and unbreakable ones) and apostrophes part groups of three as well.
/// </remarks>
internal static class NumberText
{
    private const int Longest = 64;

    /// <summary>Reads the number; <paramref name="rest"/> is what follows it, trimmed. Null when the text does not begin with a number.</summary>
    public static double? Read(ReadOnlySpan<char> text, out ReadOnlySpan<char> rest)
    {
        rest = text;
        Span<char> digits = stackalloc char[Longest + 2];
        var length = 0;
        var position = 0;
        if (!text.IsEmpty && text[0] is '+' or '-' or '\u2212')
        {
            digits[length++] = text[0] == '+' ? '+' : '-';
            position = 1;
        }

        var end = MantissaEnd(text, position);
        var mantissa = text[position..end];
        if (mantissa.Length > Longest - 8 || mantissa.IndexOfAnyInRange('0', '9') < 0) return null;
        if (!AppendMantissa(mantissa, digits, ref length)) return null;
        position = end;
        var exponent = ExponentLength(text[position..]);
        if (exponent > 6) return null;
        text.Slice(position, exponent).CopyTo(digits[length..]);
        digits[..(length + exponent)].Replace('\u2212', '-');
        length += exponent;
        if (!double.TryParse(digits[..length], NumberStyles.Float, CultureInfo.InvariantCulture, out var value)) return null;
        rest = text[(position + exponent)..].Trim();
        return value;
    }

    private static int MantissaEnd(ReadOnlySpan<char> text, int start)
    {
        var end = start;
        while (end < text.Length && (char.IsAsciiDigit(text[end]) || IsDecimalMark(text[end])
            || (IsGroupMark(text[end]) && end > start && char.IsAsciiDigit(text[end - 1]) && IsGroupOfThree(text[(end + 1)..]))))
        {
            // ".." begins the upper end of a range
            if (text[end] == '.' && end + 1 < text.Length && text[end + 1] == '.') break;
            end++;
        }

        return end;
    }

    private static bool IsDecimalMark(char c) => c is '.' or ',';

    private static bool IsGroupMark(char c) => c is ' ' or '\u00A0' or '\u202F' or '\u2009' or '\'' or '\u2019';

    private static bool IsGroupOfThree(ReadOnlySpan<char> text) =>
        text.Length >= 3 && char.IsAsciiDigit(text[0]) && char.IsAsciiDigit(text[1]) && char.IsAsciiDigit(text[2])
        && (text.Length == 3 || (!char.IsAsciiDigit(text[3]) && text[3] != '%' && !text[3..].TrimStart().StartsWith('%')));

    private static bool AppendMantissa(ReadOnlySpan<char> mantissa, Span<char> digits, ref int length)
    {
        var mark = mantissa.LastIndexOfAny('.', ',');
        var isDecimal = mark >= 0 && mantissa.Count(mantissa[mark]) == 1;
        var whole = isDecimal ? mantissa[..mark] : mantissa;
        var sinceGroup = -1;
        foreach (var c in whole)
        {
            if (char.IsAsciiDigit(c))
            {
                digits[length++] = c;
                if (sinceGroup >= 0) sinceGroup++;
            }
            else
            {
                if (sinceGroup is >= 0 and not 3) return false;
                sinceGroup = 0;
            }
        }

        if (sinceGroup is >= 0 and not 3) return false;
        if (!isDecimal) return true;
        digits[length++] = '.';
        foreach (var c in mantissa[(mark + 1)..])
        {
            if (!char.IsAsciiDigit(c)) return false;
            digits[length++] = c;
        }

        return true;
    }

    private static int ExponentLength(ReadOnlySpan<char> text)
    {
        if (text.IsEmpty || text[0] is not ('e' or 'E')) return 0;
        var position = text.Length > 1 && text[1] is '+' or '-' or '\u2212' ? 2 : 1;
        var start = position;
        while (position < text.Length && char.IsAsciiDigit(text[position])) position++;
        return position > start ? position : 0;
    }
}
