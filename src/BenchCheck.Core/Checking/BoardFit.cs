using BenchCheck.Core.Equations;
using BenchCheck.Core.Fitting;

namespace BenchCheck.Core.Checking;

/// <summary>The healthy board fitted to the readings, and its prediction before them.</summary>
/// <remarks>
/// A tolerance is a reading of the part by its maker: the residual of that row, over its own standard deviation, tells how far the readings
/// pull the part from its nominal value, as the residual of a reading tells how far the rest disagrees with it.
/// </remarks>
public sealed class BoardFit
{
    private BoardFit(BoardModel model, ReadingPlan plan, EvidenceFit fit)
    {
        Model = model;
        Plan = plan;
        var p = model.Parameters.Length;
        Phi = fit.Phi.ToArray();
        Stacked = new StackedFit(model, plan.Measured, plan.Noise);
        Summary = Stacked.Minimise(Phi);
        Covariance = new double[p * p];
        Stacked.Covariance(Covariance);
        Fitted = new double[model.ReadingCount];
        model.Predict(Phi, Fitted, []);
        var normalised = Stacked.Statistics(Phi).NormalisedResiduals;
        // The fit's residual is fitted − measured.
        NormalisedResiduals = [.. normalised.Take(model.ReadingCount).Select(r => -r)];
        PriorScores = Pulls(model, normalised.AsSpan(model.ReadingCount..));

        // Before the readings: nominal values, except that what the list leaves unknown stands at its estimate.
        Start = new double[p];
        for (var i = 0; i < p; i++) Start[i] = model.Parameters[i].IsUnknown ? Phi[i] : model.Parameters[i].Mean;
        Predicted = new double[model.ReadingCount];
        PriorJacobian = new double[model.ReadingCount * p];
        model.Forget();
        model.Predict(Start, Predicted, PriorJacobian);
    }

    public BoardModel Model { get; }

    public ReadingPlan Plan { get; }

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

    /// <summary>One a parameter, in the order of φ; zero for an unknown, which is pulled from nothing.</summary>
    private static double[] Pulls(BoardModel model, ReadOnlySpan<double> normalised)
    {
        var result = new double[model.Parameters.Length];
        var row = 0;
        for (var k = 0; k < result.Length; k++)
        {
            if (model.Parameters[k].IsUnknown) continue;
            var pull = normalised[row++];
            result[k] = double.IsNaN(pull) ? 0 : pull;
        }

        return result;
    }
}
