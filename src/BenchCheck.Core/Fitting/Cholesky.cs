using BenchCheck.Core.Equations;

namespace BenchCheck.Core.Fitting;

/// <summary>Cholesky factorisation A = L Lᵀ of small symmetric positive definite matrices, row-major, in buffers that the caller owns.</summary>
/// <remarks>Only the lower triangle is read and written. Source: Golub and Van Loan, Matrix Computations, 4.2.</remarks>
internal static class Cholesky
{
    /// <summary>Overwrites the lower triangle of the n×n matrix by L.</summary>
    /// <returns>false when A is not positive definite to working precision, or not finite; A is then spoilt</returns>
    public static bool Factor(Span<double> a, int n)
    {
        for (var i = 0; i < n; i++)
        {
            var row = a.Slice(i * n, i + 1);
            for (var j = 0; j < i; j++)
            {
                var other = a.Slice(j * n, j + 1);
                row[j] = (row[j] - LuFactor.Dot(row[..j], other[..j])) / other[j];
            }

            var pivot = row[i] - LuFactor.Dot(row[..i], row[..i]);
            if (!(pivot > 0) || double.IsInfinity(pivot)) return false;
            row[i] = Math.Sqrt(pivot);
        }

        return true;
    }

    /// <summary>ln det A.</summary>
    public static double LogDeterminant(ReadOnlySpan<double> l, int n)
    {
        var sum = 0.0;
        for (var i = 0; i < n; i++) sum += Math.Log(l[i * n + i]);
        return 2 * sum;
    }

    /// <summary>Solves L w = b; b is overwritten by w. With A the covariance of b, w is whitened: wᵀw = bᵀ A⁻¹ b.</summary>
    public static void SolveLower(ReadOnlySpan<double> l, int n, Span<double> b)
    {
        for (var i = 0; i < n; i++) b[i] = (b[i] - LuFactor.Dot(l.Slice(i * n, i), b[..i])) / l[i * n + i];
    }

    /// <summary>Solves A x = b; b is overwritten by x.</summary>
    public static void Solve(ReadOnlySpan<double> l, int n, Span<double> b)
    {
        SolveLower(l, n, b);
        for (var i = n - 1; i >= 0; i--)
        {
            b[i] /= l[i * n + i];
            LuFactor.AddScaled(b[..i], l.Slice(i * n, i), -b[i]);
        }
    }

    /// <summary>A⁻¹, n×n.</summary>
    public static double[] Inverse(ReadOnlySpan<double> l, int n)
    {
        var inverse = new double[n * n];
        for (var j = 0; j < n; j++)
        {
            // A⁻¹ is symmetric: its rows are its columns.
            var row = inverse.AsSpan(j * n, n);
            row[j] = 1;
            Solve(l, n, row);
        }

        return inverse;
    }
}
