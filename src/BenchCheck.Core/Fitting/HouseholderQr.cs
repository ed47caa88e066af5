using BenchCheck.Core.Equations;

namespace BenchCheck.Core.Fitting;

/// <summary>QR factorisation with column pivoting of small dense matrices, row-major, in buffers that the caller owns.</summary>
/// <remarks>
/// A P = Q R with A of m rows and n columns, m ≥ n or m &lt; n, and k = min(m, n) reflections H_i = I − τ_i v_i v_iᵀ. R stands in the upper
/// triangle of A, the v_i (first element one, not stored) below it. Column i of A P is column order[i] of A. Pivoting takes the largest
/// remaining column, so |R_00| ≥ |R_11| ≥ … and a drop in the diagonal shows the rank.
/// The columns should be of like size: squares of elements below 1e-154 are lost.
/// Source: Businger and Golub, Numer. Math. 7 (1965) 269; Golub and Van Loan, Matrix Computations, 5.1, 5.2 and 5.4.
/// </remarks>
internal static class HouseholderQr
{
    /// <summary>Distance from one to the next double, 2⁻⁵².</summary>
    private const double MachineEpsilon = 2.220446049250313e-16;

    /// <summary>Factors A in place.</summary>
    /// <param name="a">m×n, overwritten by R and the reflections</param>
    /// <param name="tau">receives min(m, n) factors τ</param>
    /// <param name="order">receives the n column numbers</param>
    /// <param name="work">2n elements of scratch</param>
    /// <returns>the rank: how many diagonal elements of R exceed max(m, n)·ε·|R_00|; the caller may set a stricter limit</returns>
    public static int Factor(Span<double> a, int rows, int columns, Span<double> tau, Span<int> order, Span<double> work)
    {
        var squares = work[..columns];
        var w = work.Slice(columns, columns);
        squares.Clear();
        for (var i = 0; i < rows; i++) AddSquares(squares, a.Slice(i * columns, columns));
        for (var j = 0; j < columns; j++) order[j] = j;

        var steps = Math.Min(rows, columns);
        var rank = 0;
        var threshold = 0.0;
        for (var k = 0; k < steps; k++)
        {
            var best = k;
            for (var j = k + 1; j < columns; j++)
            {
                if (squares[j] > squares[best]) best = j;
            }

            if (best != k) SwapColumns(a, rows, columns, k, best, order, squares);
            var diagonal = Reflector(a, rows, columns, k, Math.Sqrt(squares[k]), out tau[k]);
            if (k == 0) threshold = Math.Max(rows, columns) * MachineEpsilon * Math.Abs(diagonal);
            if (Math.Abs(diagonal) > threshold) rank++;
            if (tau[k] != 0) Reflect(a, rows, columns, k, tau[k], w, squares);
        }

        return rank;
    }

    /// <summary>b := Qᵀ b, with b of m elements.</summary>
    public static void ApplyTransposed(ReadOnlySpan<double> qr, int rows, int columns, ReadOnlySpan<double> tau, Span<double> b)
    {
        for (var k = 0; k < Math.Min(rows, columns); k++) ApplyReflection(qr, rows, columns, k, tau[k], b);
    }

    /// <summary>b := Q b, with b of m elements.</summary>
    public static void Apply(ReadOnlySpan<double> qr, int rows, int columns, ReadOnlySpan<double> tau, Span<double> b)
    {
        for (var k = Math.Min(rows, columns) - 1; k >= 0; k--) ApplyReflection(qr, rows, columns, k, tau[k], b);
    }

    /// <summary>Solves R₁₁ x = b for the leading n×n triangle of a row-major matrix; b is overwritten by x.</summary>
    /// <param name="stride">elements from one row of <paramref name="r"/> to the next</param>
    public static void SolveUpper(ReadOnlySpan<double> r, int stride, int n, Span<double> b)
    {
        for (var i = n - 1; i >= 0; i--)
            b[i] = (b[i] - LuFactor.Dot(r.Slice(i * stride + i + 1, n - i - 1), b.Slice(i + 1, n - i - 1))) / r[i * stride + i];
    }

    /// <summary>Solves R₁₁ᵀ x = b for the leading n×n triangle; b is overwritten by x.</summary>
    public static void SolveUpperTransposed(ReadOnlySpan<double> r, int stride, int n, Span<double> b)
    {
        for (var i = 0; i < n; i++)
        {
            b[i] /= r[i * stride + i];
            LuFactor.AddScaled(b[(i + 1)..n], r.Slice(i * stride + i + 1, n - i - 1), -b[i]);
        }
    }

    /// <summary>Makes the reflection that turns column k, from row k down, into its first element alone, and returns that element R_kk.</summary>
    private static double Reflector(Span<double> a, int rows, int columns, int k, double norm, out double tau)
    {
        var alpha = a[k * columns + k];
        tau = 0;
        if (!(norm > 0)) return alpha;
        var beta = alpha > 0 ? -norm : norm;
        tau = (beta - alpha) / beta;
        var scale = 1 / (alpha - beta);
        for (var i = k + 1; i < rows; i++) a[i * columns + k] *= scale;
        a[k * columns + k] = beta;
        return beta;
    }

    /// <summary>Applies reflection k to the columns right of it and leaves in <paramref name="squares"/> their squared norms below row k.</summary>
    private static void Reflect(Span<double> a, int rows, int columns, int k, double tau, Span<double> w, Span<double> squares)
    {
        var right = columns - k - 1;
        if (right == 0) return;
        var top = a.Slice(k * columns + k + 1, right);
        w = w[..right];
        squares = squares.Slice(k + 1, right);
        top.CopyTo(w);
        for (var i = k + 1; i < rows; i++) LuFactor.AddScaled(w, a.Slice(i * columns + k + 1, right), a[i * columns + k]);
        LuFactor.AddScaled(top, w, -tau);
        squares.Clear();
        for (var i = k + 1; i < rows; i++)
        {
            var row = a.Slice(i * columns + k + 1, right);
            LuFactor.AddScaled(row, w, -tau * a[i * columns + k]);
            AddSquares(squares, row);
        }
    }

    private static void ApplyReflection(ReadOnlySpan<double> qr, int rows, int columns, int k, double tau, Span<double> b)
    {
        var sum = b[k];
        for (var i = k + 1; i < rows; i++) sum += qr[i * columns + k] * b[i];
        sum *= tau;
        b[k] -= sum;
        for (var i = k + 1; i < rows; i++) b[i] -= sum * qr[i * columns + k];
    }

    private static void SwapColumns(Span<double> a, int rows, int columns, int j, int k, Span<int> order, Span<double> squares)
    {
        (order[j], order[k]) = (order[k], order[j]);
        (squares[j], squares[k]) = (squares[k], squares[j]);
        for (var i = 0; i < rows; i++) (a[i * columns + j], a[i * columns + k]) = (a[i * columns + k], a[i * columns + j]);
    }

    private static void AddSquares(Span<double> sums, ReadOnlySpan<double> row)
    {
        for (var j = 0; j < row.Length; j++) sums[j] += row[j] * row[j];
    }
}
