namespace BenchCheck.Benchmarks.Scoreboard.Physics;

/// <summary>Node voltages of a circuit in one condition.</summary>
/// <param name="Excess">worst Σi at a node over its limit</param>
public sealed record TruthSolution(TruthCircuit Circuit, double[] Volts, double Excess)
{
    public bool IsSolved => Excess <= 1;

    /// <summary>Voltage between two nodes.</summary>
    public double Between(int a, int b) => (a < 0 ? 0 : Volts[a]) - (b < 0 ? 0 : Volts[b]);

    /// <summary>Collector over base current of a transistor that is in its active region there; null when it is not.</summary>
    public double? ActiveGain(string name)
    {
        foreach (var q in Circuit.Bipolars)
        {
            if (q.Name != name) continue;
            var sign = q.IsNpn ? 1 : -1;
            var (collector, @base) = Currents(q, Volts);
            var isActive = sign * Between(q.Base, q.Collector) < 0.3 && sign * @base > 1e-8;
            return isActive ? collector / @base : null;
        }

        return null;
    }

    /// <summary>Currents from collector to emitter and from base to emitter; their sum with the base-collector current is inside the first.</summary>
    internal static (double Collector, double Base) Currents(TruthCircuit.Bipolar q, double[] x)
    {
        double At(int node) => node < 0 ? 0 : x[node];
        var sign = q.IsNpn ? 1 : -1;
        var (vf, vr) = (sign * (At(q.Base) - At(q.Emitter)), sign * (At(q.Base) - At(q.Collector)));
        var (forward, reverse) = (q.Law.At(vf).Amperes, q.Law.At(vr).Amperes);
        var collector = (forward - reverse) * (1 - vr / q.EarlyVolts) - reverse / q.ReverseGain;
        var @base = forward / q.ForwardGain + reverse / q.ReverseGain;
        return (sign * collector, sign * @base);
    }
}
