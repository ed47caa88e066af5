namespace BenchCheck.Core.Fitting;

/// <summary>When a minimisation stops.</summary>
/// <param name="Residuals">‖r‖ below which the residuals count as zero, in standard uncertainties</param>
/// <param name="Gradient">largest cosine between the residuals and a column of the Jacobian</param>
/// <param name="Step">radius of the next step against the length of θ, both in the scale of the Jacobian's columns</param>
/// <param name="Decrease">decrease of the cost, predicted and actual, against the cost</param>
/// <param name="Iterations">steps tried, each one call of the model</param>
internal readonly record struct LeastSquaresTolerances(double Residuals, double Gradient, double Step, double Decrease, int Iterations)
{
    /// <summary>As far as double precision goes: until the gradient falls no further.</summary>
    public static LeastSquaresTolerances Tight { get; } = new(0, 0, 1e-15, 0, 4000);

    /// <summary>A ten-thousandth of the standard uncertainty of any parameter, or better.</summary>
    public static LeastSquaresTolerances Usual { get; } = new(1e-9, 1e-10, 1e-10, 1e-9, 200);
}
