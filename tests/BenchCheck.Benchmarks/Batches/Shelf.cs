using BenchCheck.Core.Boards;
using BenchCheck.Core.Equations;
using BenchCheck.Core.Fitting;
using BenchCheck.Core.Metering;
using BenchCheck.Files;

namespace BenchCheck.Benchmarks.Batches;

/// <summary>Boards of one kind without end, drawn from their tolerances; every tenth has a resistor a decade too high.</summary>
internal sealed class Shelf
{
    public const string BoardText = """
        title = "Circulation-fan stage"
        [parts]
        V1 = { kind = "supply",   value = "12 V 1%", pins = { plus = "VCC", minus = "GND" } }
        R1 = { kind = "resistor", value = "68k 5%",  pins = ["VCC", "B1"] }
        R2 = { kind = "resistor", value = "15k 5%",  pins = ["B1", "GND"] }
        R3 = { kind = "resistor", value = "2k7 5%",  pins = ["VCC", "C1"] }
        R4 = { kind = "resistor", value = "680 5%",  pins = ["E1", "GND"] }
        R5 = { kind = "resistor", value = "10k 5%",  pins = ["C1", "OUT"] }
        R6 = { kind = "resistor", value = "33k 5%",  pins = ["OUT", "GND"] }
        C1 = { kind = "capacitor", value = "47 uF 20%", pins = ["E1", "GND"] }
        Q1 = { kind = "npn", gain = "100..300", pins = { collector = "C1", base = "B1", emitter = "E1" } }
        """;

    private const double Resolution = 1e-3;

    private static readonly string[] Nodes = ["VCC", "B1", "C1", "E1", "OUT"];

    public Shelf()
    {
        Bench = BoardFile.Parse(BoardText, "fan-stage.toml").Bench!;
        Faulty = BoardFile.Parse(BoardText.Replace("680 5%", "6k8 5%", StringComparison.Ordinal), "fan-stage.toml").Bench!;
    }

    public Bench Bench { get; }

    private Bench Faulty { get; }

    public IEnumerable<ReadingSet> Boards(int count, int seed)
    {
        var draw = new Random(seed);
        var (healthy, faulty) = (Model(Bench), Model(Faulty));
        for (var i = 0; i < count; i++) yield return new ReadingSet($"{i:000000}", Readings(i % 10 == 9 ? faulty : healthy, draw));
    }

    private BoardModel Model(Bench bench)
    {
        Probe[] probes = [.. Nodes.Select(n => Probe.Of(bench, Reading(n, 6.1)))];
        return new BoardModel(bench.Board, probes, [.. probes.Select(_ => true)], new NetworkSolver(JunctionLaw.Exponential));
    }

    private System.Collections.Immutable.ImmutableArray<Reading> Readings(BoardModel model, Random draw)
    {
        var phi = new double[model.Parameters.Length];
        for (var i = 0; i < phi.Length; i++) phi[i] = model.Parameters[i].Mean + (model.Parameters[i].IsUnknown ? 0 : (draw.NextDouble() - 0.5) * 2 * Math.Sqrt(3) * model.Parameters[i].Sigma);
        var volts = new double[Nodes.Length];
        model.Predict(phi, volts, []);
        return [.. Nodes.Select((n, i) => Reading(n, Math.Round(volts[i] / Resolution) * Resolution))];
    }

    private Reading Reading(string node, double volts) => new([], Bench.Board.Conditions[0].Name, ReadingQuantity.Voltage, node, Bench.Board.Reference, volts);
}
