namespace BenchCheck.Core.Fitting;

/// <summary>Minimises ½‖r(θ)‖² by the Levenberg-Marquardt method in its trust region form.</summary>
/// <remarks>
/// Each step p minimises ‖r + J p‖ with ‖D p‖ ≤ Δ; D holds the largest norms that the columns of J have had, which makes the method
/// indifferent to the units of the parameters. The multiplier λ of the constraint is found by Hebden's iteration on ‖D p(λ)‖ = Δ, from
/// one QR factorisation of J a point and an n×n triangularisation a λ. The model is called once an iteration and nothing is allocated.
/// Source: Levenberg, Quart. Appl. Math. 2 (1944) 164; Marquardt, J. SIAM 11 (1963) 431; Moré, LNM 630 (1978) 105-116, whose constants these are.
/// </remarks>
internal static class LevenbergMarquardt
{
    /// <summary>First radius against the length of the starting point.</summary>
    private const double FirstRadius = 100;

    /// <summary>Share of the predicted decrease that a step must bring to be accepted.</summary>
    private const double LeastGain = 1e-4;

    /// <summary>Two costs nearer than this are not told apart: residuals are small differences of large numbers and carry their rounding.</summary>
    private const double Rounding = 1e-10;

    /// <summary>Against an endless search at θ = 0, whose length is no measure.</summary>
    private const double SmallestRadius = 1e-300;

    /// <summary>How closely ‖D p‖ must meet the radius.</summary>
    private const double RadiusTolerance = 0.1;

    /// <summary>Minimises from θ and leaves the result in θ; residuals and covariance at the result are in the workspace.</summary>
    /// <param name="model">m residuals of n parameters; what it throws passes through, and θ is then the best point so far</param>
    /// <param name="theta">n parameters</param>
    /// <param name="workspace">for m rows and n columns</param>
    public static LeastSquaresSummary Minimise(
        Residuals model, Span<double> theta, LeastSquaresWorkspace workspace, LeastSquaresTolerances tolerances)
    {
        ArgumentOutOfRangeException.ThrowIfNotEqual(theta.Length, workspace.Columns);
        var at = workspace.Linearisation;
        at.Reset();
        var initial = workspace.Evaluate(model, theta);
        if (double.IsNaN(initial)) return new LeastSquaresSummary(StopReason.NotFiniteAtStart, initial, initial, 0, double.NaN, 0);
        workspace.Accept();

        var cost = initial;
        var lambda = 0.0;
        var length = at.ScaledLength(theta);
        var radius = length > 0 ? FirstRadius * length : FirstRadius;
        var iterations = 0;
        while (true)
        {
            if (2 * cost <= tolerances.Residuals * tolerances.Residuals) return Summary(StopReason.ResidualsVanished);
            if (at.GradientNorm <= tolerances.Gradient) return Summary(StopReason.GradientVanished);
            if (iterations == tolerances.Iterations) return Summary(StopReason.IterationLimit);

            lambda = FindStep(workspace, radius, lambda, out var step);
            if (iterations == 0) radius = Math.Min(radius, step);
            at.Move(theta, workspace.Step, workspace.Trial);
            var trial = workspace.Evaluate(model, workspace.Trial);
            iterations++;

            var change = at.PredictedChange(workspace.Step);
            var predicted = 0.5 * change + lambda * step * step;
            var actual = double.IsNaN(trial) ? double.NegativeInfinity : cost - trial;
            var gain = predicted > 0 ? actual / predicted : 0;

            if (predicted <= Rounding * cost && Math.Abs(actual) <= Rounding * cost)
            {
                // The costs no longer tell which point is better; the gradient still does.
                var better = workspace.TrialGradient() < at.GradientNorm;
                if (better) Accept(theta, trial);
                if (!better || predicted <= tolerances.Decrease * cost) return Summary(StopReason.DecreaseVanished);
                continue;
            }

            if (gain <= 0.25)
            {
                // Minimum of the parabola through both costs and the slope at θ, within [0.1, 0.5].
                var slope = -(change + lambda * step * step);
                var shrink = actual >= 0 ? 0.5 : 0.5 * slope / (slope + actual);
                shrink = double.IsFinite(actual) ? Math.Clamp(shrink, 0.1, 0.5) : 0.1;
                radius = shrink * Math.Min(radius, step / 0.1);
                lambda /= shrink;
            }
            else if (gain >= 0.75 || lambda == 0)
            {
                radius = 2 * step;
                lambda *= 0.5;
            }

            if (gain >= LeastGain) Accept(theta, trial);
            if (Math.Abs(actual) <= tolerances.Decrease * cost && predicted <= tolerances.Decrease * cost) return Summary(StopReason.DecreaseVanished);
            if (radius <= tolerances.Step * length || radius < SmallestRadius) return Summary(StopReason.StepVanished);
        }

        void Accept(Span<double> theta, double trial)
        {
            workspace.Trial.CopyTo(theta);
            workspace.Accept();
            cost = trial;
            length = at.ScaledLength(theta);
        }

        LeastSquaresSummary Summary(StopReason reason) => new(reason, initial, cost, iterations, at.GradientNorm, at.Rank);
    }

    /// <summary>Finds the step for a radius.</summary>
    /// <param name="guess">λ of the step before, a first guess</param>
    /// <param name="norm">‖z‖ of the step, which is left in the workspace</param>
    /// <returns>λ, zero when the undamped step lies within the radius</returns>
    private static double FindStep(LeastSquaresWorkspace workspace, double radius, double guess, out double norm)
    {
        var at = workspace.Linearisation;
        Span<double> z = workspace.Step, work = workspace.Scratch;
        at.GaussNewtonStep(z);
        norm = Math.Sqrt(LeastSquaresWorkspace.SumOfSquares(z));
        var excess = norm - radius;
        if (excess <= RadiusTolerance * radius) return 0;

        var low = at.Rank == at.Columns ? excess / at.UndampedSlope(z, norm, work) : 0;
        var high = at.ScaledGradient() / radius;
        if (high == 0) high = 1e-300;
        var lambda = Math.Clamp(guess, low, high);
        if (lambda == 0) lambda = high / Math.Max(norm, 1);
        for (var i = 0; ; i++)
        {
            if (lambda == 0) lambda = Math.Max(1e-300, 0.001 * high);
            at.DampedStep(lambda, z, work);
            norm = Math.Sqrt(LeastSquaresWorkspace.SumOfSquares(z));
            excess = norm - radius;
            if (Math.Abs(excess) <= RadiusTolerance * radius || i == 10) return lambda;
            if (excess > 0) low = Math.Max(low, lambda);
            else high = Math.Min(high, lambda);
            lambda = Math.Max(low, lambda + norm / radius * excess / at.DampedSlope(z, norm, work));
            if (lambda > high) lambda = Math.Sqrt(low * high);
        }
    }
}
