namespace BenchCheck.Benchmarks.Scoreboard.Physics;

/// <summary>What hangs on two nodes while a reading is taken: the meter's conductance, and the test current of an ohmmeter.</summary>
/// <param name="Amperes">flows out of the board at B, through the meter, into it at A</param>
public readonly record struct Load(int A, int B, double Siemens, double Amperes)
{
    public static readonly Load None = new(-1, -1, 0, 0);
}

/// <summary>Node voltages of a <see cref="TruthCircuit"/> by damped Newton iteration.</summary>
/// <remarks>
/// Junction voltages move by the logarithm of an upward step. When that does not stand still, conductances across every junction are taken
/// away decade by decade; when that fails too, the sources are raised step by step. Accepted only where Kirchhoff's current law holds.
/// </remarks>
public sealed class TruthSolver
{
    /// <summary>Limit of Σi at a node: this fraction of the largest current there …</summary>
    public const double ResidualFraction = 1e-12;

    /// <summary>… and this many amperes, which the rounding of 24 V over the smallest resistance (50 mΩ) can make; over a meter's 10 MΩ it is 20 µV.</summary>
    public const double ResidualFloor = 2e-12;

    /// <summary>Volts that no junction moves any more; two full steps follow, each of which squares the error.</summary>
    private const double StandsStill = 1e-7;

    /// <summary>More than any junction of these boards sees: an iterate beyond it is a wild one.</summary>
    private const double FarthestVolts = 100;

    private const int MostIterations = 500;

    /// <summary>Each time that so many steps have not settled it, steps go half as far: what swings about the solution then stands still.</summary>
    private const int Patience = 70;

    private double[] matrix = [];
    private double[] right = [];
    private double[] largest = [];

    /// <summary>Solves; the result says whether Kirchhoff's law was met.</summary>
    /// <param name="start">voltages to begin with, of the same circuit; null to begin from nothing</param>
    public TruthSolution Solve(TruthCircuit circuit, Load load, TruthSolution? start = null)
    {
        var n = circuit.Size;
        if (matrix.Length < n * n) matrix = new double[n * n];
        if (right.Length < n) (right, largest) = (new double[n], new double[n]);
        var x = new double[n];
        if (start is not null) start.Volts.CopyTo(x, 0);
        var solved = Newton(circuit, load, x, 0, 1) || ByConductance(circuit, load, x) || BySources(circuit, load, x);
        if (solved) Polish(circuit, load, x);
        return new TruthSolution(circuit, x, Excess(circuit, load, x, 0, 1));
    }

    private bool ByConductance(TruthCircuit circuit, Load load, double[] x)
    {
        Array.Clear(x);
        var (siemens, ratio) = (0.1, 10.0);
        if (!Newton(circuit, load, x, siemens, 1)) return false;
        while (siemens > 1e-14)
        {
            var trial = (double[])x.Clone();
            if (Newton(circuit, load, trial, siemens / ratio, 1))
            {
                trial.CopyTo(x, 0);
                (siemens, ratio) = (siemens / ratio, ratio * 2);
            }
            else if ((ratio = Math.Sqrt(ratio)) < 1.01)
            {
                return false;
            }
        }

        return Newton(circuit, load, x, 0, 1);
    }

    private bool BySources(TruthCircuit circuit, Load load, double[] x)
    {
        Array.Clear(x);
        var (reached, step) = (0.0, 0.1);
        while (reached < 1)
        {
            var trial = (double[])x.Clone();
            var next = Math.Min(1, reached + step);
            if (Newton(circuit, load, trial, 0, next))
            {
                trial.CopyTo(x, 0);
                (reached, step) = (next, step * 2);
            }
            else if ((step /= 4) < 1e-7)
            {
                return false;
            }
        }

        return true;
    }

    private bool Newton(TruthCircuit circuit, Load load, double[] x, double across, double scale)
    {
        var n = circuit.Size;
        var (diodes, bipolars) = (circuit.Diodes.Count, circuit.Bipolars.Count);
        Span<double> v = new double[diodes + 2 * bipolars];
        for (var k = 0; k < v.Length; k++)
        {
            var (a, c, law) = JunctionOf(circuit, k);
            v[k] = law.Limit(0, Volts(x, a) - Volts(x, c));
        }

        for (var iteration = 0; iteration < MostIterations; iteration++)
        {
            var share = Math.Pow(0.5, iteration / Patience);
            Assemble(circuit, load, v, across, scale);
            if (!DenseLu.Solve(matrix.AsSpan(0, n * n), n, right.AsSpan(0, n))) return false;
            var (free, still) = (true, iteration > 0);
            for (var i = 0; i < n; i++)
            {
                if (!double.IsFinite(right[i])) return false;
                x[i] = right[i];
            }

            for (var k = 0; k < v.Length; k++)
            {
                var (a, c, law) = JunctionOf(circuit, k);
                var target = Volts(x, a) - Volts(x, c);
                var next = law.Limit(v[k], Math.Clamp(target, -FarthestVolts, FarthestVolts));
                next = v[k] + (next - v[k]) * share;
                free &= Math.Abs(next - target) < StandsStill;
                still &= Math.Abs(next - v[k]) < StandsStill;
                v[k] = next;
            }

            // A floating node wanders by the rounding of its leakage: there Kirchhoff's law alone decides.
            if (free && (still || Excess(circuit, load, x, across, scale) <= 1)) return true;
        }

        return false;
    }

    /// <summary>Two more full steps; the better point is kept.</summary>
    private void Polish(TruthCircuit circuit, Load load, double[] x)
    {
        var n = circuit.Size;
        var v = new double[circuit.Diodes.Count + 2 * circuit.Bipolars.Count];
        var best = Excess(circuit, load, x, 0, 1);
        for (var step = 0; step < 2; step++)
        {
            for (var k = 0; k < v.Length; k++)
            {
                var (a, c, _) = JunctionOf(circuit, k);
                v[k] = Volts(x, a) - Volts(x, c);
            }

            Assemble(circuit, load, v, 0, 1);
            if (!DenseLu.Solve(matrix.AsSpan(0, n * n), n, right.AsSpan(0, n))) return;
            var trial = right.AsSpan(0, n).ToArray();
            var excess = Excess(circuit, load, trial, 0, 1);
            if (!(excess < best)) return;
            best = excess;
            trial.CopyTo(x, 0);
        }
    }

    private static (int Anode, int Cathode, Junction Law) JunctionOf(TruthCircuit circuit, int k)
    {
        if (k < circuit.Diodes.Count) return (circuit.Diodes[k].Anode, circuit.Diodes[k].Cathode, circuit.Diodes[k].Law);
        var q = circuit.Bipolars[(k - circuit.Diodes.Count) / 2];
        var other = (k - circuit.Diodes.Count) % 2 == 0 ? q.Emitter : q.Collector;
        return q.IsNpn ? (q.Base, other, q.Law) : (other, q.Base, q.Law);
    }

    /// <summary>Companion model: every current is its value and slope at the junction voltages v.</summary>
    private void Assemble(TruthCircuit circuit, Load load, ReadOnlySpan<double> v, double across, double scale)
    {
        var n = circuit.Size;
        Array.Clear(matrix, 0, n * n);
        Array.Clear(right, 0, n);
        for (var i = 0; i < n; i++) matrix[i * n + i] = TruthCircuit.LeakageSiemens;
        foreach (var b in circuit.Branches)
        {
            Stamp(n, b.A, b.B, b.A, b.B, b.Siemens);
            Inject(b.B, b.A, b.Siemens * b.Volts * scale);
        }

        Stamp(n, load.A, load.B, load.A, load.B, load.Siemens);
        Inject(load.B, load.A, load.Amperes * scale);
        foreach (var c in circuit.Currents) Inject(c.A, c.B, c.Amperes * scale);
        for (var k = 0; k < circuit.Diodes.Count; k++)
        {
            var d = circuit.Diodes[k];
            var (i, g) = d.Law.At(v[k]);
            Controlled(n, d.Anode, d.Cathode, d.Anode, d.Cathode, i, g + across, v[k], g);
        }

        for (var k = 0; k < circuit.Bipolars.Count; k++)
        {
            var q = circuit.Bipolars[k];
            var (vf, vr) = (v[circuit.Diodes.Count + 2 * k], v[circuit.Diodes.Count + 2 * k + 1]);
            var (iF, gF) = q.Law.At(vf);
            var (iR, gR) = q.Law.At(vr);
            var (fa, fc) = q.IsNpn ? (q.Base, q.Emitter) : (q.Emitter, q.Base);
            var (ra, rc) = q.IsNpn ? (q.Base, q.Collector) : (q.Collector, q.Base);
            var (from, to) = q.IsNpn ? (q.Collector, q.Emitter) : (q.Emitter, q.Collector);
            Controlled(n, fa, fc, fa, fc, iF / q.ForwardGain, gF / q.ForwardGain + across, vf, gF / q.ForwardGain);
            Controlled(n, ra, rc, ra, rc, iR / q.ReverseGain, gR / q.ReverseGain + across, vr, gR / q.ReverseGain);
            var early = 1 - vr / q.EarlyVolts;
            var byForward = gF * early;
            var byReverse = -gR * early - (iF - iR) / q.EarlyVolts;
            Controlled(n, from, to, fa, fc, (iF - iR) * early, byForward, vf, byForward);
            Controlled(n, from, to, ra, rc, 0, byReverse, vr, byReverse);
        }
    }

    /// <summary>Current i + slope·(v(a) − v(c) − v0) from one node to another.</summary>
    private void Controlled(int n, int from, int to, int a, int c, double i, double siemens, double v0, double slope)
    {
        Stamp(n, from, to, a, c, siemens);
        Inject(from, to, i - slope * v0);
    }

    private void Stamp(int n, int from, int to, int a, int c, double siemens)
    {
        if (from >= 0 && a >= 0) matrix[from * n + a] += siemens;
        if (from >= 0 && c >= 0) matrix[from * n + c] -= siemens;
        if (to >= 0 && a >= 0) matrix[to * n + a] -= siemens;
        if (to >= 0 && c >= 0) matrix[to * n + c] += siemens;
    }

    private void Inject(int from, int to, double amperes)
    {
        if (from >= 0) right[from] -= amperes;
        if (to >= 0) right[to] += amperes;
    }

    /// <summary>Worst Σi over its limit, from the devices' own laws; at most one where Kirchhoff's law holds.</summary>
    private double Excess(TruthCircuit circuit, Load load, double[] x, double across, double scale)
    {
        var n = circuit.Size;
        var sum = new double[n];
        Array.Clear(largest, 0, n);
        for (var i = 0; i < n; i++) Flow(i, -1, TruthCircuit.LeakageSiemens * x[i]);
        foreach (var b in circuit.Branches) Flow(b.A, b.B, b.Siemens * (Volts(x, b.A) - Volts(x, b.B) - b.Volts * scale));
        foreach (var c in circuit.Currents) Flow(c.A, c.B, c.Amperes * scale);
        Flow(load.A, load.B, load.Siemens * (Volts(x, load.A) - Volts(x, load.B)) - load.Amperes * scale);
        for (var k = 0; k < circuit.Diodes.Count + 2 * circuit.Bipolars.Count; k++)
        {
            var (a, c, _) = JunctionOf(circuit, k);
            Flow(a, c, across * (Volts(x, a) - Volts(x, c)));
        }

        foreach (var d in circuit.Diodes) Flow(d.Anode, d.Cathode, d.Law.At(Volts(x, d.Anode) - Volts(x, d.Cathode)).Amperes);
        foreach (var q in circuit.Bipolars)
        {
            var (collector, @base) = TruthSolution.Currents(q, x);
            Flow(q.Collector, q.Emitter, collector);
            Flow(q.Base, q.Emitter, @base);
        }

        var worst = 0.0;
        for (var i = 0; i < n; i++) worst = Math.Max(worst, Math.Abs(sum[i]) / (ResidualFloor + ResidualFraction * largest[i]));
        return double.IsFinite(worst) ? worst : double.PositiveInfinity;

        void Flow(int from, int to, double amperes)
        {
            if (from >= 0) (sum[from], largest[from]) = (sum[from] + amperes, Math.Max(largest[from], Math.Abs(amperes)));
            if (to >= 0) (sum[to], largest[to]) = (sum[to] - amperes, Math.Max(largest[to], Math.Abs(amperes)));
        }
    }

    private static double Volts(double[] x, int node) => node < 0 ? 0 : x[node];
}
