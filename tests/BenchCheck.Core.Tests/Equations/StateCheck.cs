using BenchCheck.Core.Boards;
using BenchCheck.Core.Equations;

namespace BenchCheck.Core.Tests.Equations;

/// <summary>
/// Judges an operating point by the parts alone: every part's own law at its pins, and Kirchhoff's current law at every node, from the
/// voltages and currents that the program reports. Shares no code with the equations.
/// </summary>
internal sealed class StateCheck(Board board, JunctionLaw law, Func<string, double> volts, IReadOnlyDictionary<string, double> amperes)
{
    private const double Volt = 1e-6;

    /// <summary>Resistance that the constant-drop law may give a conducting junction, so that junctions in parallel share.</summary>
    private const double Tie = 1.01e-5;

    /// <summary>The same where it adds to a MOSFET's on-resistance.</summary>
    private const double ChannelTie = 1e-5;

    /// <summary>A regulator's output over its own current at most.</summary>
    private const double RegulatorReach = 0.99e6;

    private readonly double thermal = 1.380649e-23 * (board.Celsius + 273.15) / 1.602176634e-19; // constants exact since the SI of 2019
    private readonly double highest = board.Nodes.Max(n => Math.Abs(volts(n)));
    private readonly double greatest = amperes.Values.Select(Math.Abs).DefaultIfEmpty(0).Max();
    private readonly List<string> violations = [];

    /// <summary>What the gates draw in all.</summary>
    private double gates;

    private readonly Dictionary<string, (double Sum, double Size)> nodes = board.Nodes.ToDictionary(n => n, _ => (0.0, 0.0));
    private readonly HashSet<string> driven =
        [.. board.Parts.OfType<OpAmp>().Select(p => p.Nodes[2]), .. board.Parts.OfType<Regulator>().SelectMany(p => new[] { p.Nodes[Regulator.Input], p.Nodes[Regulator.Common] })];

    /// <summary>Volts by which a law may be missed: rounding, where impossible currents of amperes and more flow.</summary>
    private double Slack => Volt + 1e-9 * (highest + greatest);

    public static List<string> Violations(Board board, JunctionLaw law, OperatingPoint point) =>
        new StateCheck(board, law, point.Volts, point.Currents().ToDictionary(c => c.At, c => c.Amperes)).Violations();

    private List<string> Violations()
    {
        foreach (var part in board.Parts) Check(part);
        foreach (var (node, (sum, size)) in nodes)
        {
            // The output of an op-amp gives whatever current is asked; how a regulator shares its own between two pins is its affair; the reference takes
            // what the others leave.
            if (node == board.Reference || driven.Contains(node)) continue;
            Require(Math.Abs(sum) <= 1e-9 * size + 2e-12 * highest + 1e-12 + 1e-7 * greatest + gates, $"{sum} A left over at {node}");
        }

        return violations;
    }

    private void Require(bool holds, string otherwise)
    {
        if (!holds) violations.Add(otherwise);
    }

    private double Across(Part part, int high, int low) => volts(part.Nodes[high]) - volts(part.Nodes[low]);

    private void Flow(Part part, int into, int outOf, double current)
    {
        void Take(string node, double i) => nodes[node] = (nodes[node].Sum + i, nodes[node].Size + Math.Abs(i));
        Take(part.Nodes[into], current);
        Take(part.Nodes[outOf], -current);
    }

    private void Check(Part part)
    {
        switch (part)
        {
            case Transistor q: CheckTransistor(q); return;
            case OpAmp u: CheckOpAmp(u); return;
            case Mosfet m: CheckMosfet(m); return;
            case Regulator u: CheckRegulator(u); return;
            case CurrentSource s: Flow(s, 0, 1, -s.Amperes.Value); return;
        }

        var (current, v) = (amperes[part.Designator], Across(part, 0, 1));
        Flow(part, 0, 1, current);
        switch (part)
        {
            case Resistor r: Require(Near(v, r.Ohms.Value * current), $"{r.Designator}: {v} V, {current} A"); return;
            case Jumper w: Require(Near(v, w.Ohms.Value * current), $"{w.Designator}: {v} V, {current} A"); return;
            case Supply s: Require(Near(v, s.Volts.Value + (s.SourceOhms?.Value ?? 0) * current), $"{s.Designator}: {v} V, {current} A"); return;
            case Diode d: CheckDiode(d, v, current); return;
            default: throw new NotSupportedException(part.Kind.Name);
        }
    }

    private bool Near(double a, double b) => Math.Abs(a - b) <= 1e-9 * (Math.Abs(a) + Math.Abs(b) + highest + greatest);

    private static double Own(Part part, ParameterKind kind, int occurrence = 0) => part.Parameters.Where(p => p.Kind == kind).ElementAt(occurrence).Nominal.Value;

    private void CheckDiode(Diode d, double v, double current)
    {
        var series = Own(d, ParameterKind.SeriesResistance);
        if (d.Breakdown is null || current > 0)
        {
            CheckJunction(d.Designator, v, current, new Law(d.Drop.Value, d.ReferenceAmperes, Own(d, ParameterKind.Ideality), series), 0);
            if (d.Breakdown is null) return;
        }

        // A zener's breakdown is a junction the other way round, its voltage stated at 5 mA.
        if (current <= 0) CheckJunction($"{d.Designator} reversed", -v, -current, new Law(d.Breakdown!.Value, 5e-3, Own(d, ParameterKind.Ideality, 1), series), 0);
        Require(law == JunctionLaw.Exponential || (v <= d.Drop.Value + Slack + Tie * current && v >= -d.Breakdown!.Value - Slack + Tie * current), $"{d.Designator}: {v} V at {current} A");
    }

    /// <summary>The two controlling currents follow from the collector's and the base's by the gains (Ebers and Moll 1954).</summary>
    private void CheckTransistor(Transistor q)
    {
        var (collector, @base) = (amperes[q.JointName(Transistor.Collector)], amperes[q.JointName(Transistor.Base)]);
        Flow(q, Transistor.Collector, Transistor.Emitter, collector);
        Flow(q, Transistor.Base, Transistor.Emitter, @base);
        var sign = q.IsNpn ? 1 : -1;
        var (iC, iB) = (sign * collector, sign * @base);
        var (gain, reverseGain) = (q.Gain.Value, Transistor.UsualReverseGain.Value);
        var zR = (iB - iC / gain) / ((1 + 1 / reverseGain) / gain + 1 / reverseGain);
        var zF = iC + zR * (1 + 1 / reverseGain);
        var rounding = 1e-9 * gain * (Math.Abs(iC) + Math.Abs(iB));
        var forward = new Law(q.Drop.Value, q.ReferenceAmperes, Own(q, ParameterKind.Ideality), Own(q, ParameterKind.SeriesResistance));
        var reverse = law == JunctionLaw.ConstantDrop ? forward with { Drop = q.Drop.Value - q.Saturation.Value } : forward;
        CheckJunction($"{q.Designator} base-emitter", sign * Across(q, Transistor.Base, Transistor.Emitter), zF, forward, rounding);
        CheckJunction($"{q.Designator} base-collector", sign * Across(q, Transistor.Base, Transistor.Collector), zR, reverse, rounding);
    }

    private sealed record Law(double Drop, double Reference, double Ideality, double Series);

    private void CheckJunction(string name, double v, double z, Law own, double rounding)
    {
        rounding += 1e-11;
        if (law == JunctionLaw.ConstantDrop)
        {
            var tolerance = Slack + Tie * Math.Abs(z);
            Require(z >= -rounding, $"{name}: {z} A");
            Require(v <= own.Drop + tolerance, $"{name}: {v} V is more than its drop {own.Drop} V");
            Require(z <= rounding || v >= own.Drop - tolerance, $"{name}: {v} V at {z} A, drop {own.Drop} V");
            return;
        }

        var nVt = own.Ideality * thermal;
        double Shockley(double at) => own.Reference * Math.Exp(-own.Drop / nVt) * (Math.Exp((at - own.Series * z) / nVt) - 1);
        Require(z <= Shockley(v + Slack) + rounding && z >= Shockley(v - Slack) - rounding, $"{name}: {z} A at {v} V, the law gives {Shockley(v)} A");
    }

    private void CheckOpAmp(OpAmp u)
    {
        var output = volts(u.Nodes[2]);
        var (upper, lower) = (volts(u.Nodes[3]) - u.Headroom, volts(u.Nodes[4]) + u.Headroom);
        var excess = Across(u, 0, 1) + u.Offset.Value - output / (u.Gain?.Value ?? 1e7);
        Require(output <= upper + Slack && output >= lower - Slack, $"{u.Designator}: output {output} V outside {lower} V to {upper} V");
        Require(excess <= Slack || output >= upper - Slack, $"{u.Designator}: input {excess} V too high, output {output} V");
        Require(excess >= -Slack || output <= lower + Slack, $"{u.Designator}: input {excess} V too low, output {output} V");
    }

    /// <summary>What flows is the channel's current from either end, less what the body diode carries the other way.</summary>
    private void CheckMosfet(Mosfet m)
    {
        var drain = amperes[m.JointName(Mosfet.Drain)];
        Flow(m, Mosfet.Drain, Mosfet.Source, drain);
        var sign = m.IsNChannel ? 1 : -1;
        double Channel(int end) => Math.Max(0, sign * Across(m, Mosfet.Gate, end) - m.Threshold.Value) / (m.OnOhms.Value + ChannelTie);
        var (forward, reverse) = (Channel(Mosfet.Source), Channel(Mosfet.Drain));
        var body = forward - reverse - sign * drain;
        var rounding = Slack / m.OnOhms.Value + 1e-9 * (forward + reverse);
        gates += 1e-11 * (forward + reverse);
        CheckJunction($"{m.Designator} body diode", -sign * Across(m, Mosfet.Drain, Mosfet.Source), body, new Law(0.7, 1e-3, 1.5, 0.1), rounding);
    }

    /// <summary>Delivers only, and as long as it does its output stands at its voltage, or its drop-out below the input, whichever is less.</summary>
    private void CheckRegulator(Regulator u)
    {
        var delivered = -amperes[u.JointName(Regulator.Output)];
        Flow(u, Regulator.Output, Regulator.Input, -delivered * (1 + 1e-6));
        var (output, common) = (volts(u.Nodes[Regulator.Output]), volts(u.Nodes[Regulator.Common]));
        var held = Math.Min(common + u.Volts.Value, volts(u.Nodes[Regulator.Input]) - u.DropOut.Value);
        var slack = Slack + Tie * (delivered + u.IdleAmperes.Value);
        if (delivered > RegulatorReach * u.IdleAmperes.Value) return;
        Require(delivered >= -1e-9 * greatest - 1e-12, $"{u.Designator}: takes {-delivered} A at its output");
        Require(output >= held - slack, $"{u.Designator}: {output} V where it holds {held} V");
        Require(delivered <= 1e-9 * greatest + 1e-12 || output <= held + slack, $"{u.Designator}: delivers {delivered} A at {output} V, above {held} V");
    }
}
