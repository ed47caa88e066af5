using System.Collections.Immutable;
using BenchCheck.Core.Boards;

namespace BenchCheck.Benchmarks.Scoreboard.Physics;

/// <summary>A diode, LED or zener: exponential forward, and a zener's knee exponential too.</summary>
/// <param name="Knee">a zener's breakdown, as a junction in the other direction; null for the other kinds</param>
public sealed record PhysicalDiode(string Designator, ImmutableArray<string> Nodes, Junction Forward, double SeriesOhms, Junction? Knee)
    : PhysicalPart(Designator, Nodes)
{
    /// <summary>Current at which a zener's voltage is stated: common practice, no source.</summary>
    private const double ZenerTestAmperes = 5e-3;

    public override void Place(TruthCircuit circuit, Condition condition)
    {
        var (anode, cathode) = (circuit.Node(Nodes[0]), circuit.Node(Nodes[1]));
        circuit.AddDiode(anode, cathode, Forward, SeriesOhms);
        if (Knee is { } knee) circuit.AddDiode(cathode, anode, knee, SeriesOhms);
    }

    /// <summary>A specimen: emission coefficient 1.1 to 1.9 (LED 1.7 to 2.3), −2 mV/K, zener knee 20 mV to 80 mV a factor e; common practice, no source.</summary>
    public static PhysicalDiode Of(Diode diode, Draw draw, double celsius)
    {
        var isLed = ReferenceEquals(diode.Kind, Diode.Led);
        var ideality = isLed ? draw.Uniform(1.7, 2.3) : draw.Uniform(1.1, 1.9);
        var ohms = isLed ? draw.Uniform(2, 10) : draw.Uniform(0.2, 2);
        var spread = Math.Min(isLed ? 0.1 : 0.03, (diode.Drop.High - diode.Drop.Low) / 2);
        var drop = diode.Drop.Value + draw.Uniform(-spread, spread) - 2e-3 * (celsius - 25) - ohms * diode.ReferenceAmperes;
        var forward = new Junction(diode.ReferenceAmperes, drop, ideality * Junction.ThermalVolts(celsius));
        Junction? knee = null;
        if (diode.Breakdown is { } breakdown)
        {
            var softness = draw.LogUniform(0.02, 0.08);
            knee = new Junction(ZenerTestAmperes, draw.Within(breakdown) - ohms * ZenerTestAmperes, softness);
        }

        return new PhysicalDiode(diode.Designator, diode.Nodes, forward, ohms, knee);
    }
}
