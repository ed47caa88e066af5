using BenchCheck.Core.Equations;
using BenchCheck.Core.Fitting;

namespace BenchCheck.Core.Checking;

/// <summary>The healthy board fitted to the readings, and its prediction before them.</summary>
/// <remarks>
/// Residuals after the fit: with S the covariance that the model gives the readings and d their innovation, the normalised residual of reading i
/// is (S⁻¹ d)ᵢ / √(S⁻¹)ᵢᵢ, which is the residual over its own standard deviation (Handschin et al., IEEE Trans. PAS-94 (1975)).
/// </remarks>
public sealed class BoardFit
{
    private BoardFit(BoardModel model, ReadingPlan plan, EvidenceFit fit)
    {
        Model = model;
        var p = model.Parameters.Length;
        Phi = fit.Phi.ToArray();
        Stacked = new StackedFit(model, plan.Measured, plan.Noise);
        Summary = Stacked.Minimise(Phi);
        Covariance = new double[p * p];
        Stacked.Covariance(Covariance);
        Fitted = new double[model.ReadingCount];
        model.Predict(Phi, Fitted, []);
        NormalisedResiduals = Normalised(fit);
        PriorScores = Scores(fit, p);

        // Before the readings: nominal values, except that what the list leaves unknown stands at its estimate.
        Start = new double[p];
        for (var i = 0; i < p; i++) Start[i] = model.Parameters[i].IsUnknown ? Phi[i] : model.Parameters[i].Mean;
        Predicted = new double[model.ReadingCount];
        PriorJacobian = new double[model.ReadingCount * p];
        model.Forget();
        model.Predict(Start, Predicted, PriorJacobian);
    }

    public BoardModel Model { get; }

    /// <summary>Minimum of Σ (y − f)²/u² + Σ (φ − φ₀)²/σ².</summary>
    public double ChiSquared => 2 * Summary.Cost;

    internal StackedFit Stacked { get; }

    /// <summary>How the fit went and why it stopped.</summary>
    internal LeastSquaresSummary Summary { get; }

    /// <summary>Fitted φ.</summary>
    public double[] Phi { get; }

    /// <summary>φ before the readings.</summary>
    public double[] Start { get; }

    /// <summary>Posterior covariance of φ, p×p; infinite on the diagonal, NaN beside it, where neither the list nor the readings determine a parameter.</summary>
    public double[] Covariance { get; }

    /// <summary>f(φ) after the fit.</summary>
    public double[] Fitted { get; }

    /// <summary>f at nominal values.</summary>
    public double[] Predicted { get; }

    /// <summary>Jacobian at nominal values, m×p.</summary>
    public double[] PriorJacobian { get; }

    /// <summary>One a reading; NaN where the fit passes through the reading whatever it is.</summary>
    public double[] NormalisedResiduals { get; }

    /// <summary>One a parameter: how far the readings pull it from its nominal value, in standard deviations of that pull.</summary>
    public double[] PriorScores { get; }

    /// <exception cref="NoOperatingStateException">the healthy board has no operating state</exception>
    public static BoardFit Of(BoardModel model, ReadingPlan plan, EvidenceFit fit)
    {
        ArgumentNullException.ThrowIfNull(model);
        ArgumentNullException.ThrowIfNull(plan);
        ArgumentNullException.ThrowIfNull(fit);
        model.Forget();
        var evidence = UnknownStarts.Fit(model, plan, fit);
        if (double.IsInfinity(evidence.ChiSquared)) throw new NoOperatingStateException("the board as drawn has no operating state");
        return new BoardFit(model, plan, fit);
    }

    private static double[] Normalised(EvidenceFit fit)
    {
        var m = fit.Innovation.Length;
        var result = new double[m];
        var column = new double[m];
        for (var i = 0; i < m; i++)
        {
            Array.Clear(column);
            column[i] = 1;
            Cholesky.Solve(fit.CovarianceFactor, m, column);
            // S⁻¹ᵢᵢ times the reading's own noise is the share of the residual that the fit leaves free.
            result[i] = column[i] > 0 ? fit.Innovation[i] / Math.Sqrt(column[i]) : double.NaN;
        }

        return result;
    }

    private static double[] Scores(EvidenceFit fit, int p)
    {
        var m = fit.Innovation.Length;
        var result = new double[p];
        var column = new double[m];
        for (var k = 0; k < p; k++)
        {
            var pull = 0.0;
            for (var i = 0; i < m; i++)
            {
                column[i] = fit.Jacobian[i * p + k];
                pull += column[i] * fit.Innovation[i];
            }

            Cholesky.SolveLower(fit.CovarianceFactor, m, column);
            var size = Math.Sqrt(LuFactor.Dot(column, column));
            result[k] = size * Math.Sqrt(fit.PriorVariance[k]) > 1e-6 ? pull / size : 0;
        }

        return result;
    }
}
