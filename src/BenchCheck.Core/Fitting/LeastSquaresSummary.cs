namespace BenchCheck.Core.Fitting;

/// <summary>Why a minimisation stopped.</summary>
internal enum StopReason
{
    /// <summary>Every residual is as good as zero: the model passes through all it was given.</summary>
    ResidualsVanished,

    /// <summary>The residuals are orthogonal to every column of the Jacobian: a stationary point.</summary>
    GradientVanished,

    /// <summary>No step long enough to be told from θ lowers the cost.</summary>
    StepVanished,

    /// <summary>The last step lowered the cost by nothing that matters, as was predicted.</summary>
    DecreaseVanished,

    /// <summary>The iterations ran out before any of the above: the result is the best point seen, not a minimum.</summary>
    IterationLimit,

    /// <summary>The model gives no finite residuals or derivatives at the starting point; θ is untouched.</summary>
    NotFiniteAtStart,
}

/// <summary>How a minimisation went.</summary>
/// <param name="InitialCost">½‖r‖² at the start</param>
/// <param name="Cost">½‖r‖² at the result</param>
/// <param name="Iterations">steps tried, accepted or not</param>
/// <param name="GradientNorm">largest cosine between the residuals and a column of the Jacobian at the result; zero at a minimum</param>
/// <param name="Rank">rank of the Jacobian at the result; below the number of parameters some are not determined</param>
internal readonly record struct LeastSquaresSummary(
    StopReason Reason, double InitialCost, double Cost, int Iterations, double GradientNorm, int Rank)
{
    public bool Converged => Reason is not (StopReason.IterationLimit or StopReason.NotFiniteAtStart);

    public override string ToString() => FormattableString.Invariant(
        $"{(Converged ? "converged" : "not converged")}, {Words}, after {Iterations} iterations: cost {InitialCost:G6} to {Cost:G6}, gradient {GradientNorm:G3}, rank {Rank}");

    private string Words => Reason switch
    {
        StopReason.ResidualsVanished => "the residuals vanished",
        StopReason.GradientVanished => "the gradient vanished",
        StopReason.StepVanished => "the step vanished",
        StopReason.DecreaseVanished => "the cost stood still",
        StopReason.IterationLimit => "the iterations ran out",
        _ => "the model is not finite at the start",
    };
}
