namespace BenchCheck.Benchmarks.Scoreboard.Physics;

/// <summary>Gaussian elimination with partial pivoting on a dense matrix.</summary>
internal static class DenseLu
{
    /// <summary>Solves A x = b; A is overwritten by its factors and b by x.</summary>
    /// <param name="a">n×n, row-major</param>
    /// <returns>false when A is singular</returns>
    public static bool Solve(Span<double> a, int n, Span<double> b)
    {
        for (var k = 0; k < n; k++)
        {
            var pivot = k;
            for (var i = k + 1; i < n; i++)
            {
                if (Math.Abs(a[i * n + k]) > Math.Abs(a[pivot * n + k])) pivot = i;
            }

            if (!(Math.Abs(a[pivot * n + k]) > 0)) return false;
            if (pivot != k)
            {
                for (var j = k; j < n; j++) (a[k * n + j], a[pivot * n + j]) = (a[pivot * n + j], a[k * n + j]);
                (b[k], b[pivot]) = (b[pivot], b[k]);
            }

            var top = a.Slice(k * n, n);
            for (var i = k + 1; i < n; i++)
            {
                var row = a.Slice(i * n, n);
                if (row[k] == 0) continue;
                var factor = row[k] / top[k];
                for (var j = k + 1; j < n; j++) row[j] -= factor * top[j];
                b[i] -= factor * b[k];
            }
        }

        for (var i = n - 1; i >= 0; i--)
        {
            var sum = b[i];
            for (var j = i + 1; j < n; j++) sum -= a[i * n + j] * b[j];
            b[i] = sum / a[i * n + i];
        }

        return true;
    }
}
