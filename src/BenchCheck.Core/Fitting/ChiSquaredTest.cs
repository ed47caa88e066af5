using MathNet.Numerics;
using MathNet.Numerics.Distributions;

namespace BenchCheck.Core.Fitting;

/// <summary>The global test: a sum of squares of standard normal numbers against its degrees of freedom.</summary>
internal static class ChiSquaredTest
{
    /// <summary>Probability of a sum this large or larger; keeps its digits in the far tail, and is one without degrees of freedom.</summary>
    public static double PValue(double sum, int degreesOfFreedom) =>
        degreesOfFreedom == 0 ? 1 : SpecialFunctions.GammaUpperRegularized(0.5 * degreesOfFreedom, 0.5 * sum);

    /// <summary>What the sum exceeds with the probability <paramref name="alpha"/>.</summary>
    public static double Limit(int degreesOfFreedom, double alpha) => ChiSquared.InvCDF(degreesOfFreedom, 1 - alpha);
}
