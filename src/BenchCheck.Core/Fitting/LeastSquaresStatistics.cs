using System.Collections.Immutable;

namespace BenchCheck.Core.Fitting;

/// <summary>What a least squares fit leaves: uncertainties of the parameters, and how far each residual is off for its own standard deviation.</summary>
/// <remarks>
/// From the whitened Jacobian J (m×n) and whitened residuals r at the minimum, prior terms being rows like any other. Covariance of the
/// parameters (JᵀJ)⁻¹; of the residuals I − J (JᵀJ)⁻¹ Jᵀ; ‖r‖² ~ χ²(m − rank). A non-linear fit is described by its linearisation.
/// Source: Handschin, Schweppe, Kohlas, Fiechter, IEEE Trans. PAS-94 (1975) 329-337.
/// </remarks>
internal sealed class LeastSquaresStatistics
{
    /// <summary>A residual whose redundancy number is below this, a hundred-thousandth of the reading's uncertainty, tells nothing: the fit passes through the reading whatever it is.</summary>
    private const double NoRedundancy = 1e-10;

    private readonly double[] _covariance;

    private LeastSquaresStatistics(Linearisation at, ReadOnlySpan<double> residuals)
    {
        int m = at.Rows, n = at.Columns;
        Parameters = n;
        Rank = at.Rank;
        Redundancy = m - at.Rank;
        SumOfSquares = LeastSquaresWorkspace.SumOfSquares(residuals);
        _covariance = new double[n * n];
        at.Covariance(_covariance);
        var numbers = new double[m];
        at.RedundancyNumbers(numbers, new double[m]);
        var normalised = new double[m];
        for (var i = 0; i < m; i++) normalised[i] = numbers[i] < NoRedundancy ? double.NaN : residuals[i] / Math.Sqrt(numbers[i]);
        RedundancyNumbers = [.. numbers];
        NormalisedResiduals = [.. normalised];
    }

    /// <summary>n.</summary>
    public int Parameters { get; }

    public int Rank { get; }

    /// <summary>m − rank: degrees of freedom.</summary>
    public int Redundancy { get; }

    /// <summary>J = ‖r‖², chi-squared with <see cref="Redundancy"/> degrees of freedom when the stated uncertainties are right.</summary>
    public double SumOfSquares { get; }

    /// <summary>Experimental standard deviation of the residuals, s = √(‖r‖²/(m − rank)); one when the stated uncertainties are right, NaN without redundancy.</summary>
    public double ResidualDeviation => Redundancy == 0 ? double.NaN : Math.Sqrt(SumOfSquares / Redundancy);

    /// <summary>1 − h_i for each residual, between zero and one; their sum is the redundancy.</summary>
    public ImmutableArray<double> RedundancyNumbers { get; }

    /// <summary>rN_i = r_i / √(1 − h_i), standard normal each; NaN where the fit passes through the reading whatever it is. With redundancy one all are equal in size.</summary>
    public ImmutableArray<double> NormalisedResiduals { get; }

    /// <summary>Statistics of the fit that ended with these.</summary>
    /// <param name="jacobian">whitened, row-major, as many rows as residuals and <paramref name="columns"/> columns</param>
    /// <param name="residuals">whitened</param>
    public static LeastSquaresStatistics Of(ReadOnlySpan<double> jacobian, ReadOnlySpan<double> residuals, int columns)
    {
        ArgumentOutOfRangeException.ThrowIfNotEqual(jacobian.Length, residuals.Length * columns);
        var at = new Linearisation(residuals.Length, columns);
        jacobian.CopyTo(at.Jacobian);
        at.Factor(residuals);
        return Of(at, residuals);
    }

    /// <summary>Statistics from a Jacobian just factored.</summary>
    internal static LeastSquaresStatistics Of(Linearisation at, ReadOnlySpan<double> residuals) => new(at, residuals);

    /// <summary>Covariance of two parameters from the stated uncertainties; infinite variance, and NaN beside it, for a parameter that nothing determines.</summary>
    public double Covariance(int i, int j) => _covariance[i * Parameters + j];

    /// <summary>Standard uncertainty of a parameter from the stated uncertainties.</summary>
    public double StandardUncertainty(int i) => Math.Sqrt(Covariance(i, i));

    /// <summary>Standard deviation of a parameter from the scatter of the residuals, where no uncertainty was stated (JCGM 100:2008, H.3.2).</summary>
    public double StandardDeviation(int i) => ResidualDeviation * StandardUncertainty(i);

    /// <summary>Between −1 and 1; NaN when one of the two is not determined.</summary>
    public double Correlation(int i, int j) => Covariance(i, j) / StandardUncertainty(i) / StandardUncertainty(j);
}
