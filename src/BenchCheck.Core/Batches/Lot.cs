using System.Collections.Immutable;
using BenchCheck.Core.Checking;
using BenchCheck.Core.Equations;
using BenchCheck.Core.Fitting;

namespace BenchCheck.Core.Batches;

/// <summary>What a lot of boards has in common.</summary>
/// <param name="Parameters">each over the lot</param>
/// <param name="MeanCovariance">V of the means, n×n</param>
/// <param name="Boards">how many it was found from</param>
public sealed record Lot(ImmutableArray<LotParameter> Parameters, double[] MeanCovariance, long Boards)
{
    /// <summary>The board's estimates anew with the lot in place of the parts list, and their variances.</summary>
    /// <remarks>m̂ = C (η + T⁻¹ μ); C + C T⁻¹ V T⁻¹ C, the second term because the lot's mean is itself only estimated (Morris 1983).</remarks>
    internal (double[] Mean, double[] Variance) Of(LotLikelihood board)
    {
        var n = Parameters.Length;
        double[] mu = [.. Parameters.Select(p => p.Mean)];
        double[] tau2 = [.. Parameters.Select(p => p.Spread * p.Spread)];
        var step = board.Step(tau2);
        var (mean, variance, shares) = (new double[n], new double[n], new double[n]);
        for (var i = 0; i < n; i++)
        {
            mean[i] = step.Estimate(i, mu, tau2);
            for (var j = 0; j < n; j++) shares[j] = step.Covariance[i * n + j] / tau2[j];
            variance[i] = step.Covariance[i * n + i];
            for (var j = 0; j < n; j++) variance[i] += shares[j] * LuFactor.Dot(MeanCovariance.AsSpan(j * n, n), shares);
        }

        return (mean, variance);
    }

    /// <summary>
    /// The result with each estimate beside what it is with the lot. A board that does not agree is left as it is, for a faulty part is not of
    /// the lot; so is one that the lot cannot help.
    /// </summary>
    public CheckResult Tighten(CheckResult result, BoardFit fit)
    {
        ArgumentNullException.ThrowIfNull(result);
        ArgumentNullException.ThrowIfNull(fit);
        if (result.Verdict != BoardVerdict.Agrees || LotLikelihood.At(fit.Model, fit.Plan, [.. Parameters.Select(p => p.Mean)]) is not { } board) return result;
        var (mean, variance) = Of(board);
        var places = Parameters.Select((p, i) => (p.Parameter, Index: i)).ToDictionary(p => (p.Parameter.Owner, p.Parameter.Kind, p.Parameter.Condition), p => p.Index);
        return result with
        {
            Parameters = [.. result.Parameters.Select(e => places.TryGetValue((e.Part, e.Kind, e.Condition), out var i) ? e with { WithLot = Estimate(Parameters[i].Parameter, mean[i], variance[i]) } : e)],
        };
    }

    private static LotEstimate Estimate(FitParameter parameter, double phi, double variance)
    {
        var value = parameter.Value(phi);
        return new LotEstimate(value, Math.Sqrt(variance) * (parameter.IsLogarithmic ? value : 1));
    }
}

/// <summary>One parameter over the lot, on the scale of φ (a logarithm for resistances and gains).</summary>
/// <param name="Mean">μ</param>
/// <param name="MeanUncertainty">standard uncertainty of μ</param>
/// <param name="Spread">τ, standard deviation from board to board</param>
/// <param name="Alone">standard uncertainty of one board's estimate with the parts list behind it, root mean square over the lot</param>
/// <param name="Together">the same with the lot behind it</param>
public sealed record LotParameter(FitParameter Parameter, double Mean, double MeanUncertainty, double Spread, double Alone, double Together)
{
    /// <summary>The mean in SI units; of a logarithm the geometric mean.</summary>
    public double Value => Parameter.Value(Mean);

    /// <summary>A standard deviation of φ in SI units, to first order at the mean.</summary>
    public double Scaled(double deviation) => Parameter.IsLogarithmic ? Value * deviation : deviation;
}
