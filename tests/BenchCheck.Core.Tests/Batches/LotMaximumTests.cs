using BenchCheck.Core.Batches;
using BenchCheck.Core.Boards;
using BenchCheck.Core.Fitting;
using BenchCheck.Core.Quantities;
using Xunit;

namespace BenchCheck.Core.Tests.Batches;

public sealed class LotMaximumTests
{
    private const double PriorMean = 5;
    private const double PriorSigma = 0.4;

    private static readonly double[] Y = [5.31, 5.02, 4.77, 5.18, 5.44, 4.95, 5.27, 5.09, 5.61, 4.88];

    private static readonly FitParameter Unknown = Parameter("Q1") with { Sigma = double.PositiveInfinity };

    [Fact]
    public void For_an_unknown_and_boards_of_equal_uncertainty_the_lot_is_the_closed_form_of_the_normal_case()
    {
        const double S = 0.1;
        var n = Y.Length;
        var lot = Pool(Unknown, Y, [.. Y.Select(_ => S)]);
        var mean = Y.Average();
        var tau2 = Y.Sum(v => (v - mean) * (v - mean)) / n - S * S;
        Assert.True(tau2 > 0);
        var shrink = tau2 / (tau2 + S * S);
        var parameter = lot.Parameters[0];
        Assert.Equal(mean, parameter.Mean, 1e-6);
        Assert.Equal(Math.Sqrt(tau2), parameter.Spread, 1e-6);
        Assert.Equal(Math.Sqrt((tau2 + S * S) / n), parameter.MeanUncertainty, 1e-6);
        for (var k = 0; k < n; k++)
        {
            Assert.Equal(mean + shrink * (Y[k] - mean), lot.Boards[k].Together, 1e-6);
            // Morris, J. Amer. Stat. Assoc. 78 (1983) 47: the uncertainty of the mean counts with the share that it has in the estimate.
            Assert.Equal(Math.Sqrt(S * S * shrink + (1 - shrink) * (1 - shrink) * (tau2 + S * S) / n), lot.Boards[k].TogetherUncertainty, 1e-6);
        }
    }

    [Fact]
    public void The_parts_list_counts_for_the_mean_with_what_the_spread_leaves_of_it_and_for_the_spread_as_one_board()
    {
        double[] s = [0.05, 0.2, 0.1, 0.07, 0.3, 0.1, 0.02, 0.15, 0.4, 0.1];
        var parameter = Pool(Parameter("Q1"), Y, s).Parameters[0];
        var (mu, tau) = (parameter.Mean, parameter.Spread);
        var best = LogPosterior(mu, tau);
        foreach (var (m, t) in new[] { (mu + 0.001, tau), (mu - 0.001, tau), (mu, tau + 0.001), (mu, tau - 0.001) }) Assert.True(LogPosterior(m, t) < best);

        double LogPosterior(double m, double t) =>
            -0.5 * (Y.Zip(s, (v, u) => Math.Log(t * t + u * u) + (v - m) * (v - m) / (t * t + u * u)).Sum()
                + Math.Log(t * t) + PriorSigma * PriorSigma / (t * t) + (m - PriorMean) * (m - PriorMean) / (PriorSigma * PriorSigma - tau * tau));
    }

    [Fact]
    public void A_lot_tightens_boards_that_their_readings_leave_open_and_hardly_moves_those_they_settle()
    {
        double[] y = [5.31, 5.02, 5.27, 5.18, 5.24, 5.15, 5.27, 5.09, 4.1];
        double[] s = [0.02, 0.02, 0.02, 0.02, 0.02, 0.02, 0.02, 0.02, 0.6];
        var lot = Pool(Parameter("Q1"), y, s);
        Assert.Equal(y[0], lot.Boards[0].Together, 0.02);
        Assert.InRange(lot.Boards[8].Together, 5.0, 5.2);
        Assert.True(lot.Boards[8].TogetherUncertainty < 0.5 * lot.Boards[8].AloneUncertainty);
    }

    [Fact]
    public void What_the_readings_tell_only_of_a_ratio_is_shared_between_both_parameters()
    {
        // Readings that see φ₁ − φ₂ alone, which is 0.1 on every board: the lot moves one up and the other down by half of it.
        const double Seen = 1 / (0.01 * 0.01);
        LotLikelihood[] boards = [.. Enumerable.Range(0, 20).Select(_ => new LotLikelihood([Seen, -Seen, -Seen, Seen], [0.1 * Seen, -0.1 * Seen]))];
        var lot = LotMaximum.Of([Parameter("Q1"), Parameter("Q2")], boards, [PriorMean, PriorMean], 20, TestContext.Current.CancellationToken);
        Assert.Equal(0.1, lot.Parameters[0].Mean - lot.Parameters[1].Mean, 0.002);
        Assert.Equal(PriorMean, (lot.Parameters[0].Mean + lot.Parameters[1].Mean) / 2, 1e-6);
        // The sum stays as uncertain as the parts list leaves it: σ/√2 each, the spread within the lot included.
        var (mean, spread) = (lot.Parameters[0].MeanUncertainty, lot.Parameters[0].Spread);
        Assert.Equal(PriorSigma / Math.Sqrt(2), Math.Sqrt(mean * mean + spread * spread / 2), 0.01);
    }

    private static (LotParameter[] Parameters, LotBoard[] Boards) Pool(FitParameter parameter, double[] y, double[] s)
    {
        // Readings y ± s of the parameter itself.
        LotLikelihood[] boards = [.. y.Zip(s, (v, u) => new LotLikelihood([1 / (u * u)], [v / (u * u)]))];
        var lot = LotMaximum.Of([parameter], boards, [PriorMean], boards.Length, TestContext.Current.CancellationToken);
        double[] listed = [parameter.IsUnknown ? 0 : 1 / (PriorSigma * PriorSigma)];
        return ([.. lot.Parameters], [.. boards.Select(b => new LotBoard(Math.Sqrt(b.Inverse(listed)![0]), lot.Of(b).Mean[0], Math.Sqrt(lot.Of(b).Variance[0])))]);
    }

    private static FitParameter Parameter(string owner) => new(owner, ParameterKind.Gain, null, Nominal.Between(100, 300), 0, true, PriorMean, PriorSigma);

    private readonly record struct LotBoard(double AloneUncertainty, double Together, double TogetherUncertainty);
}
