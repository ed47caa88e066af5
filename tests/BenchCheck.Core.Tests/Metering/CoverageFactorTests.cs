using BenchCheck.Core.Metering;
using Xunit;

namespace BenchCheck.Core.Tests.Metering;

public class CoverageFactorTests
{
    /// <summary>JCGM 100:2008, Table G.2, as reprinted in NIST TN 1297, Table B.1: VERIFIED. The column 99.73 is at three standard deviations, not at 0.9973.</summary>
    [Fact]
    public void Table_of_the_guide_is_met_in_every_entry_but_one_misprint()
    {
        double[] probabilities = [0.6827, 0.90, 0.95, 0.9545, 0.99, 1 - 2.6997961e-3];
        var misprints = new List<(double, double)>();
        foreach (var row in ReferenceData.Rows("gum-table-g2-t-factors"))
        {
            var degrees = row[0] == "inf" ? double.PositiveInfinity : ReferenceData.Number(row[0]);
            for (var k = 0; k < probabilities.Length; k++)
            {
                var decimals = row[k + 1].Length - row[k + 1].IndexOf('.', StringComparison.Ordinal) - 1;
                var half = 0.5 * Math.Pow(10, -decimals);
                if (Math.Abs(CoverageFactor.StudentT(probabilities[k], degrees) - ReferenceData.Number(row[k + 1])) > 1.001 * half)
                    misprints.Add((degrees, probabilities[k]));
            }
        }

        // 35 degrees of freedom at 90 %: 1.70 is printed, 1.68957 is right.
        Assert.Equal([(35, 0.90)], misprints);
        Assert.Equal(1.68957, CoverageFactor.StudentT(0.90, 35), 5e-6);
    }

    /// <summary>Nine digits from 40-digit arithmetic; three decimals VERIFIED against a printed table.</summary>
    [Fact]
    public void Student_factors_have_eight_digits()
    {
        double[] probabilities = [1 - 0.31731050786, 0.90, 0.95, 1 - 0.04550026390, 0.99, 1 - 2.69979606326e-3, 0.999];
        foreach (var row in ReferenceData.Rows("student-t-factors"))
        {
            for (var k = 0; k < probabilities.Length; k++)
            {
                var digits = ReferenceData.Digits(CoverageFactor.StudentT(probabilities[k], ReferenceData.Number(row[0])), ReferenceData.Number(row[k + 1]));
                Assert.True(digits > 7.5, $"{row[0]} {probabilities[k]} {digits:F1}");
            }
        }
    }

    /// <summary>One degree of freedom: t = tan(π p/2) exactly (the Cauchy distribution).</summary>
    [Theory]
    [InlineData(0.5), InlineData(0.95), InlineData(0.99)]
    public void One_degree_of_freedom_is_the_tangent(double probability) =>
        Assert.True(ReferenceData.Digits(CoverageFactor.StudentT(probability, 1), Math.Tan(Math.PI * probability / 2)) > 9);

    /// <summary>Twelve digits from 40-digit arithmetic.</summary>
    [Fact]
    public void Normal_factors_have_eleven_digits()
    {
        foreach (var row in ReferenceData.Numbers("normal-quantiles").Where(r => r[0] > 0.5))
            Assert.True(ReferenceData.Digits(CoverageFactor.Normal(2 * row[0] - 1), row[1]) > 10.5, $"{row[0]}");
    }
}
