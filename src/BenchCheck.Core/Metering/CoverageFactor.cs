using Distributions = MathNet.Numerics.Distributions;

namespace BenchCheck.Core.Metering;

/// <summary>Factor by which a standard uncertainty is multiplied so that ± the product covers the value with a stated probability (JCGM 100:2008, annex G).</summary>
public static class CoverageFactor
{
    /// <summary>k_p of the normal distribution: 1.960 for 0.95.</summary>
    public static double Normal(double probability) => Distributions.Normal.InvCDF(0, 1, 0.5 + 0.5 * probability);

    /// <summary>t_p(ν) of Student's distribution, Table G.2.</summary>
    /// <param name="degreesOfFreedom">ν &gt; 0, whole or not; infinite gives the normal distribution</param>
    public static double StudentT(double probability, double degreesOfFreedom) => double.IsPositiveInfinity(degreesOfFreedom)
        ? Normal(probability)
        : Distributions.StudentT.InvCDF(0, 1, degreesOfFreedom, 0.5 + 0.5 * probability);
}
