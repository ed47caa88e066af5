namespace BenchCheck.Core.Equations;

/// <summary>Finds z with w = q + M z, where each pair has z ≥ 0, w ≥ 0 and z w = 0, or one of the two is zero by order and the other of either sign.</summary>
/// <remarks>
/// Lemke, Management Science 11 (1965); Cottle, Pang and Stone, The Linear Complementarity Problem (1992), 4.4. The path is that of w = q + M z + t,
/// t falling from where every w is positive: the drops of all junctions fall together from where none conducts. On a passive board every junction then
/// takes up power at each t > 0, so the path cannot run away and ends in a state. Each basis is factored afresh from M, so nothing is lost to earlier
/// pivots. Ends in a solution, on a ray or after a stated number of pivots; it cannot cycle for ever.
/// </remarks>
internal sealed class LinearComplementarity
{
    private const int Attempts = 3;

    /// <summary>Pairs whose combinations are gone through where no path ends in a solution.</summary>
    private const int MostEnumerated = 10;

    private double[] factor = [];
    private double[] basic = [];
    private double[] direction = [];
    private double[] scale = [];
    private double[] offset = [];
    private int[] pivot = [];
    private int[] basis = [];
    private int n;

    /// <summary>Factorisations that are still allowed; when none is left every search fails.</summary>
    public int FactoringsLeft { get; set; }

    /// <param name="m">n×n, row-major</param>
    /// <param name="pairs">n: what holds of each pair</param>
    /// <param name="z">which entries are positive is tried first; receives the solution</param>
    /// <returns>false when no path ends in a solution</returns>
    public bool TrySolve(ReadOnlySpan<double> m, ReadOnlySpan<double> q, ReadOnlySpan<PairState> pairs, Span<double> z)
    {
        n = q.Length;
        if (n == 0) return true;
        if (basis.Length < n) Grow();
        for (var j = 0; j < n; j++)
        {
            // Every column counted in volts.
            scale[j] = 0;
            for (var i = 0; i < n; i++) scale[j] = Math.Max(scale[j], Math.Abs(m[i * n + j]));
            if (!(scale[j] > 0)) scale[j] = 1;
        }

        for (var i = 0; i < n; i++) basis[i] = pairs[i] == PairState.Held || (pairs[i] == PairState.Either && z[i] > 0) ? n + i : i;
        if (Accept(m, q, pairs, z)) return true;
        for (var attempt = 0; attempt < Attempts; attempt++)
        {
            if (Lemke(m, q, pairs, attempt) && (Accept(m, q, pairs, z) || Repair(m, q, pairs, z))) return true;
        }

        return Enumerate(m, q, pairs, z);
    }

    /// <summary>
    /// Exchanges one variable after the other that is below zero for the other of its pair (Murty, Opsearch 11 (1974), from memory): where rounding ended
    /// the path beside the solution.
    /// </summary>
    private bool Repair(ReadOnlySpan<double> m, ReadOnlySpan<double> q, ReadOnlySpan<PairState> pairs, Span<double> z)
    {
        for (var step = 0; step < 2 * n; step++)
        {
            var wrong = -1;
            for (var i = 0; i < n; i++)
            {
                if (MustBePositive(i, pairs) && basic[i] < 0 && (wrong < 0 || basis[i] % n < basis[wrong] % n)) wrong = i;
            }

            if (wrong < 0 || basis[wrong] == 2 * n) return false;
            basis[wrong] = (basis[wrong] + n) % (2 * n);
            if (Accept(m, q, pairs, z)) return true;
        }

        return false;
    }

    /// <summary>Tries every choice of basis, where these are few.</summary>
    private bool Enumerate(ReadOnlySpan<double> m, ReadOnlySpan<double> q, ReadOnlySpan<PairState> pairs, Span<double> z)
    {
        var count = pairs.Count(PairState.Either);
        if (count > MostEnumerated) return false;
        for (var choice = 0; choice < 1 << count; choice++)
        {
            var bit = 0;
            for (var i = 0; i < n; i++)
            {
                var isIn = pairs[i] == PairState.Either ? (choice >> bit++ & 1) == 1 : pairs[i] == PairState.Held;
                basis[i] = isIn ? n + i : i;
            }

            if (Accept(m, q, pairs, z)) return true;
        }

        return false;
    }

    /// <summary>Takes the present basis when everything in it that must be is at least zero.</summary>
    private bool Accept(ReadOnlySpan<double> m, ReadOnlySpan<double> q, ReadOnlySpan<PairState> pairs, Span<double> z)
    {
        if (!SolveBasis(m, q, pairs)) return false;
        var size = 0.0;
        for (var i = 0; i < n; i++)
        {
            if (pairs[i] == PairState.Either) size = Math.Max(size, Math.Abs(q[i]));
            if (MustBePositive(i, pairs)) size = Math.Max(size, 1e-2 * Math.Abs(basic[i]));
        }

        var least = -1e-12 * size;
        for (var i = 0; i < n; i++)
        {
            if (!MustBePositive(i, pairs)) continue;
            if (!(basic[i] >= least)) return false;
        }

        for (var i = 0; i < n; i++)
        {
            if (basis[i] < n) continue;
            z[basis[i] - n] = (MustBePositive(i, pairs) ? Math.Max(0, basic[i]) : basic[i]) / scale[basis[i] - n];
        }

        for (var i = 0; i < n; i++)
        {
            if (basis[i] < n) z[basis[i]] = 0;
        }

        return true;
    }

    private bool MustBePositive(int position, ReadOnlySpan<PairState> pairs) => basis[position] == 2 * n || pairs[basis[position] % n] == PairState.Either;

    private bool Lemke(ReadOnlySpan<double> m, ReadOnlySpan<double> q, ReadOnlySpan<PairState> pairs, int attempt)
    {
        var sources = 0.0;
        foreach (var x in q) sources = Math.Max(sources, Math.Abs(x));
        for (var i = 0; i < n; i++)
        {
            // Later attempts move the offsets by a hair, which breaks ties another way.
            offset[i] = q[i] + (attempt == 0 ? 0 : 1e-10 * (1 + sources) * ((i + 1) * 0.618034 * attempt % 1));
            basis[i] = pairs[i] == PairState.Held ? n + i : i;
        }

        // Held pairs in, nothing else conducting: what is most below zero tells where t must start.
        if (!SolveBasis(m, offset.AsSpan(0, n), pairs)) return false;
        var artificial = 2 * n;
        Column(m, artificial, pairs, direction);
        LuFactor.Solve(factor, n, pivot, direction.AsSpan(0, n));
        var worst = -1;
        for (var i = 0; i < n; i++)
        {
            if (pairs[i] != PairState.Either || basic[i] >= 0) continue;
            if (worst < 0 || basic[i] / direction[i] > basic[worst] / direction[worst]) worst = i;
        }

        if (worst < 0) return true;
        basis[worst] = artificial;
        var entering = n + worst;
        for (var step = 0; step < 20 * n + 50; step++)
        {
            if (!SolveBasis(m, offset.AsSpan(0, n), pairs)) return false;
            Column(m, entering, pairs, direction);
            LuFactor.Solve(factor, n, pivot, direction.AsSpan(0, n));
            var leaving = RatioTest(pairs);
            if (leaving < 0) return false;
            var left = basis[leaving];
            basis[leaving] = entering;
            if (left == artificial) return true;
            entering = left < n ? left + n : left - n;
        }

        return false;
    }

    private bool SolveBasis(ReadOnlySpan<double> m, ReadOnlySpan<double> right, ReadOnlySpan<PairState> pairs)
    {
        if (--FactoringsLeft < 0) return false;
        for (var position = 0; position < n; position++)
        {
            var variable = basis[position];
            for (var i = 0; i < n; i++) factor[i * n + position] = Entry(m, i, variable, pairs);
        }

        if (!LuFactor.Factor(factor.AsSpan(0, n * n), n, pivot)) return false;
        right.CopyTo(basic);
        LuFactor.Solve(factor, n, pivot, basic.AsSpan(0, n));
        return true;
    }

    private void Column(ReadOnlySpan<double> m, int variable, ReadOnlySpan<PairState> pairs, double[] column)
    {
        for (var i = 0; i < n; i++) column[i] = Entry(m, i, variable, pairs);
    }

    /// <summary>Row i of the column of a variable in w − M z − t = q.</summary>
    private double Entry(ReadOnlySpan<double> m, int i, int variable, ReadOnlySpan<PairState> pairs)
    {
        if (variable < n) return i == variable ? 1 : 0;
        if (variable < 2 * n) return -m[i * n + variable - n] / scale[variable - n];
        return pairs[i] == PairState.Either ? -1 : 0;
    }

    /// <summary>The position that first reaches zero as the entering variable grows; near-ties go to the artificial variable, else to the largest pivot.</summary>
    private int RatioTest(ReadOnlySpan<PairState> pairs)
    {
        var largest = 0.0;
        for (var i = 0; i < n; i++) largest = Math.Max(largest, Math.Abs(direction[i]));
        var least = double.PositiveInfinity;
        for (var i = 0; i < n; i++)
        {
            if (MustBePositive(i, pairs) && direction[i] > 1e-13 * largest) least = Math.Min(least, Math.Max(0, basic[i]) / direction[i]);
        }

        var best = -1;
        for (var i = 0; i < n; i++)
        {
            if (!MustBePositive(i, pairs) || !(direction[i] > 1e-13 * largest) || !(Math.Max(0, basic[i]) / direction[i] <= least * (1 + 1e-12))) continue;
            if (basis[i] == 2 * n) return i;
            if (best < 0 || direction[i] > direction[best]) best = i;
        }

        return best;
    }

    private void Grow()
    {
        factor = new double[n * n];
        basic = new double[n];
        direction = new double[n];
        scale = new double[n];
        offset = new double[n];
        pivot = new int[n];
        basis = new int[n];
    }
}
