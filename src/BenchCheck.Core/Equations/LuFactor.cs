using System.Numerics;
using System.Runtime.InteropServices;

namespace BenchCheck.Core.Equations;

/// <summary>LU factorisation with partial pivoting of small dense matrices, row-major, in buffers that the caller owns.</summary>
/// <remarks>
/// P A = L U; L and U overwrite A. Golub and Van Loan, Matrix Computations, 3.4. MathNet's factorisation allocates its result for every
/// matrix, which at this size costs as much as the arithmetic; the benchmark "solve" shows both side by side.
/// </remarks>
internal static class LuFactor
{
    /// <summary>Factors the n×n matrix in <paramref name="a"/>.</summary>
    /// <returns>false when a pivot vanishes: the matrix is singular to working precision</returns>
    public static bool Factor(Span<double> a, int n, Span<int> pivot)
    {
        for (var k = 0; k < n; k++)
        {
            var best = k;
            var largest = Math.Abs(a[k * n + k]);
            for (var i = k + 1; i < n; i++)
            {
                var size = Math.Abs(a[i * n + k]);
                if (size > largest) (largest, best) = (size, i);
            }

            pivot[k] = best;
            if (!(largest > 1e-300) || double.IsInfinity(largest)) return false;
            var rowK = a.Slice(k * n, n);
            if (best != k)
            {
                var rowBest = a.Slice(best * n, n);
                for (var j = 0; j < n; j++) (rowK[j], rowBest[j]) = (rowBest[j], rowK[j]);
            }

            var inverse = 1 / rowK[k];
            for (var i = k + 1; i < n; i++)
            {
                var rowI = a.Slice(i * n, n);
                if (rowI[k] == 0) continue;
                var factor = rowI[k] *= inverse;
                AddScaled(rowI[(k + 1)..], rowK[(k + 1)..], -factor);
            }
        }

        return true;
    }

    /// <summary>Solves A x = b; b is overwritten by x.</summary>
    public static void Solve(ReadOnlySpan<double> lu, int n, ReadOnlySpan<int> pivot, Span<double> b)
    {
        for (var k = 0; k < n; k++)
        {
            var p = pivot[k];
            if (p != k) (b[k], b[p]) = (b[p], b[k]);
        }

        for (var i = 1; i < n; i++) b[i] -= Dot(lu.Slice(i * n, i), b[..i]);
        for (var i = n - 1; i >= 0; i--) b[i] = (b[i] - Dot(lu.Slice(i * n + i + 1, n - i - 1), b.Slice(i + 1, n - i - 1))) / lu[i * n + i];
    }

    /// <summary>Solves Aᵀ x = b; b is overwritten by x.</summary>
    public static void SolveTransposed(ReadOnlySpan<double> lu, int n, ReadOnlySpan<int> pivot, Span<double> b)
    {
        for (var i = 0; i < n; i++)
        {
            b[i] /= lu[i * n + i];
            if (b[i] != 0) AddScaled(b[(i + 1)..n], lu.Slice(i * n + i + 1, n - i - 1), -b[i]);
        }

        for (var i = n - 1; i > 0; i--)
        {
            if (b[i] != 0) AddScaled(b[..i], lu.Slice(i * n, i), -b[i]);
        }

        for (var k = n - 1; k >= 0; k--)
        {
            var p = pivot[k];
            if (p != k) (b[k], b[p]) = (b[p], b[k]);
        }
    }

    /// <summary>Inverse of A from its factors, n×n row-major; whole rows are combined at a time, which at this size beats n solves by far.</summary>
    public static void Invert(ReadOnlySpan<double> lu, int n, ReadOnlySpan<int> pivot, Span<double> inverse)
    {
        inverse[..(n * n)].Clear();
        for (var i = 0; i < n; i++) inverse[i * n + i] = 1;
        for (var k = 0; k < n; k++)
        {
            var p = pivot[k];
            if (p == k) continue;
            var a = inverse.Slice(k * n, n);
            var b = inverse.Slice(p * n, n);
            for (var j = 0; j < n; j++) (a[j], b[j]) = (b[j], a[j]);
        }

        for (var i = 1; i < n; i++)
        {
            var row = inverse.Slice(i * n, n);
            for (var k = 0; k < i; k++)
            {
                var factor = lu[i * n + k];
                if (factor != 0) AddScaled(row, inverse.Slice(k * n, n), -factor);
            }
        }

        for (var i = n - 1; i >= 0; i--)
        {
            var row = inverse.Slice(i * n, n);
            for (var k = i + 1; k < n; k++)
            {
                var factor = lu[i * n + k];
                if (factor != 0) AddScaled(row, inverse.Slice(k * n, n), -factor);
            }

            var scale = 1 / lu[i * n + i];
            foreach (ref var x in row) x *= scale;
        }
    }

    /// <summary>y += factor · x.</summary>
    public static void AddScaled(Span<double> y, ReadOnlySpan<double> x, double factor)
    {
        var i = 0;
        if (x.Length >= Vector<double>.Count)
        {
            var f = new Vector<double>(factor);
            var vx = MemoryMarshal.Cast<double, Vector<double>>(x);
            var vy = MemoryMarshal.Cast<double, Vector<double>>(y[..x.Length]);
            for (var k = 0; k < vx.Length; k++) vy[k] += f * vx[k];
            i = vx.Length * Vector<double>.Count;
        }

        for (; i < x.Length; i++) y[i] += factor * x[i];
    }

    public static double Dot(ReadOnlySpan<double> x, ReadOnlySpan<double> y)
    {
        var sum = 0.0;
        var i = 0;
        if (x.Length >= Vector<double>.Count)
        {
            var acc = Vector<double>.Zero;
            var vx = MemoryMarshal.Cast<double, Vector<double>>(x);
            var vy = MemoryMarshal.Cast<double, Vector<double>>(y[..x.Length]);
            for (var k = 0; k < vx.Length; k++) acc += vx[k] * vy[k];
            sum = Vector.Sum(acc);
            i = vx.Length * Vector<double>.Count;
        }

        for (; i < x.Length; i++) sum += x[i] * y[i];
        return sum;
    }
}
