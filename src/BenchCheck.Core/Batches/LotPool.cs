using System.Collections.Immutable;
using BenchCheck.Core.Checking;
using BenchCheck.Core.Fitting;

namespace BenchCheck.Core.Batches;

/// <summary>
/// Estimates of many boards of one lot taken together: the lot's own mean and spread of each parameter in place of the parts list's, and each
/// board's estimates anew with them (empirical Bayes).
/// </summary>
/// <remarks>
/// Board k's readings say of its parameters φ_k no more than a normal likelihood with information Λ_k and score η_k, found by taking the prior
/// (φ₀, σ) of the parts list out of the fit: Λ_k = V_k⁻¹ − diag 1/σ², η_k = V_k⁻¹ m_k − φ₀/σ². With φ_k ~ N(μ, diag τ²) the pair (μ, τ) of greatest
/// marginal likelihood is found by EM (Dempster, Laird, Rubin 1977): C_k = (Λ_k + diag 1/τ²)⁻¹, m̂_k = C_k (η_k + μ/τ²); μ ← mean m̂_k,
/// τ² ← mean ((m̂_k − μ)² + diag C_k). For one parameter and boards of equal uncertainty s this is the closed form μ = ȳ, τ² = max(0, S² − s²),
/// m̂_k = μ + τ²/(τ² + s²) (y_k − μ) (Efron and Morris 1973). All on the scale of φ: logarithms of resistances and gains.
/// What the readings tell of two parameters only together (the ratio of a divider) the lot tells no better: their means then share the difference.
/// </remarks>
public sealed class LotPool
{
    /// <summary>Fewest boards of which a spread can be told.</summary>
    public const int FewestBoards = 3;

    private const int MostSteps = 5000;
    private const double StandsStill = 1e-7;

    private readonly ImmutableArray<FitParameter> parameters;
    private readonly List<Likelihood> boards = [];

    /// <param name="parameters">those that vary from board to board; n of them</param>
    public LotPool(ImmutableArray<FitParameter> parameters) => this.parameters = parameters;

    /// <summary>The parameters of a fit that belong to the board and that a reading may find.</summary>
    public static ImmutableArray<FitParameter> Pooled(BoardFit fit)
    {
        ArgumentNullException.ThrowIfNull(fit);
        return [.. fit.Model.Parameters.Take(fit.Model.BoardParameterCount).Where(p => p.Kind.IsReported)];
    }

    /// <summary>Takes a board in; what is not pooled (scale errors of the meter) is averaged out with its own prior.</summary>
    /// <returns>false when its readings do not allow it: a parameter that neither they nor the parts list determine</returns>
    public bool Add(string? serial, BoardFit fit)
    {
        ArgumentNullException.ThrowIfNull(fit);
        var all = fit.Model.Parameters.Length;
        int[] chosen = [.. Enumerable.Range(0, fit.Model.BoardParameterCount).Where(i => fit.Model.Parameters[i].Kind.IsReported)];
        if (chosen.Length != parameters.Length) return false;
        var n = chosen.Length;
        var covariance = new double[n * n];
        for (var i = 0; i < n; i++)
        {
            for (var j = 0; j < n; j++) covariance[i * n + j] = fit.Covariance[chosen[i] * all + chosen[j]];
        }

        return Add(serial, [.. chosen.Select(i => fit.Phi[i])], covariance);
    }

    /// <param name="mean">estimates φ with the prior of the parts list, n</param>
    /// <param name="covariance">theirs, n×n row-major</param>
    public bool Add(string? serial, double[] mean, double[] covariance)
    {
        ArgumentNullException.ThrowIfNull(mean);
        var n = parameters.Length;
        ArgumentOutOfRangeException.ThrowIfNotEqual(mean.Length, n);
        if (Inverse(covariance, n) is not { } information) return false;
        var score = new double[n];
        for (var i = 0; i < n; i++)
        {
            for (var j = 0; j < n; j++) score[i] += information[i * n + j] * mean[j];
        }

        for (var i = 0; i < n; i++)
        {
            if (parameters[i].IsUnknown) continue;
            var weight = 1 / (parameters[i].Sigma * parameters[i].Sigma);
            information[i * n + i] -= weight;
            score[i] -= weight * parameters[i].Mean;
        }

        boards.Add(new Likelihood(serial, mean, [.. Enumerable.Range(0, n).Select(i => Math.Sqrt(covariance[i * n + i]))], information, score));
        return true;
    }

    /// <summary>The lot and its boards; null for fewer than <see cref="FewestBoards"/> boards.</summary>
    public LotEstimate? Solve(CancellationToken cancel = default)
    {
        if (boards.Count < FewestBoards) return null;
        var n = parameters.Length;
        var mu = new double[n];
        var tau2 = new double[n];
        for (var i = 0; i < n; i++)
        {
            mu[i] = parameters[i].IsUnknown ? boards.Average(b => b.Mean[i]) : parameters[i].Mean;
            tau2[i] = parameters[i].IsUnknown ? Math.Max(1e-6, boards.Average(b => (b.Mean[i] - mu[i]) * (b.Mean[i] - mu[i]))) : parameters[i].Sigma * parameters[i].Sigma;
        }

        var posteriors = new (double[] Mean, double[] Variance)[boards.Count];
        var moved = double.PositiveInfinity;
        for (var step = 0; step < MostSteps && moved > StandsStill; step++)
        {
            cancel.ThrowIfCancellationRequested();
            Parallel.For(0, boards.Count, k => posteriors[k] = boards[k].With(mu, tau2));
            moved = 0;
            for (var i = 0; i < n; i++)
            {
                var mean = posteriors.Average(p => p.Mean[i]);
                var variance = posteriors.Average(p => ((p.Mean[i] - mean) * (p.Mean[i] - mean)) + p.Variance[i]);
                var spread = Math.Sqrt(tau2[i]);
                moved = Math.Max(moved, Math.Max(Math.Abs(mean - mu[i]), Math.Abs(Math.Sqrt(variance) - spread)) / Math.Max(spread, 1e-12));
                (mu[i], tau2[i]) = (mean, variance);
            }
        }

        Parallel.For(0, boards.Count, k => posteriors[k] = boards[k].With(mu, tau2));
        return new LotEstimate(
            [.. parameters.Select((p, i) => new LotParameter(p, mu[i], MeanUncertainty(posteriors, tau2[i], i), Math.Sqrt(tau2[i])))],
            [.. boards.Select((b, k) => new LotBoard(b.Serial, [.. b.Mean], [.. b.Uncertainty], [.. posteriors[k].Mean], [.. posteriors[k].Variance.Select(Math.Sqrt)]))]);
    }

    /// <summary>Of the lot's mean: 1/u² = Σ 1/(τ² + s_k²), s_k the uncertainty that the readings alone leave, from 1/C_k = 1/s_k² + 1/τ².</summary>
    private static double MeanUncertainty((double[] Mean, double[] Variance)[] posteriors, double tau2, int i) =>
        1 / Math.Sqrt(posteriors.Sum(p => Math.Max(0, tau2 - p.Variance[i]) / (tau2 * tau2)));

    private static double[]? Inverse(double[] matrix, int n)
    {
        var factor = matrix.ToArray();
        if (!Array.TrueForAll(factor, double.IsFinite) || !Cholesky.Factor(factor, n)) return null;
        var result = new double[n * n];
        var column = new double[n];
        for (var j = 0; j < n; j++)
        {
            Array.Clear(column);
            column[j] = 1;
            Cholesky.Solve(factor, n, column);
            for (var i = 0; i < n; i++) result[i * n + j] = column[i];
        }

        return result;
    }

    private sealed record Likelihood(string? Serial, double[] Mean, double[] Uncertainty, double[] Information, double[] Score)
    {
        /// <summary>Estimates and their variances with the lot (μ, τ²) as prior.</summary>
        public (double[] Mean, double[] Variance) With(double[] mu, double[] tau2)
        {
            var n = mu.Length;
            var precision = Information.ToArray();
            var right = Score.ToArray();
            for (var i = 0; i < n; i++)
            {
                precision[i * n + i] += 1 / tau2[i];
                right[i] += mu[i] / tau2[i];
            }

            var covariance = Inverse(precision, n) ?? throw new InvalidOperationException("the lot's prior left a board undetermined");
            var mean = new double[n];
            for (var i = 0; i < n; i++)
            {
                for (var j = 0; j < n; j++) mean[i] += covariance[i * n + j] * right[j];
            }

            return (mean, [.. Enumerable.Range(0, n).Select(i => covariance[i * n + i])]);
        }
    }
}

/// <summary>What a lot of boards has in common.</summary>
/// <param name="Parameters">each over the lot</param>
/// <param name="Boards">each board's estimates, alone and with the lot, in the order of the parameters</param>
public sealed record LotEstimate(ImmutableArray<LotParameter> Parameters, ImmutableArray<LotBoard> Boards);

/// <summary>One parameter over the lot, on the scale of φ (a logarithm for resistances and gains).</summary>
/// <param name="Mean">μ</param>
/// <param name="MeanUncertainty">standard uncertainty of μ</param>
/// <param name="Spread">τ, standard deviation from board to board</param>
public sealed record LotParameter(FitParameter Parameter, double Mean, double MeanUncertainty, double Spread)
{
    /// <summary>The mean in SI units; of a logarithm the geometric mean.</summary>
    public double Value => Parameter.Value(Mean);

    /// <summary>The uncertainty of <see cref="Value"/>, SI units.</summary>
    public double ValueUncertainty => Scaled(Value, MeanUncertainty);

    /// <summary>The spread in SI units, to first order.</summary>
    public double ValueSpread => Scaled(Value, Spread);

    /// <summary>A standard deviation of φ at <paramref name="value"/>, in SI units, to first order.</summary>
    public double Scaled(double value, double deviation) => Parameter.IsLogarithmic ? value * deviation : deviation;
}

/// <summary>One board, on the scale of φ.</summary>
/// <param name="Alone">estimates with the parts list as prior</param>
/// <param name="Together">estimates with the lot as prior</param>
public sealed record LotBoard(
    string? Serial, ImmutableArray<double> Alone, ImmutableArray<double> AloneUncertainty, ImmutableArray<double> Together, ImmutableArray<double> TogetherUncertainty);
