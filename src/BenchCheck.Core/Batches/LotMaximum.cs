using System.Collections.Immutable;
using BenchCheck.Core.Fitting;

namespace BenchCheck.Core.Batches;

/// <summary>Finds the lot of greatest posterior from the likelihoods of its boards (empirical Bayes).</summary>
/// <remarks>
/// <para>
/// Boards k with likelihoods (Λ_k, η_k), φ_k ~ N(μ, T), T = diag τ². What the parts list says of a part, N(φ₀, σ²), is shared between the lot's
/// mean and the spread within it, μ ~ N(φ₀, σ² − τ²), never less than a tenth of σ²; of the spread it says as much as one board whose part lies σ off; of an
/// unknown it says nothing. With C_k = (Λ_k + T⁻¹)⁻¹ and m̂_k = C_k (η_k + T⁻¹ μ) the greatest
/// posterior has μ = V (Σ T⁻¹ C_k η_k + W φ₀), V⁻¹ = Σ (T⁻¹ − T⁻¹ C_k T⁻¹) + W with W = diag 1/(σ² − τ²), and τ² = (Σ (m̂_k − μ)² + σ²) / (Σ γ_k + 1), γ_k = 1 − C_k/τ²
/// the share of board k's estimate that its own readings determine (MacKay, Neural Computation 4 (1992) 415): both are taken in turn until they stand still.
/// </para>
/// <para>
/// For one unknown and boards of equal uncertainty s this is the closed form μ = ȳ, τ² = S² − s², m̂_k = μ + τ²/(τ² + s²) (y_k − μ) (Efron and Morris
/// 1973). All on the scale of φ: logarithms of resistances and gains. What the readings tell of two parameters only together (the ratio of a divider) the
/// lot tells no better.
/// </para>
/// </remarks>
internal static class LotMaximum
{
    private const int MostSteps = 500;
    private const double StandsStill = 1e-7;

    private const double LeastShareOfMean = 0.1;

    /// <summary>Below this, a ten-thousandth of a part or of a volt, boards count as alike.</summary>
    private const double LeastVariance = 1e-8;

    /// <param name="parameters">n</param>
    /// <param name="start">of the lot's mean, n</param>
    /// <param name="count">how many boards those given stand for</param>
    public static Lot Of(ImmutableArray<FitParameter> parameters, IReadOnlyList<LotLikelihood> boards, double[] start, long count, CancellationToken cancel)
    {
        var n = parameters.Length;
        var mu = start;
        double[] tau2 = [.. parameters.Select(p => p.IsUnknown ? 1 : p.Sigma * p.Sigma)];
        var steps = new LotStep[boards.Count];
        var posterior = new double[n * n];
        var moved = double.PositiveInfinity;
        for (var step = 0; step < MostSteps && moved > StandsStill; step++)
        {
            cancel.ThrowIfCancellationRequested();
            Parallel.For(0, boards.Count, k => steps[k] = boards[k].Step(tau2));
            var mean = Mean(parameters, tau2, steps, posterior);
            moved = 0;
            var next = new double[n];
            for (var i = 0; i < n; i++)
            {
                var (squares, determined) = parameters[i].IsUnknown ? (0.0, 0.0) : (parameters[i].Sigma * parameters[i].Sigma, 1.0);
                foreach (var board in steps)
                {
                    var off = board.Estimate(i, mean, tau2) - mean[i];
                    squares += off * off;
                    determined += 1 - board.Covariance[i * n + i] / tau2[i];
                }

                var spread = Math.Sqrt(tau2[i]);
                next[i] = Math.Max(squares / determined, LeastVariance);
                moved = Math.Max(moved, Math.Max(Math.Abs(mean[i] - mu[i]), Math.Abs(Math.Sqrt(next[i]) - spread)) / spread);
            }

            (mu, tau2) = (mean, next);
        }

        var lot = new Lot([.. parameters.Select((p, i) => new LotParameter(p, mu[i], Math.Sqrt(posterior[i * n + i]), Math.Sqrt(tau2[i]), 0, 0))], posterior, count);
        double[] listed = [.. parameters.Select(p => p.IsUnknown ? 0 : 1 / (p.Sigma * p.Sigma))];
        var alone = boards.Select(b => b.Inverse(listed)).ToArray();
        var together = boards.Select(b => lot.Of(b).Variance).ToArray();
        double Typical(Func<int, double> variance) => Math.Sqrt(Enumerable.Range(0, boards.Count).Average(variance));
        return lot with
        {
            Parameters = [.. lot.Parameters.Select((p, i) => p with { Alone = Typical(k => alone[k]?[i * n + i] ?? double.NaN), Together = Typical(k => together[k][i]) })],
        };
    }

    /// <summary>The lot's mean at the spreads that the steps were made with.</summary>
    /// <param name="posterior">receives its covariance V, n×n</param>
    private static double[] Mean(ImmutableArray<FitParameter> parameters, double[] tau2, LotStep[] steps, double[] posterior)
    {
        var n = parameters.Length;
        Array.Clear(posterior);
        var mean = new double[n];
        for (var i = 0; i < n; i++)
        {
            if (parameters[i].IsUnknown) continue;
            var listed = parameters[i].Sigma * parameters[i].Sigma;
            var weight = 1 / Math.Max(listed - tau2[i], LeastShareOfMean * listed);
            posterior[i * n + i] = weight;
            mean[i] = weight * parameters[i].Mean;
        }

        foreach (var step in steps)
        {
            for (var i = 0; i < n; i++) mean[i] += step.Score[i];
            for (var i = 0; i < n * n; i++) posterior[i] += step.Information[i];
        }

        if (!Cholesky.Factor(posterior, n)) throw new InvalidOperationException("the boards of the lot leave its mean undetermined");
        Cholesky.Solve(posterior, n, mean);
        Cholesky.Inverse(posterior, n).CopyTo(posterior, 0);
        return mean;
    }
}
