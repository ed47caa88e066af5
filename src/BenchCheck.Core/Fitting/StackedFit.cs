using BenchCheck.Core.Equations;

namespace BenchCheck.Core.Fitting;

/// <summary>The fit of a board's parameters to its readings: readings and tolerances stacked into one system, solved by QR.</summary>
/// <remarks>
/// Residuals, whitened: (f(φ) − y)/u for each of m readings, then (φ − φ₀)/σ for each parameter with a tolerance; a parameter that the parts
/// list leaves unknown has no row of the second kind, so where the readings do not see it its variance is infinite. Minimises
/// Σ (y − f)²/u² + Σ (φ − φ₀)²/σ² by Levenberg-Marquardt; covariance from the same triangular factor.
/// </remarks>
internal sealed class StackedFit
{
    private readonly BoardModel model;
    private readonly double[] measured;
    private readonly double[] deviation;
    private readonly int rows;
    private readonly LeastSquaresWorkspace workspace;

    /// <param name="measured">m values, SI units</param>
    /// <param name="noise">m variances</param>
    public StackedFit(BoardModel model, double[] measured, double[] noise)
    {
        this.model = model;
        this.measured = measured;
        deviation = [.. noise.Select(Math.Sqrt)];
        rows = measured.Length + model.Parameters.Count(p => !p.IsUnknown);
        workspace = new LeastSquaresWorkspace(rows, model.Parameters.Length);
    }

    /// <summary>Minimises from φ and leaves the result there.</summary>
    public LeastSquaresSummary Minimise(Span<double> phi) => LevenbergMarquardt.Minimise(Stack, phi, workspace, LeastSquaresTolerances.Usual);

    /// <summary>p×p covariance at the result.</summary>
    public void Covariance(Span<double> covariance) => workspace.Covariance(covariance);

    /// <summary>Uncertainties and normalised residuals at φ; the residuals of the readings come first, then those of the parameters with a tolerance.</summary>
    public LeastSquaresStatistics Statistics(ReadOnlySpan<double> phi)
    {
        var residuals = new double[rows];
        var jacobian = new double[rows * phi.Length];
        Stack(phi, residuals, jacobian);
        return LeastSquaresStatistics.Of(jacobian, residuals, phi.Length);
    }

    /// <summary>Profiles of single parameters around the result.</summary>
    public ProfileInterval Profile(ReadOnlySpan<double> phi, double cost) => new(Stack, rows, phi, cost, LeastSquaresTolerances.Usual);

    private void Stack(ReadOnlySpan<double> phi, Span<double> residuals, Span<double> jacobian)
    {
        var (m, p) = (measured.Length, phi.Length);
        try
        {
            model.Predict(phi, residuals[..m], jacobian.IsEmpty ? jacobian : jacobian[..(m * p)]);
        }
        catch (NoOperatingStateException)
        {
            // Not finite: the step that led here is not taken.
            residuals.Fill(double.NaN);
            model.Forget();
            return;
        }

        for (var i = 0; i < m; i++)
        {
            residuals[i] = (residuals[i] - measured[i]) / deviation[i];
            if (jacobian.IsEmpty) continue;
            foreach (ref var slope in jacobian.Slice(i * p, p)) slope /= deviation[i];
        }

        var row = m;
        for (var k = 0; k < p; k++)
        {
            var parameter = model.Fitted[k];
            if (parameter.IsUnknown) continue;
            residuals[row] = (phi[k] - parameter.Mean) / parameter.Sigma;
            if (!jacobian.IsEmpty)
            {
                jacobian.Slice(row * p, p).Clear();
                jacobian[row * p + k] = 1 / parameter.Sigma;
            }

            row++;
        }
    }
}
