using BenchCheck.Core.Fitting;
using Xunit;

namespace BenchCheck.Core.Tests.Fitting;

public class ChiSquaredTestTests
{
    /// <summary>Quantiles to ten digits from 40-digit arithmetic, VERIFIED against printed five-decimal tables at 95, 97.5 and 99 %.</summary>
    [Fact]
    public void Tabulated_quantiles_are_met_both_ways()
    {
        double[] probabilities = [0.005, 0.01, 0.025, 0.05, 0.5, 0.90, 0.95, 0.975, 0.99, 0.995, 0.999];
        foreach (var row in ReferenceData.Numbers("chi-squared-quantiles"))
        {
            for (var k = 0; k < probabilities.Length; k++)
            {
                var (dof, quantile) = ((int)row[0], row[k + 1]);
                Assert.True(ReferenceData.Digits(ChiSquaredTest.Limit(dof, 1 - probabilities[k]), quantile) > 8, $"{dof} {probabilities[k]}");
                Assert.Equal(1 - probabilities[k], ChiSquaredTest.PValue(quantile, dof), 1e-9);
            }
        }
    }

    /// <summary>With two degrees of freedom the probability is exp(−x/2) exactly (elementary).</summary>
    [Theory]
    [InlineData(0), InlineData(1), InlineData(50), InlineData(400)]
    public void Far_tail_keeps_its_digits(double sum) => Assert.True(ReferenceData.Digits(ChiSquaredTest.PValue(sum, 2), Math.Exp(-sum / 2)) > 11);

    [Fact]
    public void Without_redundancy_nothing_is_said_against_the_readings() => Assert.Equal(1, ChiSquaredTest.PValue(0, 0));
}
