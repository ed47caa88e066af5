namespace BenchCheck.Core.Metering;

/// <summary>Standard uncertainty of a quantity of which only limits are known (type B, JCGM 100:2008, 4.3).</summary>
public static class StandardUncertainty
{
    /// <summary>Anywhere within ±a, equally likely: a/√3 (4.3.7). What a specification or a tolerance that says no more means.</summary>
    public static double Rectangular(double halfWidth) => halfWidth / Math.Sqrt(3);

    /// <summary>Within ±a, likelier near the middle: a/√6 (4.3.9).</summary>
    public static double Triangular(double halfWidth) => halfWidth / Math.Sqrt(6);
}
