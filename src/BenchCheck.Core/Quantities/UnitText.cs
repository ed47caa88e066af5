namespace BenchCheck.Core.Quantities;

/// <summary>A unit as people write it, with its SI prefix: "mV", "kΩ", "kohm", "uA", "k".</summary>
internal static class UnitText
{
    /// <summary>Spellings of each unit; compared with case where one letter means two things, without it for whole words.</summary>
    private static readonly (Unit Unit, string Name, string[] Symbols, string[] Words)[] Known =
    [
        (Unit.Volt, "a voltage (V)", ["V", "v"], ["volt", "volts"]),
        (Unit.Ohm, "a resistance (Ω)", ["\u03A9", "\u2126", "R", "V/A"], ["ohm", "ohms"]),
        (Unit.Ampere, "a current (A)", ["A"], ["amp", "amps", "ampere", "amperes"]),
        (Unit.Hertz, "a frequency (Hz)", ["Hz", "hz"], ["hertz"]),
        (Unit.Watt, "a power (W)", ["W"], ["watt", "watts"]),
        (Unit.Farad, "a capacitance (F)", ["F"], ["farad", "farads"]),
        (Unit.Henry, "an inductance (H)", ["H"], ["henry", "henries"]),
        (Unit.Siemens, "a transconductance (S)", ["S", "A/V"], ["siemens"]),
        (Unit.Celsius, "a temperature (°C)", ["\u00B0C", "C", "degC"], []),
        (Unit.One, "a number without unit", ["V/V", "A/A"], []),
    ];

    /// <summary>The unit in words: "a voltage (V)".</summary>
    public static string Describe(Unit unit)
    {
        foreach (var known in Known)
        {
            if (known.Unit == unit) return known.Name;
        }

        return $"a value in {unit.Symbol}";
    }

    /// <summary>Power of ten of an SI prefix; null when the text is none. K is read as kilo, because no kelvin occur here.</summary>
    public static int? PrefixExponent(ReadOnlySpan<char> text) => text switch
    {
        "" => 0,
        "T" => 12,
        "G" => 9,
        "M" => 6,
        "k" or "K" => 3,
        "m" => -3,
        "u" or "\u00B5" or "\u03BC" => -6,
        "n" => -9,
        "p" => -12,
        "f" => -15,
        _ => null,
    };

    /// <summary>Reads a prefix alone or a prefix with a unit.</summary>
    /// <returns>the power of ten and the unit (null when the text holds a prefix only); null when the text is neither</returns>
    public static (int Exponent, Unit? Unit)? Read(ReadOnlySpan<char> text, Unit expected)
    {
        text = text.Trim();
        if (text.IsEmpty) return (0, null);
        if (ReadAs(expected, text) is { } exponent) return (exponent, expected);
        if (PrefixExponent(text) is { } alone) return (alone, null);
        foreach (var known in Known)
        {
            if (ReadAs(known.Unit, text) is { } other) return (other, known.Unit);
        }

        return null;
    }

    private static int? ReadAs(Unit unit, ReadOnlySpan<char> text)
    {
        foreach (var known in Known)
        {
            if (known.Unit != unit) continue;
            foreach (var symbol in known.Symbols)
            {
                if (text.EndsWith(symbol, StringComparison.Ordinal) && PrefixExponent(text[..^symbol.Length].TrimEnd()) is { } exponent) return exponent;
            }

            foreach (var word in known.Words)
            {
                if (text.EndsWith(word, StringComparison.OrdinalIgnoreCase) && PrefixExponent(text[..^word.Length].TrimEnd()) is { } exponent) return exponent;
            }
        }

        return null;
    }
}
