using BenchCheck.Core.Checking;
using BenchCheck.Core.Equations;
using BenchCheck.Core.Fitting;

namespace BenchCheck.Core.Batches;

/// <summary>What the readings of one board say of its parameters, the parts list left out: a normal likelihood in φ.</summary>
/// <remarks>
/// With f and J at a reference φ_r common to the lot, ln L = −½ φᵀ Λ φ + ηᵀ φ, Λ = Jᵀ W J, η = Jᵀ W (y − f + J φ_r); W⁻¹ is the covariance of the readings:
/// their noise, and what is not of the board (scale errors of the meter, differences between conditions) with its own prior. The reference has to be common:
/// derivatives taken at each board's own estimate go with its errors, and over many boards that bends what the readings leave open. Shapes: n parameters.
/// </remarks>
/// <param name="information">Λ, n×n row-major</param>
/// <param name="score">η, n</param>
internal sealed class LotLikelihood(double[] information, double[] score)
{
    /// <summary>Spread given to a number that neither belongs to the lot nor has a tolerance.</summary>
    private const double Open = 1e3;

    /// <summary>Positions in φ of the parameters that a lot shares.</summary>
    public static int[] Shared(BoardModel model) =>
        [.. Enumerable.Range(0, model.BoardParameterCount).Where(i => model.Parameters[i].Kind.IsReported)];

    /// <param name="reference">φ_r, n: the shared parameters</param>
    /// <returns>null when the board has no operating state there</returns>
    public static LotLikelihood? At(BoardModel model, ReadingPlan plan, double[] reference)
    {
        var (m, p, shared) = (plan.Measured.Length, model.Parameters.Length, Shared(model));
        double[] phi = [.. model.Parameters.Select(x => x.Mean)];
        for (var i = 0; i < shared.Length; i++) phi[shared[i]] = reference[i];
        var (predicted, jacobian) = (new double[m], new double[m * p]);
        try
        {
            model.Forget();
            model.Predict(phi, predicted, jacobian);
        }
        catch (NoOperatingStateException)
        {
            return null;
        }

        var covariance = new double[m * m];
        for (var i = 0; i < m; i++) covariance[i * m + i] = plan.Noise[i];
        foreach (var k in Enumerable.Range(0, p).Except(shared))
        {
            var sigma = model.Parameters[k].IsUnknown ? Open : model.Parameters[k].Sigma;
            for (var i = 0; i < m; i++)
            {
                for (var j = 0; j < m; j++) covariance[i * m + j] += sigma * sigma * jacobian[i * p + k] * jacobian[j * p + k];
            }
        }

        return Cholesky.Factor(covariance, m) ? Of(covariance, jacobian, p, shared, [.. plan.Measured.Zip(predicted, (y, f) => y - f)], reference) : null;
    }

    /// <summary>The board at spreads τ.</summary>
    public LotStep Step(double[] tau2)
    {
        var n = tau2.Length;
        var covariance = Inverse([.. tau2.Select(t => 1 / t)]) ?? throw new InvalidOperationException("the lot left a board undetermined");
        var own = new double[n];
        var ofMean = new double[n * n];
        for (var i = 0; i < n; i++)
        {
            own[i] = LuFactor.Dot(covariance.AsSpan(i * n, n), score);
            for (var j = 0; j < n; j++) ofMean[i * n + j] = -covariance[i * n + j] / (tau2[i] * tau2[j]) + (i == j ? 1 / tau2[i] : 0);
        }

        return new LotStep(covariance, own, [.. own.Select((x, i) => x / tau2[i])], ofMean);
    }

    /// <summary>(Λ + diag weights)⁻¹, n×n; null where that does not determine every parameter.</summary>
    public double[]? Inverse(double[] weights)
    {
        var n = weights.Length;
        var precision = information.ToArray();
        for (var i = 0; i < n; i++) precision[i * n + i] += weights[i];
        return Array.TrueForAll(precision, double.IsFinite) && Cholesky.Factor(precision, n) ? Cholesky.Inverse(precision, n) : null;
    }

    private static LotLikelihood Of(double[] factor, double[] jacobian, int p, int[] shared, double[] residuals, double[] reference)
    {
        var (m, n) = (residuals.Length, shared.Length);
        // Columns whitened by the factor of W⁻¹, kept as rows.
        var whitened = new double[n * m];
        for (var k = 0; k < n; k++)
        {
            var row = whitened.AsSpan(k * m, m);
            for (var i = 0; i < m; i++) row[i] = jacobian[i * p + shared[k]];
            Cholesky.SolveLower(factor, m, row);
        }

        Cholesky.SolveLower(factor, m, residuals);
        for (var k = 0; k < n; k++) LuFactor.AddScaled(residuals, whitened.AsSpan(k * m, m), reference[k]);
        var (information, score) = (new double[n * n], new double[n]);
        for (var k = 0; k < n; k++)
        {
            score[k] = LuFactor.Dot(whitened.AsSpan(k * m, m), residuals);
            for (var l = 0; l < n; l++) information[k * n + l] = LuFactor.Dot(whitened.AsSpan(k * m, m), whitened.AsSpan(l * m, m));
        }

        return new LotLikelihood(information, score);
    }
}

/// <summary>One board at given spreads τ.</summary>
/// <param name="Covariance">C = (Λ + T⁻¹)⁻¹, n×n</param>
/// <param name="Own">C η: the estimates where the lot's mean is zero</param>
/// <param name="Score">T⁻¹ C η, which the board adds to the score of μ</param>
/// <param name="Information">T⁻¹ − T⁻¹ C T⁻¹, which it adds to the information on μ, n×n</param>
internal sealed record LotStep(double[] Covariance, double[] Own, double[] Score, double[] Information)
{
    /// <summary>m̂ = C (η + T⁻¹ μ), its element i.</summary>
    public double Estimate(int i, double[] mu, double[] tau2)
    {
        var sum = Own[i];
        for (var j = 0; j < mu.Length; j++) sum += Covariance[i * mu.Length + j] * mu[j] / tau2[j];
        return sum;
    }
}
