using BenchCheck.Core.Fitting;

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
        var whole = ChiSquaredTest.PValue(Math.Max(0, chiSquared), degreesOfFreedom);
        var single = values.Length == 0 ? 1 : LargestResidualTest.PValue(values.Max(), values.Length);
        return Math.Min(1, 2 * Math.Min(whole, single));
    }

    public static BoardVerdict Verdict(double pValue, double alpha) =>
        pValue <= alpha ? BoardVerdict.Disagrees : pValue <= 2 * alpha ? BoardVerdict.Undecided : BoardVerdict.Agrees;
}
