using System.Globalization;

namespace BenchCheck.Core.Quantities;

/// <summary>The letter-and-digit code of component markings (IEC 60062:2016): 4K7, R47, 2M2, and with a tolerance letter 27KK, 1R8J.</summary>
/// <remarks>
/// One letter stands where the decimal point would and names the multiplier; a second letter at the end names the tolerance. A trailing K or M
/// after another multiplier letter is therefore a tolerance: 27K is 27 kΩ, 27KK is 27 kΩ ± 10 %. Besides the standard's capitals, the small
/// letters k and r of parts lists are read, p n u µ m of capacitor marks, and V between digits for a voltage (5V1: common practice, no source).
/// </remarks>
/// <param name="Value">in the unit of the part: ohms, farads, volts</param>
/// <param name="TolerancePercent">null when the code carries no tolerance letter</param>
public readonly record struct LetterDigitCode(double Value, double? TolerancePercent)
{
    private const int LongestDigits = 12;

    /// <summary>Percent of each tolerance letter; A to M of IEC 60062, the letters E, L, P, W, which sources give differently, are not read.</summary>
    public static double? ToleranceOf(char letter) => letter switch
    {
        'A' => 0.05,
        'B' => 0.1,
        'C' => 0.25,
        'D' => 0.5,
        'F' => 1,
        'G' => 2,
        'J' => 5,
        'K' => 10,
        'M' => 20,
        _ => null,
    };

    /// <summary>The code in <paramref name="text"/>, or null when the text is none ("4.7k", "47k 5%" and "47" are not codes).</summary>
    public static LetterDigitCode? Parse(ReadOnlySpan<char> text)
    {
        text = text.Trim();
        var before = DigitsAt(text, 0);
        if (before > LongestDigits || before >= text.Length || ExponentOf(text[before]) is not { } exponent) return null;
        var letter = text[before];
        var after = DigitsAt(text, before + 1);
        if (after > LongestDigits || before + after == 0) return null;
        var rest = text[(before + 1 + after)..];
        double? tolerance = null;
        if (rest.Length == 1) tolerance = ToleranceOf(rest[0]);
        if (rest.Length > 1 || (rest.Length == 1 && tolerance is null)) return null;

        // "10mF" and "47kF" are prefix and unit; only a capital multiplier, as marked on a part, may be followed directly by a tolerance.
        if (tolerance is not null && after == 0 && letter is not ('R' or 'K' or 'M' or 'G' or 'T' or 'L')) return null;
        if (letter is 'V' && (after == 0 || before == 0 || tolerance is not null)) return null;
        var digits = string.Concat(before == 0 ? "0" : text[..before], ".", after == 0 ? "0" : text.Slice(before + 1, after),
            string.Create(CultureInfo.InvariantCulture, $"e{exponent}"));
        return new LetterDigitCode(double.Parse(digits, NumberStyles.Float, CultureInfo.InvariantCulture), tolerance);
    }

    /// <summary>
    /// A resistance as marked, with at most four significant digits: 4700 is "4K7", 0.47 "R47". Null where the code has no letter for it
    /// (below 1 mΩ, at or above 1000 TΩ, or not finite).
    /// </summary>
    public static string? Mark(double ohms)
    {
        if (!(ohms >= 1e-3 && ohms < 0.99995e15)) return null;
        var rounded = decimal.Parse(ohms.ToString("E3", CultureInfo.InvariantCulture), NumberStyles.Float, CultureInfo.InvariantCulture);
        var (letter, scale) = rounded switch
        {
            < 0.1m => ('L', 0.001m),
            < 1_000m => ('R', 1m),
            < 1_000_000m => ('K', 1_000m),
            < 1_000_000_000m => ('M', 1_000_000m),
            < 1_000_000_000_000m => ('G', 1_000_000_000m),
            _ => ('T', 1_000_000_000_000m),
        };
        var parts = (rounded / scale).ToString("0.######", CultureInfo.InvariantCulture).Split('.');
        return (parts[0] == "0" ? "" : parts[0]) + letter + (parts.Length > 1 ? parts[1] : "");
    }

    private static int? ExponentOf(char letter) => letter switch
    {
        'R' or 'r' or 'V' => 0,
        'K' or 'k' => 3,
        'M' => 6,
        'G' => 9,
        'T' => 12,
        'L' or 'm' => -3,
        'u' or '\u00B5' or '\u03BC' => -6,
        'n' => -9,
        'p' => -12,
        _ => null,
    };

    private static int DigitsAt(ReadOnlySpan<char> text, int start)
    {
        var length = 0;
        while (start + length < text.Length && char.IsAsciiDigit(text[start + length])) length++;
        return length;
    }
}
