using MathNet.Numerics.Distributions;

namespace BenchCheck.Core.Fitting;

/// <summary>The largest normalised residual against what the largest of so many standard normal numbers may be.</summary>
/// <remarks>
/// Source: Handschin, Schweppe, Kohlas, Fiechter, IEEE Trans. PAS-94 (1975) 329-337; Mah and Tamhane, AIChE J. 28 (1982) 828-830 for the limit,
/// after Šidák, J. Amer. Statist. Assoc. 62 (1967) 626: it holds the false alarms of all readings together at or below α.
/// </remarks>
internal static class LargestResidualTest
{
    /// <summary>Probability that the largest of <paramref name="count"/> independent standard normal numbers is this large or larger in size.</summary>
    public static double PValue(double largest, int count)
    {
        var single = 2 * Normal.CDF(0, 1, -Math.Abs(largest));
        // For a small probability the power loses its digits, and the sum over the numbers is as good.
        return count * single < 1e-8 ? count * single : 1 - Math.Pow(1 - single, count);
    }

    /// <summary>Size that the largest of <paramref name="count"/> independent standard normal numbers exceeds with probability <paramref name="alpha"/>; correlated ones exceed it less often.</summary>
    public static double Limit(int count, double alpha) => -Normal.InvCDF(0, 1, 0.5 * (1 - Math.Pow(1 - alpha, 1.0 / count)));
}
