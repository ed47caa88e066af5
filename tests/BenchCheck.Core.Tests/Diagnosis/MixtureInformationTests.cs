using BenchCheck.Core.Diagnosis;
using Xunit;

namespace BenchCheck.Core.Tests.Diagnosis;

/// <summary>Expected information in bits against direct enumeration and limits known in closed form.</summary>
public class MixtureInformationTests
{
    [Fact]
    public void Far_apart_predictions_tell_the_whole_entropy() =>
        // Shannon: H(1/2, 1/4, 1/4) = 1.5 bits.
        Assert.Equal(1.5, MixtureInformation.Bits([0.5, 0.25, 0.25], [0, 100, 200], [1, 1, 1]), 1e-3);

    [Fact]
    public void Equal_predictions_tell_nothing() =>
        Assert.Equal(0, MixtureInformation.Bits([0.3, 0.7], [2, 2], [0.04, 0.04]), 1e-9);

    [Theory]
    [InlineData(0.5, 1.0, 1.0, 1.0)]
    [InlineData(0.2, 2.5, 1.0, 0.3)]
    [InlineData(0.9, 0.7, 0.1, 2.0)]
    public void Bits_agree_with_direct_enumeration(double probability, double gap, double sigma1, double sigma2)
    {
        // I = H(Y) − H(Y | H) by a fine sum over y, entropies in bits.
        double[] p = [probability, 1 - probability];
        double[] mean = [0, gap];
        double[] sigma = [sigma1, sigma2];
        const int points = 400_001;
        var (low, high) = (-12 * sigma.Max(), gap + 12 * sigma.Max());
        var step = (high - low) / (points - 1);
        var information = 0.0;
        for (var i = 0; i < points; i++)
        {
            var y = low + i * step;
            var mixture = 0.0;
            for (var h = 0; h < 2; h++) mixture += p[h] * Density(y, mean[h], sigma[h]);
            for (var h = 0; h < 2; h++)
            {
                var d = Density(y, mean[h], sigma[h]);
                if (d > 0) information += p[h] * d * Math.Log2(d / mixture) * step;
            }
        }

        Assert.Equal(information, MixtureInformation.Bits(p, mean, [sigma1 * sigma1, sigma2 * sigma2]), 2e-4 + 0.02 * information);
    }

    private static double Density(double y, double mean, double sigma) =>
        Math.Exp(-(y - mean) * (y - mean) / (2 * sigma * sigma)) / (sigma * Math.Sqrt(2 * Math.PI));
}
