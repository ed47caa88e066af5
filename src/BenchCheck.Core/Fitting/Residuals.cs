namespace BenchCheck.Core.Fitting;

/// <summary>A model to be fitted: the residuals r(θ), of which ½‖r‖² is minimised, and their derivatives.</summary>
/// <param name="theta">n parameters</param>
/// <param name="residuals">receives m residuals, whitened: each divided by its standard uncertainty. A value that is not finite says that the
/// model has no meaning at θ</param>
/// <param name="jacobian">receives ∂r_i/∂θ_j, row-major m×n; an empty span when the derivatives are not wanted</param>
internal delegate void Residuals(ReadOnlySpan<double> theta, Span<double> residuals, Span<double> jacobian);
