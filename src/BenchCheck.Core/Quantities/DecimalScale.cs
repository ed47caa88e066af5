namespace BenchCheck.Core.Quantities;

/// <summary>Multiplies by powers of ten so that short decimal numbers stay what they are written as.</summary>
internal static class DecimalScale
{
    /// <summary>value · 10^exponent, rounded once: 10^n is exact up to n = 22, so a negative exponent divides.</summary>
    public static double Apply(double value, int exponent) => exponent switch
    {
        >= 0 => value * Math.Pow(10, exponent),
        >= -300 => value / Math.Pow(10, -exponent),
        _ => value / 1e300 / Math.Pow(10, -exponent - 300),
    };
}
