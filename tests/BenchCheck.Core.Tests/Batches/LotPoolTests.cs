using BenchCheck.Core.Batches;
using BenchCheck.Core.Boards;
using BenchCheck.Core.Fitting;
using BenchCheck.Core.Quantities;
using Xunit;

namespace BenchCheck.Core.Tests.Batches;

public sealed class LotPoolTests
{
    private const double PriorMean = 5;
    private const double PriorSigma = 0.4;

    [Fact]
    public void For_boards_of_equal_uncertainty_the_lot_is_the_closed_form_of_the_normal_case()
    {
        const double S = 0.1;
        double[] y = [5.31, 5.02, 4.77, 5.18, 5.44, 4.95, 5.27, 5.09, 5.61, 4.88];
        var lot = Pool(y, [.. y.Select(_ => S)]);
        var mean = y.Average();
        var tau2 = y.Sum(v => (v - mean) * (v - mean)) / y.Length - S * S;
        Assert.True(tau2 > 0);
        var parameter = lot.Parameters[0];
        Assert.Equal(mean, parameter.Mean, 1e-6);
        Assert.Equal(Math.Sqrt(tau2), parameter.Spread, 1e-5);
        Assert.Equal(Math.Sqrt((tau2 + S * S) / y.Length), parameter.MeanUncertainty, 1e-5);
        for (var k = 0; k < y.Length; k++)
        {
            Assert.Equal(mean + tau2 / (tau2 + S * S) * (y[k] - mean), lot.Boards[k].Together[0], 1e-5);
            Assert.Equal(Math.Sqrt(tau2 * S * S / (tau2 + S * S)), lot.Boards[k].TogetherUncertainty[0], 1e-5);
        }
    }

    [Fact]
    public void For_boards_of_unequal_uncertainty_the_marginal_likelihood_stands_still_at_the_lot()
    {
        double[] y = [5.31, 5.02, 4.77, 5.18, 5.44, 4.95, 5.27, 5.09, 5.61, 4.88];
        double[] s = [0.05, 0.2, 0.1, 0.07, 0.3, 0.1, 0.02, 0.15, 0.4, 0.1];
        var parameter = Pool(y, s).Parameters[0];
        var (best, mu, tau) = (LogLikelihood(parameter.Mean, parameter.Spread), parameter.Mean, parameter.Spread);
        foreach (var (m, t) in new[] { (mu + 0.01, tau), (mu - 0.01, tau), (mu, tau + 0.01), (mu, tau - 0.01) }) Assert.True(LogLikelihood(m, t) < best);

        double LogLikelihood(double m, double t) => -0.5 * y.Zip(s, (v, u) => Math.Log(t * t + u * u) + (v - m) * (v - m) / (t * t + u * u)).Sum();
    }

    [Fact]
    public void A_lot_tightens_boards_that_their_readings_leave_open_and_hardly_moves_those_they_settle()
    {
        double[] y = [5.31, 5.02, 5.27, 5.18, 5.24, 5.15, 5.27, 5.09, 4.1];
        double[] s = [0.02, 0.02, 0.02, 0.02, 0.02, 0.02, 0.02, 0.02, 0.6];
        var lot = Pool(y, s);
        Assert.Equal(y[0], lot.Boards[0].Together[0], 0.02);
        Assert.InRange(lot.Boards[8].Together[0], 5.0, 5.2);
        Assert.True(lot.Boards[8].TogetherUncertainty[0] < 0.5 * lot.Boards[8].AloneUncertainty[0]);
    }

    [Fact]
    public void What_the_readings_tell_only_of_a_ratio_is_shared_between_both_parameters()
    {
        // Readings that see φ₁ − φ₂ alone, which is 0.1 on every board: the lot moves one up and the other down by half of it.
        var pool = new LotPool([Parameter(), Parameter()]);
        const double Weight = 1 / (PriorSigma * PriorSigma);
        const double Seen = 1 / (0.01 * 0.01);
        for (var k = 0; k < 20; k++)
        {
            // Precision [[w + q, −q], [−q, w + q]], inverted by hand.
            var determinant = Weight * (Weight + 2 * Seen);
            double[] covariance = [(Weight + Seen) / determinant, Seen / determinant, Seen / determinant, (Weight + Seen) / determinant];
            var shift = 0.1 * Seen / (Weight + 2 * Seen);
            Assert.True(pool.Add(null, [PriorMean + shift, PriorMean - shift], covariance));
        }

        var lot = pool.Solve(TestContext.Current.CancellationToken)!;
        Assert.Equal(0.1, lot.Parameters[0].Mean - lot.Parameters[1].Mean, 0.002);
        Assert.Equal(PriorMean, (lot.Parameters[0].Mean + lot.Parameters[1].Mean) / 2, 1e-6);
    }

    private static LotEstimate Pool(double[] y, double[] s)
    {
        var pool = new LotPool([Parameter()]);
        for (var k = 0; k < y.Length; k++)
        {
            var variance = 1 / (1 / (s[k] * s[k]) + 1 / (PriorSigma * PriorSigma));
            Assert.True(pool.Add(null, [variance * (y[k] / (s[k] * s[k]) + PriorMean / (PriorSigma * PriorSigma))], [variance]));
        }

        return pool.Solve(TestContext.Current.CancellationToken)!;
    }

    private static FitParameter Parameter() => new("Q1", ParameterKind.Gain, null, Nominal.Between(100, 300), 0, true, PriorMean, PriorSigma);
}
