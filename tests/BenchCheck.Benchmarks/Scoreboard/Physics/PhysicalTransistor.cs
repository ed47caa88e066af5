using System.Collections.Immutable;
using BenchCheck.Core.Boards;

namespace BenchCheck.Benchmarks.Scoreboard.Physics;

/// <summary>A bipolar transistor by Ebers and Moll with Early effect and the ohmic resistances of its leads.</summary>
/// <param name="Law">transport current of its junctions</param>
/// <param name="ForwardGain">β_F at v_BC = 0; the gain met in a circuit is β_F (1 − v_BC/V_A)</param>
/// <param name="LeadOhms">collector, base, emitter</param>
public sealed record PhysicalTransistor(
    string Designator, ImmutableArray<string> Nodes, bool IsNpn, Junction Law, double ForwardGain, double ReverseGain, double EarlyVolts,
    (double Collector, double Base, double Emitter) LeadOhms) : PhysicalPart(Designator, Nodes)
{
    public override void Place(TruthCircuit circuit, Condition condition)
    {
        var pins = (circuit.Node(Nodes[0]), circuit.Node(Nodes[1]), circuit.Node(Nodes[2]));
        circuit.AddBipolar(Designator, pins, IsNpn, Law, ForwardGain, ReverseGain, EarlyVolts, LeadOhms);
    }

    /// <summary>A specimen: base-emitter voltage at 1 mA within 30 mV, −2 mV/K, Early voltage 30 V to 150 V, reverse gain 0.5 to 10; common practice, no source.</summary>
    public static PhysicalTransistor Of(Transistor transistor, Draw draw, double celsius)
    {
        var spread = Math.Min(0.03, (transistor.Drop.High - transistor.Drop.Low) / 2);
        var drop = transistor.Drop.Value + draw.Uniform(-spread, spread) - 2e-3 * (celsius - 25);
        var law = new Junction(transistor.ReferenceAmperes, drop, draw.Uniform(1, 1.02) * Junction.ThermalVolts(celsius));
        var gain = transistor.Gain;
        return new PhysicalTransistor(
            transistor.Designator, transistor.Nodes, transistor.IsNpn, law, draw.LogUniform(gain.Low, gain.High), draw.LogUniform(0.5, 10),
            draw.LogUniform(30, 150), (draw.Uniform(0.2, 2), draw.Uniform(5, 60), draw.Uniform(0.1, 0.5)));
    }
}
