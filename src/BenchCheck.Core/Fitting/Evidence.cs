namespace BenchCheck.Core.Fitting;

/// <summary>What a fit in the space of the readings found.</summary>
/// <param name="ChiSquared">minimum of Σ (y − f)²/u² + Σ (φ − φ₀)²/σ²</param>
/// <param name="LogEvidence">logarithm of the probability density of the readings under the model, by Laplace's approximation</param>
/// <param name="Converged">false when the iteration was stopped by its limit or the equations had no solution on the way</param>
public readonly record struct Evidence(double ChiSquared, double LogEvidence, bool Converged)
{
    public static Evidence None { get; } = new(double.PositiveInfinity, double.NegativeInfinity, false);
}
