using System.Collections.Immutable;
using BenchCheck.Core.Boards;

namespace BenchCheck.Core.Equations;

/// <summary>A board at rest in one condition: its node voltages, and state, pin currents and power of every part.</summary>
public sealed class OperatingPoint
{
    /// <summary>Port current below which a junction counts as off: its drop is then 0.24 V below that at 1 mA.</summary>
    private const double OffAmperes = 1e-7;

    /// <summary>Share of the reverse current of a transistor's base-collector junction above which the transistor counts as saturated.</summary>
    private const double SaturatedShare = 0.01;

    private readonly Network network;
    private readonly double[] x;
    private readonly double[] ports;
    private readonly double[] theta;

    private readonly double[] thevenin;

    private OperatingPoint(Network network, double[] x, double[] ports, double[] theta, double[] thevenin)
    {
        this.thevenin = thevenin;
        this.network = network;
        this.x = x;
        this.ports = ports;
        this.theta = theta;
    }

    public Condition Condition => network.Condition;

    internal static OperatingPoint Of(Network network, NetworkSolver solver, ReadOnlySpan<double> theta)
    {
        var (x, ports) = (solver.Unknowns.ToArray(), solver.PortCurrents.ToArray());
        var thevenin = new double[network.NodeCount];
        for (var i = 0; i < thevenin.Length; i++) thevenin[i] = solver.TheveninOhms(i);
        return new OperatingPoint(network, x, ports, theta.ToArray(), thevenin);
    }

    /// <summary>Resistance looking into a node against the reference, every device at the slope of its state.</summary>
    public double TheveninOhms(string node) => network.IndexOf(node) is >= 0 and var i ? thevenin[i] : 0;

    /// <summary>Currents worth a line: two-pin parts from their first pin to their second, the collector and base of transistors.</summary>
    public IEnumerable<(string At, double Amperes)> Currents()
    {
        foreach (var part in network.Parts)
        {
            if (part is Transistor q)
            {
                var (forward, reverse) = (JunctionAmperes(part, JunctionRole.BaseEmitter), JunctionAmperes(part, JunctionRole.BaseCollector));
                var (gain, reverseGain) = Gains(part);
                var sign = q.IsNpn ? 1 : -1;
                yield return (q.JointName(Transistor.Collector), sign * (forward - reverse - reverse / reverseGain));
                yield return (q.JointName(Transistor.Base), sign * (forward / gain + reverse / reverseGain));
            }
            else if (part is Regulator u)
            {
                yield return (u.JointName(Regulator.Output), -JunctionAmperes(part, JunctionRole.Delivery));
            }
            else if (part is Mosfet m)
            {
                var channel = JunctionAmperes(part, JunctionRole.Channel) - JunctionAmperes(part, JunctionRole.ReverseChannel) - JunctionAmperes(part, JunctionRole.Forward);
                yield return (m.JointName(Mosfet.Drain), m.IsNChannel ? channel : -channel);
            }
            else if (Through(part) is { } amperes)
            {
                yield return (part.Designator, amperes);
            }
        }
    }

    /// <summary>Voltage of a node against the reference.</summary>
    public double Volts(string node) => Volts(network.IndexOf(node));

    /// <summary>Power that a part turns into heat, in watts; a supply's own is not counted.</summary>
    public double Watts(Part part)
    {
        ArgumentNullException.ThrowIfNull(part);
        var index = network.Parts.IndexOf(part);
        var watts = 0.0;
        foreach (ref readonly var e in network.Conductors.AsSpan())
        {
            if (e.Part != index) continue;
            var v = Volts(e.From) - Volts(e.To);
            watts += v * v / e.Ohms.Value(theta);
        }

        for (var k = 0; k < network.Ports.Length; k++)
        {
            ref readonly var e = ref network.Ports[k];
            if (e.Part != index || e.Row >= 0) continue;
            watts += (Volts(e.High) - Volts(e.Low)) * ports[k] / e.Gain.Value(theta);
            if (e.TransportFrom != e.TransportTo) watts += (Volts(e.TransportFrom) - Volts(e.TransportTo)) * ports[k];
        }

        // What a regulator draws for itself; a current source's own power is a supply's.
        foreach (ref readonly var e in network.Currents.AsSpan())
        {
            if (e.Part == index && part is Regulator) watts += (Volts(e.From) - Volts(e.To)) * e.Amperes.Value(theta);
        }

        foreach (ref readonly var e in network.Amplifiers.AsSpan())
        {
            if (e.Part == index) watts += Math.Abs(Volts(e.Output) * x[e.Row]);
        }

        return watts;
    }

    /// <summary>State of a device in trade words; null for a part that has none.</summary>
    public string? State(Part part) => part switch
    {
        Transistor => TransistorState(part),
        Diode => JunctionAmperes(part, JunctionRole.Forward) > OffAmperes ? "conducting"
            : JunctionAmperes(part, JunctionRole.Breakdown) > OffAmperes ? "breakdown" : "off",
        OpAmp => LimitState(part),
        Mosfet => ChannelState(part),
        Regulator => RegulatorState(part),
        _ => null,
    };

    /// <summary>Collector current over base current of a transistor as it stands; NaN while it is off.</summary>
    public double CurrentRatio(Transistor part)
    {
        ArgumentNullException.ThrowIfNull(part);
        var (forward, reverse) = (JunctionAmperes(part, JunctionRole.BaseEmitter), JunctionAmperes(part, JunctionRole.BaseCollector));
        var (gain, reverseGain) = Gains(part);
        var baseAmperes = forward / gain + reverse / reverseGain;
        return forward > OffAmperes ? (forward - reverse - reverse / reverseGain) / baseAmperes : double.NaN;
    }

    /// <summary>Current of a two-pin part, into its first pin; null for a part that carries none at DC.</summary>
    private double? Through(Part part)
    {
        var index = network.Parts.IndexOf(part);
        foreach (ref readonly var e in network.Conductors.AsSpan())
        {
            if (e.Part == index) return (Volts(e.From) - Volts(e.To)) / e.Ohms.Value(theta);
        }

        foreach (ref readonly var e in network.Voltages.AsSpan())
        {
            if (e.Part == index) return x[e.Row];
        }

        return part is Diode ? JunctionAmperes(part, JunctionRole.Forward) - JunctionAmperes(part, JunctionRole.Breakdown) : null;
    }

    private string TransistorState(Part part)
    {
        var (forward, reverse) = (JunctionAmperes(part, JunctionRole.BaseEmitter), JunctionAmperes(part, JunctionRole.BaseCollector));
        if (forward <= OffAmperes) return reverse > OffAmperes ? "reversed" : "off";
        if (reverse <= SaturatedShare * forward) return "active";
        return reverse > forward ? "reversed" : "saturated";
    }

    private string ChannelState(Part part)
    {
        var (forward, reverse) = (JunctionAmperes(part, JunctionRole.Channel), JunctionAmperes(part, JunctionRole.ReverseChannel));
        if (forward > OffAmperes && reverse > OffAmperes) return "on";
        if (forward > OffAmperes || reverse > OffAmperes) return "partly on";
        return JunctionAmperes(part, JunctionRole.Forward) > OffAmperes ? "off, body diode conducting" : "off";
    }

    private string RegulatorState(Part part) =>
        JunctionAmperes(part, JunctionRole.Reference) > OffAmperes ? "regulating" : JunctionAmperes(part, JunctionRole.Delivery) > OffAmperes ? "in drop-out" : "off";

    private string LimitState(Part part)
    {
        var index = network.Parts.IndexOf(part);
        for (var k = 0; k < network.Ports.Length; k++)
        {
            ref readonly var e = ref network.Ports[k];
            // An upper limit measures its output against the pin above; the output is then the port's high side.
            if (e.Part == index && e.Row >= 0 && ports[k] > 0) return e.RowSign * (network.Amplifiers.Length > 0 ? -1 : 1) > 0 ? "high" : "low";
        }

        return "linear";
    }

    private double JunctionAmperes(Part part, JunctionRole role)
    {
        var index = network.Parts.IndexOf(part);
        for (var k = 0; k < network.Ports.Length; k++)
        {
            if (network.Ports[k].Part == index && network.Ports[k].Role == role) return ports[k];
        }

        return 0;
    }

    private (double Forward, double Reverse) Gains(Part part)
    {
        var index = network.Parts.IndexOf(part);
        var (forward, reverse) = (1.0, 1.0);
        foreach (ref readonly var e in network.Ports.AsSpan())
        {
            if (e.Part != index) continue;
            if (e.Role == JunctionRole.BaseEmitter) forward = e.Gain.Value(theta);
            if (e.Role == JunctionRole.BaseCollector) reverse = e.Gain.Value(theta);
        }

        return (forward, reverse);
    }

    private double Volts(int index) => index < 0 ? 0 : x[index];
}
