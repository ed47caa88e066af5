namespace BenchCheck.Core.Quantities;

/// <summary>Numbers as people write them in parts lists and reading columns: "4k7", "652 mV", "47k 5%", "1.9 V ± 0.15 V", "80..320", "?".</summary>
/// <remarks>
/// <see cref="Number"/> reads a plain quantity, <see cref="Nominal"/> one with its tolerance. Both are total: whatever the text, they
/// return a value in SI units or a <see cref="TextFault"/> that says what was read and what was expected.
/// </remarks>
public static class QuantityText
{
    /// <summary>Magnitudes above this are refused: no quantity of a bench reaches it.</summary>
    public const double Largest = 1e15;

    private const string TolerancePhrase = "a tolerance: a percentage (5%) or ± a value (± 0.15 V)";

    /// <summary>Reads one quantity of the given unit: number with optional prefix and unit, or letter-and-digit code.</summary>
    public static Parsed<double> Number(string text, Unit unit)
    {
        ArgumentNullException.ThrowIfNull(text);
        var read = Quantity.Read(text, unit);
        if (read.Fault is not null) return read.Fault;
        return read.Value.CodeTolerance is null ? read.Value.Number : new TextFault(TextFault.Quote(text), $"{UnitText.Describe(unit)} without a tolerance");
    }

    /// <summary>Reads what a parts list says of one number; <paramref name="usual"/> is the tolerance where the text states none.</summary>
    public static Parsed<Nominal> Nominal(string text, Unit unit, Tolerance usual)
    {
        ArgumentNullException.ThrowIfNull(text);
        var span = text.AsSpan().Trim();
        if (span is "?") return Quantities.Nominal.Unknown;
        var range = span.IndexOf("..", StringComparison.Ordinal);
        if (range >= 0) return Range(text, span[..range], span[(range + 2)..].TrimStart('.'), unit);
        var ellipsis = span.IndexOf('\u2026');
        if (ellipsis >= 0) return Range(text, span[..ellipsis], span[(ellipsis + 1)..], unit);
        foreach (var sign in (ReadOnlySpan<string>)["\u00B1", "+/-", "+-"])
        {
            var at = span.IndexOf(sign, StringComparison.Ordinal);
            if (at >= 0) return PlusMinus(text, span[..at], span[(at + sign.Length)..], unit);
        }

        if (span.EndsWith("%")) return Percentage(text, span, unit);
        var read = Quantity.Read(text, unit);
        if (read.Fault is not null) return read.Fault;
        return read.Value.CodeTolerance is { } percent
            ? Quantities.Nominal.Within(read.Value.Number, Tolerance.Percent(percent))
            : Quantities.Nominal.Within(read.Value.Number, usual, true);
    }

    /// <summary>Reads a unit with its prefix ("mV", "kohm", "m"): the factor to SI, and the unit where one is named.</summary>
    public static Parsed<(double Factor, Unit? Unit)> UnitWithPrefix(string text)
    {
        ArgumentNullException.ThrowIfNull(text);
        return UnitText.Read(text, Unit.Volt) is { } read
            ? (Math.Pow(10, read.Exponent), read.Unit)
            : new TextFault($"unit {TextFault.Quote(text)}", "V, A, Ω or a unit with its prefix: mV, kohm, uA");
    }

    private static Parsed<Nominal> Percentage(string text, ReadOnlySpan<char> span, Unit unit)
    {
        var body = span[..^1].TrimEnd();
        var start = body.Length;
        while (start > 0 && (char.IsAsciiDigit(body[start - 1]) || body[start - 1] is '.' or ',')) start--;
        var value = body[..start].TrimEnd().TrimEnd(',').TrimEnd('/');
        if (value.IsEmpty && unit == Unit.One && NumberText.Read(body, out var rest) is { } share && rest.IsEmpty)
            return Quantities.Nominal.Within(share / 100, Tolerance.Absolute(0.05), true);
        if (value.IsEmpty) return new TextFault(TextFault.Quote(text), $"{UnitText.Describe(unit)} before the tolerance");
        if (value.Length == start) return new TextFault(TextFault.Quote(text), "a space before the tolerance", "4k75% could be 4k7 5% or 4k 75%");
        var read = Quantity.Read(value, unit);
        if (read.Fault is not null) return read.Fault;
        if (read.Value.CodeTolerance is not null) return new TextFault(TextFault.Quote(text), "one tolerance", "both a tolerance letter and a percentage are given");
        return WithPercent(text, read.Value.Number, body[start..]);
    }

    private static Parsed<Nominal> WithPercent(string text, double value, ReadOnlySpan<char> percentText)
    {
        if (NumberText.Read(percentText.Trim(), out var rest) is not { } percent || !rest.IsEmpty) return new TextFault(TextFault.Quote(text), TolerancePhrase);
        if (percent is < 0 or >= 100) return new TextFault(TextFault.Quote(text), "a tolerance of 0 % or more and less than 100 %", "a wider spread is written as a range: low..high");
        return Quantities.Nominal.Within(value, Tolerance.Percent(percent));
    }

    private static Parsed<Nominal> PlusMinus(string text, ReadOnlySpan<char> left, ReadOnlySpan<char> right, Unit unit)
    {
        left = left.Trim();
        right = right.Trim();
        if (right.EndsWith("%"))
        {
            var only = Quantity.Read(left, unit);
            if (only.Fault is not null) return only.Fault;
            return WithPercent(text, only.Value.Number, right[..^1]);
        }

        var half = Quantity.Read(right, unit);
        if (half.Fault is not null) return half.Fault.Read == TextFault.Quote(right) ? half.Fault with { Expected = TolerancePhrase } : half.Fault;
        if (half.Value.Number < 0) return new TextFault(TextFault.Quote(text), TolerancePhrase, "the sign is already in ±");
        if (left.IsEmpty) return Quantities.Nominal.Within(0, Tolerance.Absolute(half.Value.Number));
        var value = Quantity.Read(left, unit);
        if (value.Fault is not null) return value.Fault;
        var (number, width) = (value.Value, half.Value);
        if (number.IsBare && !width.IsBare) number = number.ScaledBy(width.Exponent);
        else if (width.IsBare && number.Exponent != 0 && width.Number != 0)
            return new TextFault(TextFault.Quote(text), TolerancePhrase, $"write the tolerance with % or with its unit: ± {right} is ambiguous beside a prefix");
        return Quantities.Nominal.Within(number.Number, Tolerance.Absolute(width.Number));
    }

    private static Parsed<Nominal> Range(string text, ReadOnlySpan<char> left, ReadOnlySpan<char> right, Unit unit)
    {
        var first = Quantity.Read(left, unit);
        if (first.Fault is not null) return first.Fault;
        var second = Quantity.Read(right, unit);
        if (second.Fault is not null) return second.Fault;
        var (low, high) = (first.Value, second.Value);
        if (low.CodeTolerance is not null || high.CodeTolerance is not null) return new TextFault(TextFault.Quote(text), "a range low..high without tolerance");
        if (low.IsBare && high.Exponent != 0)
        {
            var shared = low.ScaledBy(high.Exponent);
            if (!high.IsSpaced && low.Number <= high.Number && shared.Number <= high.Number && low.Number != 0)
                return new TextFault(TextFault.Quote(text), "a range low..high", $"write the prefix on both ends: {left.Trim()} could be meant with or without it");
            if (high.IsSpaced || low.Number > high.Number) low = shared;
        }

        if (low.Number > high.Number) return new TextFault(TextFault.Quote(text), "a range low..high", "the lower end comes first");
        return Quantities.Nominal.Between(low.Number, high.Number);
    }

    /// <summary>A number as it was written.</summary>
    /// <param name="Exponent">power of ten of the prefix, already applied to <paramref name="Number"/></param>
    /// <param name="IsBare">neither prefix nor unit stood with it</param>
    /// <param name="IsSpaced">a space stood before prefix and unit</param>
    private readonly record struct Quantity(double Number, int Exponent, bool IsBare, bool IsSpaced, double? CodeTolerance)
    {
        public Quantity ScaledBy(int exponent) => this with { Number = DecimalScale.Apply(Number, exponent), Exponent = exponent };

        public static Parsed<Quantity> Read(ReadOnlySpan<char> text, Unit unit)
        {
            text = text.Trim();
            if (text.IsEmpty) return new TextFault("nothing", UnitText.Describe(unit));
            if (CodeIn(text, unit) is { } code)
                return new Quantity(code.Value, 0, false, false, unit == Unit.Ohm || unit == Unit.Farad ? code.TolerancePercent : null);
            if (NumberText.Read(text, out var suffix) is not { } number) return new TextFault(TextFault.Quote(text), UnitText.Describe(unit), NotANumber(text));
            if (UnitText.Read(suffix, unit) is not { } read) return new TextFault(TextFault.Quote(text), UnitText.Describe(unit), $"{TextFault.Quote(suffix)} is no unit or prefix known here");
            if (read.Unit is { } other && other != unit) return new TextFault($"{TextFault.Quote(text)}, {UnitText.Describe(other)}", UnitText.Describe(unit));
            var value = DecimalScale.Apply(number, read.Exponent);
            if (!(Math.Abs(value) <= Largest)) return new TextFault(TextFault.Quote(text), $"{UnitText.Describe(unit)} of at most 1e15", "M is mega, m is milli");
            return new Quantity(value, read.Exponent, suffix.IsEmpty, text.Length > suffix.Length && char.IsWhiteSpace(text[^(suffix.Length + 1)]), null);
        }

        private static LetterDigitCode? CodeIn(ReadOnlySpan<char> text, Unit unit)
        {
            // "-4k7" is a negative reading of an offset meter; the code itself knows no sign.
            var negative = text.Length > 1 && text[0] is '-' or '\u2212';
            var body = negative || text[0] == '+' ? text[1..] : text;

            // The unit may follow the code: "4k7 Ω"; a prefix with its unit ("10mA", "47nF") is no code.
            if (LetterDigitCode.Parse(body) is not { } code)
            {
                var space = body.LastIndexOf(' ');
                if (space < 0 || UnitText.Read(body[space..], unit) is not { Exponent: 0 } following || following.Unit != unit
                    || LetterDigitCode.Parse(body[..space]) is not { TolerancePercent: null } bare || !char.IsAsciiDigit(body[space - 1])) return null;
                return bare with { Value = negative ? -bare.Value : bare.Value };
            }

            if (char.IsLetter(body[^1]) && (code.TolerancePercent is null || (unit != Unit.Ohm && unit != Unit.Farad))) return null;
            if (body.Contains('V') && unit != Unit.Volt) return null;
            return code with { Value = negative ? -code.Value : code.Value };
        }

        private static string? NotANumber(ReadOnlySpan<char> text) => text switch
        {
            _ when text.Contains("nan", StringComparison.OrdinalIgnoreCase) || text.Contains("inf", StringComparison.OrdinalIgnoreCase) =>
                "a value is a finite number",
            _ when text.IndexOfAnyInRange('0', '9') < 0 => "a number is needed, such as 4.7, 4k7 or 652 mV",
            _ => null,
        };
    }
}
