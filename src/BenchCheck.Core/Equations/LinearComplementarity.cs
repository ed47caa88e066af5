namespace BenchCheck.Core.Equations;

/// <summary>Finds z ≥ 0 with w = q + M z ≥ 0 and zᵀ w = 0 by Lemke's pivoting.</summary>
/// <remarks>
/// Lemke, Management Science 11 (1965); Cottle, Pang and Stone, The Linear Complementarity Problem (1992), 4.4. Ends in a solution, on a
/// ray (none was found) or after a stated number of pivots; it cannot cycle for ever.
/// </remarks>
internal sealed class LinearComplementarity
{
    private double[] tableau = [];
    private int[] basis = [];

    /// <param name="m">n×n, row-major</param>
    /// <param name="z">receives the solution</param>
    /// <returns>false when Lemke's path ends on a ray</returns>
    public bool TrySolve(ReadOnlySpan<double> m, ReadOnlySpan<double> q, Span<double> z)
    {
        var n = q.Length;
        z.Clear();
        if (n == 0) return true;
        var worst = 0;
        for (var i = 1; i < n; i++)
        {
            if (q[i] < q[worst]) worst = i;
        }

        if (q[worst] >= 0) return true;

        // Columns: w (n), z (n), the artificial variable, the right-hand side.
        var width = 2 * n + 2;
        var artificial = 2 * n;
        if (tableau.Length < n * width) tableau = new double[n * width];
        if (basis.Length < n) basis = new int[n];
        var t = tableau.AsSpan(0, n * width);
        t.Clear();
        for (var i = 0; i < n; i++)
        {
            var row = t.Slice(i * width, width);
            row[i] = 1;
            for (var j = 0; j < n; j++) row[n + j] = -m[i * n + j];
            row[artificial] = -1;
            row[width - 1] = q[i];
            basis[i] = i;
        }

        var leavingRow = worst;
        var entering = artificial;
        for (var step = 0; step < 40 * n + 100; step++)
        {
            var left = basis[leavingRow];
            Pivot(t, width, n, leavingRow, entering);
            basis[leavingRow] = entering;
            if (left == artificial)
            {
                for (var i = 0; i < n; i++)
                {
                    if (basis[i] >= n && basis[i] < artificial) z[basis[i] - n] = Math.Max(0, t[i * width + width - 1]);
                }

                return true;
            }

            entering = left < n ? left + n : left - n;
            leavingRow = RatioTest(t, width, n, entering, artificial);
            if (leavingRow < 0) return false;
        }

        return false;
    }

    private static void Pivot(Span<double> t, int width, int n, int pivotRow, int column)
    {
        var row = t.Slice(pivotRow * width, width);
        var inverse = 1 / row[column];
        for (var j = 0; j < width; j++) row[j] *= inverse;
        row[column] = 1;
        for (var i = 0; i < n; i++)
        {
            if (i == pivotRow) continue;
            var other = t.Slice(i * width, width);
            var factor = other[column];
            if (factor == 0) continue;
            LuFactor.AddScaled(other, row, -factor);
            other[column] = 0;
        }
    }

    /// <summary>The row that first reaches zero as the entering variable grows; ties go to the artificial variable, which ends the path.</summary>
    private int RatioTest(ReadOnlySpan<double> t, int width, int n, int entering, int artificial)
    {
        var best = -1;
        var bestRatio = double.PositiveInfinity;
        for (var i = 0; i < n; i++)
        {
            var pivot = t[i * width + entering];
            if (pivot <= 1e-13) continue;
            var ratio = t[i * width + width - 1] / pivot;
            var tied = best >= 0 && Math.Abs(ratio - bestRatio) <= 1e-12 * Math.Max(1, Math.Abs(bestRatio));
            if (tied ? basis[i] == artificial : ratio < bestRatio) (best, bestRatio) = (i, ratio);
        }

        return best;
    }
}
