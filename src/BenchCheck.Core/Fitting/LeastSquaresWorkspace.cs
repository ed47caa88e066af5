namespace BenchCheck.Core.Fitting;

/// <summary>The buffers of one least squares problem; made once, used for any number of minimisations of the same shape by one thread.</summary>
internal sealed class LeastSquaresWorkspace
{
    private double[] _residuals;
    private double[] _trialResiduals;

    /// <param name="rows">m, residuals; may be fewer than the parameters</param>
    /// <param name="columns">n, parameters</param>
    public LeastSquaresWorkspace(int rows, int columns)
    {
        Linearisation = new Linearisation(rows, columns);
        _residuals = new double[rows];
        _trialResiduals = new double[rows];
        Trial = new double[columns];
        Step = new double[columns];
        Scratch = new double[columns];
    }

    public int Rows => Linearisation.Rows;

    public int Columns => Linearisation.Columns;

    /// <summary>Residuals at the result of the last minimisation.</summary>
    public ReadOnlySpan<double> Residuals => _residuals;

    /// <summary>The problem linearised at the result of the last minimisation.</summary>
    internal Linearisation Linearisation { get; }

    internal double[] Trial { get; }

    internal double[] Step { get; }

    internal double[] Scratch { get; }

    /// <summary>Covariance (JᵀJ)⁻¹ of the parameters at the result, n×n row-major; infinite for a parameter that nothing determines.</summary>
    public void Covariance(Span<double> covariance) => Linearisation.Covariance(covariance);

    /// <summary>Calls the model at θ; residuals go to the trial buffer, derivatives to the linearisation's.</summary>
    /// <returns>the cost ½‖r‖², or NaN when a residual or derivative is not finite</returns>
    internal double Evaluate(Residuals model, ReadOnlySpan<double> theta)
    {
        model(theta, _trialResiduals, Linearisation.Jacobian);
        var cost = 0.5 * SumOfSquares(_trialResiduals);
        if (!double.IsFinite(cost)) return double.NaN;
        foreach (var derivative in Linearisation.Jacobian)
        {
            if (!double.IsFinite(derivative)) return double.NaN;
        }

        return cost;
    }

    /// <summary>Largest cosine between residuals and a column of the Jacobian at the point last evaluated.</summary>
    internal double TrialGradient() => Linearisation.GradientOf(_trialResiduals);

    /// <summary>Makes the point last evaluated the current one.</summary>
    internal void Accept()
    {
        (_residuals, _trialResiduals) = (_trialResiduals, _residuals);
        Linearisation.Factor(_residuals);
    }

    internal static double SumOfSquares(ReadOnlySpan<double> x)
    {
        var sum = 0.0;
        foreach (var value in x) sum += value * value;
        return sum;
    }
}
