using System.Globalization;

namespace BenchCheck.Core.Quantities;

/// <summary>Numbers as an engineer writes them: three-step prefixes, and digits no finer than the uncertainty.</summary>
/// <remarks>
/// Everything finite that is written here is read back by <see cref="QuantityText"/>. An uncertainty has two significant digits and the value
/// the same last decimal (JCGM 100:2008, 7.2.6). Negative zero is zero; NaN is "unknown"; beyond the prefixes plain powers of ten stand.
/// </remarks>
public static class EngineeringNotation
{
    private const int LowestExponent = -15;
    private const int HighestExponent = 12;
    private const string Prefixes = "fpnµm kMGT";

    /// <summary>"4.702 kΩ".</summary>
    public static string Format(double value, Unit unit, int significantDigits = 4)
    {
        ArgumentOutOfRangeException.ThrowIfLessThan(significantDigits, 1);
        if (!double.IsFinite(value)) return WithoutDigits(value, unit);
        var scale = ScaleOf(value, unit, significantDigits);
        var scaled = scale.Apply(value);
        return Digits(scaled, significantDigits - 1 - Magnitude(scaled, significantDigits)) + scale.Suffix;
    }

    /// <summary>"4.702 ± 0.023 kΩ": two significant digits of the uncertainty, the value to match.</summary>
    /// <param name="uncertainty">zero or more, in the unit of the value; when it is zero or not finite the value stands alone, with four digits</param>
    public static string FormatWithUncertainty(double value, double uncertainty, Unit unit)
    {
        if (!double.IsFinite(value)) return WithoutDigits(value, unit);
        if (!(uncertainty > 0) || double.IsInfinity(uncertainty)) return Format(value, unit);
        var scale = ScaleOf(Math.Max(Math.Abs(value), uncertainty), unit, 4);
        var scaled = scale.Apply(uncertainty);
        var decimals = 1 - Magnitude(scaled, 2);
        return $"{Digits(scale.Apply(value), decimals)} \u00B1 {Digits(scaled, decimals)}{scale.Suffix}";
    }

    /// <summary>"4.47..4.94 kΩ": both ends with one prefix, as a board file writes a range.</summary>
    public static string Range(double low, double high, Unit unit, int significantDigits = 3)
    {
        if (!double.IsFinite(low) || !double.IsFinite(high))
            return $"{Format(low, unit, significantDigits)} to {Format(high, unit, significantDigits)}";
        var scale = ScaleOf(Math.Max(Math.Abs(low), Math.Abs(high)), unit, significantDigits);
        return $"{Trimmed(scale.Apply(low), significantDigits)}..{Trimmed(scale.Apply(high), significantDigits)}{scale.Suffix}";
    }

    private static string Trimmed(double scaled, int significantDigits)
    {
        var digits = Digits(scaled, significantDigits - 1 - Magnitude(scaled, significantDigits));
        return digits.Contains('.') && !digits.Contains('E') ? digits.TrimEnd('0').TrimEnd('.') : digits;
    }

    private static string WithoutDigits(double value, Unit unit) =>
        double.IsNaN(value) ? "unknown" : (value > 0 ? "\u221E" : "-\u221E") + (unit == Unit.One ? "" : $" {unit.Symbol}");

    /// <summary>Fixed-point digits; a negative number of decimals rounds to tens, hundreds, …</summary>
    private static string Digits(double scaled, int decimals)
    {
        if (decimals < 0)
        {
            var step = Math.Pow(10, -decimals);
            scaled = Math.Round(scaled / step) * step;
        }

        var text = scaled.ToString($"F{Math.Clamp(decimals, 0, 30)}", CultureInfo.InvariantCulture);
        return text.StartsWith('-') && text.AsSpan().IndexOfAnyInRange('1', '9') < 0 ? text[1..] : text;
    }

    /// <summary>Power of ten of the first digit, after rounding to so many digits; zero for zero.</summary>
    private static int Magnitude(double value, int significantDigits)
    {
        if (value == 0) return 0;
        var text = value.ToString($"E{significantDigits - 1}", CultureInfo.InvariantCulture);
        return int.Parse(text.AsSpan(text.IndexOf('E') + 1), NumberStyles.AllowLeadingSign, CultureInfo.InvariantCulture);
    }

    private static Scale ScaleOf(double value, Unit unit, int significantDigits)
    {
        var magnitude = Magnitude(value, significantDigits);
        var space = unit == Unit.One ? "" : $" {unit.Symbol}";
        if (unit == Unit.One || unit == Unit.Celsius)
            return magnitude is > -5 and < 7 || value == 0 ? new Scale(0, space) : new Scale(magnitude, Power(magnitude) + space);
        var exponent = magnitude >= 0 ? magnitude / 3 * 3 : (magnitude - 2) / 3 * 3;
        if (exponent is < LowestExponent or > HighestExponent) return new Scale(magnitude, Power(magnitude) + space);
        var prefix = Prefixes[(exponent - LowestExponent) / 3];
        return new Scale(exponent, prefix == ' ' ? space : $" {prefix}{unit.Symbol}");
    }

    private static string Power(int exponent) => string.Create(CultureInfo.InvariantCulture, $"e{exponent}");

    private readonly record struct Scale(int Exponent, string Suffix)
    {
        public double Apply(double value) => DecimalScale.Apply(value, -Exponent);
    }
}
