using BenchCheck.Core.Fitting;

namespace BenchCheck.Core.Tests.Fitting;

/// <summary>A fitted linear model.</summary>
/// <param name="Estimates">n parameters; zero for those beyond the rank</param>
internal sealed record LinearFit(double[] Estimates, LeastSquaresStatistics Statistics);

/// <summary>Weighted linear least squares, y = X b + e with independent e_i of standard uncertainty u_i: one undamped step of the fit's own linearisation.</summary>
/// <remarks>Source: Lawson and Hanson, Solving Least Squares Problems (1974), ch. 11 and 25.</remarks>
internal static class LinearLeastSquares
{
    /// <param name="design">X, m×n row-major</param>
    /// <param name="observations">y, m</param>
    /// <param name="uncertainties">u, m, all positive</param>
    public static LinearFit Fit(ReadOnlySpan<double> design, ReadOnlySpan<double> observations, ReadOnlySpan<double> uncertainties)
    {
        var m = observations.Length;
        var n = design.Length / m;
        ArgumentOutOfRangeException.ThrowIfNotEqual(design.Length, m * n);
        ArgumentOutOfRangeException.ThrowIfNotEqual(uncertainties.Length, m);
        var at = new Linearisation(m, n);
        for (var i = 0; i < m; i++)
        {
            for (var j = 0; j < n; j++) at.Jacobian[i * n + j] = -design[i * n + j] / uncertainties[i];
        }

        var estimates = new double[n];
        var residuals = new double[m];
        var step = new double[n];
        Residuals(design, observations, uncertainties, estimates, residuals);
        at.Factor(residuals);
        at.GaussNewtonStep(step);
        at.Move(estimates, step, estimates);
        Residuals(design, observations, uncertainties, estimates, residuals);
        return new LinearFit(estimates, LeastSquaresStatistics.Of(at, residuals));
    }

    /// <summary>(y − X b)/u.</summary>
    private static void Residuals(
        ReadOnlySpan<double> design, ReadOnlySpan<double> observations, ReadOnlySpan<double> uncertainties, ReadOnlySpan<double> estimates, Span<double> residuals)
    {
        var n = estimates.Length;
        for (var i = 0; i < residuals.Length; i++)
        {
            var sum = observations[i];
            for (var j = 0; j < n; j++) sum = Math.FusedMultiplyAdd(-design[i * n + j], estimates[j], sum);
            residuals[i] = sum / uncertainties[i];
        }
    }
}
