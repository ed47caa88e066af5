namespace BenchCheck.Core.Fitting;

/// <summary>The least squares problem at one θ: the factors of the Jacobian and what steps and covariances follow from them.</summary>
/// <remarks>
/// With J = ∂r/∂θ (m×n), the columns are scaled by D (their norms, or larger) and J D⁻¹ P = Q R is factored with pivoting. A step p in θ is
/// D⁻¹ P z; z is dimensionless. One instance owns its buffers and allocates nothing after it is made.
/// Source: Moré, The Levenberg-Marquardt algorithm: implementation and theory, in Numerical Analysis, LNM 630 (1978) 105-116.
/// </remarks>
internal sealed class Linearisation
{
    private readonly double[] _triangle;
    private readonly double[] _damped;
    private readonly double[] _tau;
    private readonly double[] _projected;
    private readonly double[] _scale;
    private readonly double[] _work;
    private readonly int[] _order;

    /// <param name="rows">m, residuals</param>
    /// <param name="columns">n, parameters</param>
    public Linearisation(int rows, int columns)
    {
        ArgumentOutOfRangeException.ThrowIfNegativeOrZero(rows);
        ArgumentOutOfRangeException.ThrowIfNegativeOrZero(columns);
        Rows = rows;
        Columns = columns;
        Jacobian = new double[rows * columns];
        _triangle = new double[columns * columns];
        _damped = new double[columns * columns];
        _tau = new double[Math.Min(rows, columns)];
        _projected = new double[Math.Max(rows, columns)];
        _scale = new double[columns];
        _work = new double[2 * columns];
        _order = new int[columns];
    }

    public int Rows { get; }

    public int Columns { get; }

    /// <summary>Filled by the caller with J, m×n, then spoilt by <see cref="Factor"/>; free for reuse after that.</summary>
    public double[] Jacobian { get; }

    /// <summary>Rank of J.</summary>
    public int Rank { get; private set; }

    /// <summary>Largest cosine between r and a column of J.</summary>
    public double GradientNorm { get; private set; }

    /// <summary>Scale D of the parameters, n.</summary>
    public ReadOnlySpan<double> Scale => _scale;

    /// <summary>Forgets the scale of an earlier problem.</summary>
    public void Reset() => Array.Clear(_scale);

    /// <summary>Largest cosine between r and a column of <see cref="Jacobian"/>, before that is factored.</summary>
    public double GradientOf(ReadOnlySpan<double> residuals)
    {
        var n = Columns;
        var squares = _work.AsSpan(0, n);
        var gradient = _work.AsSpan(n, n);
        squares.Clear();
        gradient.Clear();
        for (var i = 0; i < Rows; i++)
        {
            var row = Jacobian.AsSpan(i * n, n);
            for (var j = 0; j < n; j++)
            {
                squares[j] += row[j] * row[j];
                gradient[j] += row[j] * residuals[i];
            }
        }

        var length = Math.Sqrt(LeastSquaresWorkspace.SumOfSquares(residuals));
        var largest = 0.0;
        for (var j = 0; j < n; j++)
        {
            if (squares[j] > 0 && length > 0) largest = Math.Max(largest, Math.Abs(gradient[j]) / Math.Sqrt(squares[j]) / length);
        }

        return largest;
    }

    /// <summary>Factors <see cref="Jacobian"/> for the residuals r.</summary>
    public void Factor(ReadOnlySpan<double> residuals)
    {
        int m = Rows, n = Columns;
        GradientNorm = GradientOf(residuals);
        for (var j = 0; j < n; j++)
        {
            // GradientOf left the squared norms of the columns.
            _scale[j] = Math.Max(_scale[j], Math.Sqrt(_work[j]));
            if (_scale[j] == 0) _scale[j] = 1;
        }

        for (var i = 0; i < m; i++)
        {
            var row = Jacobian.AsSpan(i * n, n);
            for (var j = 0; j < n; j++) row[j] /= _scale[j];
        }

        Rank = HouseholderQr.Factor(Jacobian, m, n, _tau, _order, _work);
        _projected.AsSpan().Clear();
        residuals.CopyTo(_projected);
        HouseholderQr.ApplyTransposed(Jacobian, m, n, _tau, _projected);
        for (var i = 0; i < n; i++)
        {
            var row = _triangle.AsSpan(i * n, n);
            row.Clear();
            if (i < m) Jacobian.AsSpan(i * n + i, n - i).CopyTo(row[i..]);
        }
    }

    /// <summary>
    /// Redundancy number of each residual, m elements: 1 − h_i with h the diagonal of J (JᵀJ)⁻¹ Jᵀ, the variance of the residual left
    /// by the fit against the variance of the reading. Only straight after <see cref="Factor"/>.
    /// </summary>
    /// <remarks>Summed over the columns of Q that do not span J, so that a number near zero keeps its digits. Source: Baarda, A testing procedure for use in geodetic networks (1968).</remarks>
    /// <param name="work">m elements of scratch</param>
    public void RedundancyNumbers(Span<double> numbers, Span<double> work)
    {
        numbers.Clear();
        for (var k = Rank; k < Rows; k++)
        {
            work.Clear();
            work[k] = 1;
            HouseholderQr.Apply(Jacobian, Rows, Columns, _tau, work);
            for (var i = 0; i < Rows; i++) numbers[i] += work[i] * work[i];
        }
    }

    /// <summary>‖Rᵀ Qᵀ r‖, the length of the gradient in the scale of z.</summary>
    public double ScaledGradient()
    {
        var n = Columns;
        var sum = 0.0;
        for (var j = 0; j < n; j++)
        {
            var element = 0.0;
            for (var i = 0; i <= j; i++) element += _triangle[i * n + j] * _projected[i];
            sum += element * element;
        }

        return Math.Sqrt(sum);
    }

    /// <summary>The undamped step: R z = −Qᵀ r, with z zero for the columns beyond the rank.</summary>
    /// <param name="z">receives n elements, in pivoted order</param>
    public void GaussNewtonStep(Span<double> z)
    {
        z.Clear();
        for (var i = 0; i < Rank; i++) z[i] = -_projected[i];
        HouseholderQr.SolveUpper(_triangle, Columns, Rank, z);
    }

    /// <summary>The step that minimises ‖r + J p‖² + λ‖D p‖², by triangularising R over √λ I with plane rotations.</summary>
    /// <param name="lambda">λ &gt; 0</param>
    /// <param name="z">receives n elements, in pivoted order</param>
    /// <param name="work">n elements of scratch</param>
    public void DampedStep(double lambda, Span<double> z, Span<double> work)
    {
        var n = Columns;
        _triangle.CopyTo(_damped, 0);
        for (var i = 0; i < n; i++) z[i] = -_projected[i];
        var root = Math.Sqrt(lambda);
        var extra = work[..n];
        for (var j = 0; j < n; j++)
        {
            extra[j..].Clear();
            extra[j] = root;
            var right = 0.0;
            for (var k = j; k < n; k++)
            {
                if (extra[k] == 0) continue;
                var row = _damped.AsSpan(k * n, n);
                var radius = Math.Sqrt(row[k] * row[k] + extra[k] * extra[k]);
                double cosine = row[k] / radius, sine = extra[k] / radius;
                for (var l = k; l < n; l++) (row[l], extra[l]) = (cosine * row[l] + sine * extra[l], cosine * extra[l] - sine * row[l]);
                (z[k], right) = (cosine * z[k] + sine * right, cosine * right - sine * z[k]);
            }
        }

        HouseholderQr.SolveUpper(_damped, n, n, z);
    }

    /// <summary>−dφ/dλ for φ(λ) = ‖z(λ)‖, from the factor that <see cref="DampedStep"/> left.</summary>
    public double DampedSlope(ReadOnlySpan<double> z, double norm, Span<double> work) => Slope(_damped, z, norm, work);

    /// <summary>−dφ/dλ at λ = 0; only with full rank.</summary>
    public double UndampedSlope(ReadOnlySpan<double> z, double norm, Span<double> work) => Slope(_triangle, z, norm, work);

    /// <summary>‖J p‖² for the step z.</summary>
    public double PredictedChange(ReadOnlySpan<double> z)
    {
        var n = Columns;
        var sum = 0.0;
        for (var i = 0; i < Math.Min(Rows, n); i++)
        {
            var element = 0.0;
            for (var j = i; j < n; j++) element += _triangle[i * n + j] * z[j];
            sum += element * element;
        }

        return sum;
    }

    /// <summary>Writes θ + D⁻¹ P z.</summary>
    public void Move(ReadOnlySpan<double> theta, ReadOnlySpan<double> z, Span<double> moved)
    {
        for (var j = 0; j < Columns; j++)
        {
            var column = _order[j];
            moved[column] = theta[column] + z[j] / _scale[column];
        }
    }

    /// <summary>‖D θ‖.</summary>
    public double ScaledLength(ReadOnlySpan<double> theta)
    {
        var sum = 0.0;
        for (var j = 0; j < Columns; j++) sum += _scale[j] * theta[j] * (_scale[j] * theta[j]);
        return Math.Sqrt(sum);
    }

    /// <summary>(JᵀJ)⁻¹, n×n; see <see cref="ParameterCovariance"/> for parameters that J does not determine.</summary>
    public void Covariance(Span<double> covariance) =>
        ParameterCovariance.FromTriangle(_triangle, Rank, _order, _scale, covariance, _damped);

    private double Slope(ReadOnlySpan<double> triangle, ReadOnlySpan<double> z, double norm, Span<double> work)
    {
        var v = work[..Columns];
        z[..Columns].CopyTo(v);
        HouseholderQr.SolveUpperTransposed(triangle, Columns, Columns, v);
        return LeastSquaresWorkspace.SumOfSquares(v) / norm;
    }
}
