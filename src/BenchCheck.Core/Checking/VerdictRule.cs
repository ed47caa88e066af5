using MathNet.Numerics.Distributions;

namespace BenchCheck.Core.Checking;

/// <summary>Verdict of the board as a whole, with its false-alarm rate held for all readings together.</summary>
/// <remarks>
/// Two looks at the same readings share the risk α: the whole, by χ² against its degrees of freedom, and the single worst, by the largest
/// normalised residual among the readings and the largest pull on a parameter, against Šidák's limit for that many. A healthy board is called
/// disagreeing with probability at most α (Bonferroni); the band from α to 2α is undecided.
/// </remarks>
internal static class VerdictRule
{
    /// <summary>Probability that a healthy board looks this bad or worse.</summary>
    public static double PValue(double chiSquared, int degreesOfFreedom, IEnumerable<double> normalised)
    {
        var values = normalised.Where(double.IsFinite).Select(Math.Abs).ToArray();
        var whole = degreesOfFreedom > 0 ? 1 - ChiSquared.CDF(degreesOfFreedom, Math.Max(0, chiSquared)) : 1;
        var single = values.Length == 0 ? 1 : Sidak(2 * Normal.CDF(0, 1, -values.Max()), values.Length);
        return Math.Min(1, 2 * Math.Min(whole, single));
    }

    public static BoardVerdict Verdict(double pValue, double alpha) =>
        pValue <= alpha ? BoardVerdict.Disagrees : pValue <= 2 * alpha ? BoardVerdict.Undecided : BoardVerdict.Agrees;

    /// <summary>Limit for the largest of n independent standard normal values at risk α.</summary>
    public static double SidakLimit(double alpha, int n) => Normal.InvCDF(0, 1, 1 - (1 - Math.Pow(1 - alpha, 1.0 / n)) / 2);

    private static double Sidak(double p, int n) => p >= 1 ? 1 : 1 - Math.Exp(n * double.LogP1(-p));
}
