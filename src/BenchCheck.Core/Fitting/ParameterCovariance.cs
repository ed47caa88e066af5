using BenchCheck.Core.Equations;

namespace BenchCheck.Core.Fitting;

/// <summary>Covariance of least squares estimates from the triangular factor of the Jacobian.</summary>
/// <remarks>
/// With J D⁻¹ P = Q R the covariance is D⁻¹ P (RᵀR)⁻¹ Pᵀ D⁻¹. With rank k &lt; n, R = [R₁₁ R₁₂; 0 0], the vectors P [−R₁₁⁻¹R₁₂; I] y change no
/// residual: a parameter that takes part in one is not determined and its variance is infinite; the variances of the others are
/// those of (R₁₁ᵀR₁₁)⁻¹, whatever value the undetermined ones are given.
/// Source: Golub and Van Loan, Matrix Computations, 5.5; Searle, Linear Models (1971), 5.4, estimable functions.
/// </remarks>
internal static class ParameterCovariance
{
    /// <summary>A parameter counts as determined while its part in the null vectors, in units of D, stays below this.</summary>
    private const double NullPart = 1e-6;

    /// <summary>Writes the n×n covariance; rows and columns of undetermined parameters hold infinity on the diagonal and NaN beside it.</summary>
    /// <param name="triangle">R, n×n row-major</param>
    /// <param name="order">pivoting: column i of R belongs to parameter order[i]</param>
    /// <param name="scale">D, n elements</param>
    /// <param name="work">n·n elements of scratch</param>
    public static void FromTriangle(
        ReadOnlySpan<double> triangle, int rank, ReadOnlySpan<int> order, ReadOnlySpan<double> scale, Span<double> covariance, Span<double> work)
    {
        var n = order.Length;
        triangle.CopyTo(work);
        Invert(work, n, rank);
        for (var i = 0; i < n; i++)
        {
            var determined = IsDetermined(work, n, rank, i);
            for (var j = 0; j <= i; j++)
            {
                var value = !determined || !IsDetermined(work, n, rank, j)
                    ? i == j ? double.PositiveInfinity : double.NaN
                    : LuFactor.Dot(work.Slice(i * n + i, rank - i), work.Slice(j * n + i, rank - i)) / scale[order[i]] / scale[order[j]];
                covariance[order[i] * n + order[j]] = covariance[order[j] * n + order[i]] = value;
            }
        }
    }

    /// <summary>Replaces R₁₁ by R₁₁⁻¹ and R₁₂ by R₁₁⁻¹R₁₂.</summary>
    private static void Invert(Span<double> r, int n, int rank)
    {
        for (var i = rank - 1; i >= 0; i--)
        {
            var row = r.Slice(i * n, n);
            var inverse = 1 / row[i];
            // Rows below already hold the result; row i is (e_i − Σ r_ik row_k) / r_ii, from the right so that r_ik is read before it is overwritten.
            for (var k = rank - 1; k > i; k--)
            {
                var factor = row[k];
                row[k] = 0;
                LuFactor.AddScaled(row[k..rank], r.Slice(k * n + k, rank - k), -factor);
                LuFactor.AddScaled(row[rank..], r.Slice(k * n + rank, n - rank), -factor);
            }

            for (var k = i + 1; k < n; k++) row[k] *= inverse;
            row[i] = inverse;
        }
    }

    private static bool IsDetermined(ReadOnlySpan<double> inverted, int n, int rank, int i)
    {
        if (i >= rank) return false;
        foreach (var part in inverted.Slice(i * n + rank, n - rank))
        {
            if (Math.Abs(part) > NullPart) return false;
        }

        return true;
    }
}
