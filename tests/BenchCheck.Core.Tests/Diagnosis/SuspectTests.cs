using System.Collections.Immutable;
using BenchCheck.Core.Boards;
using BenchCheck.Core.Checking;
using BenchCheck.Core.Diagnosis;
using BenchCheck.Core.Equations;
using BenchCheck.Core.Fitting;
using BenchCheck.Core.Metering;
using BenchCheck.Core.Quantities;
using Xunit;

namespace BenchCheck.Core.Tests.Diagnosis;

/// <summary>The faulty part is named, what looks the same is said to look the same, and a healthy board is left alone.</summary>
public class SuspectTests
{
    /// <summary>Every fault of the catalogue in turn, put into the fan stage and read at every node without error.</summary>
    [Fact]
    public void Every_fault_that_the_readings_show_is_in_the_first_group()
    {
        var bench = WorkshopBoards.FanStage();
        var healthy = Predicted(bench, bench.Board);
        var reconciliation = new Reconciliation(bench, CheckSettings.Default);
        var missed = new List<string>();
        var shown = 0;
        foreach (var hypothesis in FaultCatalogue.Of(bench.Board))
        {
            var readings = Predicted(bench, hypothesis.Board);
            var result = reconciliation.Run(readings, TestContext.Current.CancellationToken);
            var moved = readings.Readings.Zip(healthy.Readings).Max(x => Math.Abs(x.First.Value - x.Second.Value) / (0.05 + 0.15 * Math.Abs(x.Second.Value)));
            if (moved < 1 || result.Verdict == BoardVerdict.Agrees) continue;
            shown++;
            var first = result.Suspects.IsEmpty ? [] : result.Suspects[0].Alike.Prepend(result.Suspects[0].Fault);
            if (!first.Any(f => hypothesis.Names.Any(n => f.Fault == n.Kind && f.Parts.SequenceEqual(n.Parts) && f.Nodes.SequenceEqual(n.Nodes))))
                missed.Add($"{hypothesis.Names[0].Text}: {result.Suspects.FirstOrDefault()?.Text}");
        }

        Assert.True(shown > 50, $"only {shown} faults showed");
        Assert.True(missed.Count <= shown / 20, string.Join("\n", missed));
    }

    [Fact]
    public void A_healthy_board_is_left_alone()
    {
        var bench = WorkshopBoards.FanStage();
        var result = new Reconciliation(bench, CheckSettings.Default).Run(Predicted(bench, bench.Board), TestContext.Current.CancellationToken);
        Assert.Equal(BoardVerdict.Agrees, result.Verdict);
        Assert.Equal(FaultKind.None, result.Suspects[0].Fault.Fault);
        Assert.True(result.Suspects[0].Probability > 0.9);
        Assert.All(result.Readings, r => Assert.Equal(ReadingVerdict.In, r.Verdict));
    }

    [Fact]
    public void An_open_part_and_its_open_joints_are_one_entry()
    {
        var bench = WorkshopBoards.FanStage();
        var r3 = (Resistor)bench.Board.Find("R3")!;
        var open = bench.Board.With([r3 with { Ohms = Nominal.Exactly(1e12) }], []);
        var first = new Reconciliation(bench, CheckSettings.Default).Run(Predicted(bench, open), TestContext.Current.CancellationToken).Suspects[0];
        Assert.Equal((FaultKind.Open, "R3"), (first.Fault.Fault, first.Fault.Parts[0]));
        Assert.Contains(first.Alike, f => f.Pins.Contains("R3.1"));
        Assert.Contains(first.Alike, f => f.Pins.Contains("R3.2"));
        Assert.Contains("the readings look the same", first.Text, StringComparison.Ordinal);
    }

    [Fact]
    public void A_condition_that_was_not_set_up_is_told_from_a_faulty_part()
    {
        var dark = Condition.Powered with { Name = "dark" };
        var bright = dark with { Name = "bright", Set = dark.Set.Add("V2", Nominal.Within(3, Tolerance.Absolute(0.02))) };
        var board = new BoardSketch().Supply("V1", "VCC", 12, percent: 1).Supply("V2", "S", 0.5, percent: 4).Resistor("R1", "S", "B1", 22e3, 5).Resistor("R2", "VCC", "C1", 4.7e3, 5)
            .Resistor("R3", "E1", "0", 1e3, 5).Npn("Q1", "C1", "B1", "E1", 100, 300, 0.65).In(dark).In(bright).Board;
        var bench = new Bench(board, [Meter.Usual], []);
        var still = board.In([dark, bright with { Set = dark.Set }, .. board.Conditions.Skip(2)]);
        string[] nodes = ["VCC", "S", "C1", "E1"];
        var set = new ReadingSet(null, [.. new[] { "dark", "bright" }.SelectMany(c => nodes.Select(n => new Reading([], c, ReadingQuantity.Voltage, n, "0", 0)))]);
        var probes = set.Readings.Select(r => Probe.Of(bench, r)).ToArray();
        var model = new BoardModel(still, probes, new bool[probes.Length], new NetworkSolver(JunctionLaw.Exponential));
        var values = new double[probes.Length];
        model.Predict([.. model.Parameters.Select(p => p.Mean)], values, []);
        var readings = set with { Readings = [.. set.Readings.Select((r, i) => r with { Value = Math.Round(values[i], 3) })] };
        var first = new Reconciliation(bench, CheckSettings.Default).Run(readings, TestContext.Current.CancellationToken).Suspects[0];
        Assert.Contains(first.Alike.Prepend(first.Fault), f => f.Text == "bright not set up, the board was still in dark" && f.Parts.SequenceEqual(["V2"]));
    }

    [Fact]
    public void With_one_redundant_reading_all_normalised_residuals_are_equal_and_the_wrong_reading_cannot_be_told()
    {
        // Three exact resistors in a chain between two exact taps: two unknown supplies, three readings, redundancy one.
        var bench = new Bench(
            new BoardSketch().Add(new Supply("V1", ["A", "0"], Nominal.Unknown)).Add(new Supply("V2", ["C", "0"], Nominal.Unknown))
                .Resistor("R1", "A", "B", 1e3).Resistor("R2", "B", "C", 1e3).Board,
            [new Meter("ideal", double.PositiveInfinity, 6000, new MeterFunction(0, 2, [60]))], []);
        ReadingSet Set(params (string Node, double Volts)[] readings) =>
            new(null, [.. readings.Select(r => new Reading([], Condition.DefaultName, ReadingQuantity.Voltage, r.Node, "0", r.Volts))]);
        var result = new Reconciliation(bench, CheckSettings.Default).Run(Set(("A", 10), ("B", 7.36), ("C", 4)), TestContext.Current.CancellationToken);
        var residuals = result.Readings.Select(r => Math.Abs(r.NormalisedResidual)).ToArray();
        Assert.True(residuals[0] > 5);
        Assert.All(residuals, r => Assert.Equal(residuals[0], r, 1e-6));
        var errors = result.Suspects.Where(s => s.Alike.Prepend(s.Fault).Any(f => f.Fault == FaultKind.ReadingError)).ToArray();
        Assert.True(errors.Length <= 1, string.Join("\n", result.Suspects.Select(s => s.Probability + s.Text)));
    }

    [Fact]
    public void Two_faulty_branches_of_a_mesh_are_found()
    {
        // The mesh of 12 nodes and 20 unit conductances of tolerance 5 %, 1 A into node 1, faults in branches 2 and 18 (both halved), nodes 4, 5, 8, 9
        // not accessible: in the manner of Bandler, Biernacki, Salama and Starzyk, Proc. ISCAS 1982; branch order and voltages are our own.
        (int A, int B)[] branches =
        [
            (1, 2), (1, 3), (1, 4), (2, 5), (2, 6), (3, 4), (4, 5), (5, 6), (3, 7), (4, 8), (5, 9), (6, 10), (7, 8), (8, 9), (9, 10), (7, 11), (8, 11), (9, 12), (10, 12), (11, 12),
        ];
        string Node(int i) => i == 12 ? "0" : $"N{i}";
        var sketch = new BoardSketch().Current("I1", "N1", "0", 1);
        for (var k = 0; k < branches.Length; k++) sketch.Resistor($"R{k + 1}", Node(branches[k].A), Node(branches[k].B), 1, 5);
        var board = sketch.Board;
        var faulty = board.With([With("R2"), With("R18")], []);
        Part With(string name) => (Resistor)board.Find(name)! with { Ohms = Nominal.Within(2, Tolerance.Percent(5)) };
        var bench = new Bench(board, [new Meter("precise", double.PositiveInfinity, 600_000, new MeterFunction(0.0001, 2, [6]))], []);
        int[] accessible = [1, 2, 3, 6, 7, 10, 11];

        // Our own figures for the faulty mesh, in exact arithmetic: v1 = 32062/25725 V, v2 = 3188/3675 V.
        var exact = Predicted(bench, faulty, [.. accessible.Select(Node)]);
        Assert.Equal(32062.0 / 25725, exact.Readings[0].Value, 1e-6);
        Assert.Equal(3188.0 / 3675, exact.Readings[1].Value, 1e-6);
        var result = new Reconciliation(bench, CheckSettings.Default).Run(Predicted(bench, faulty, [.. accessible.Select(Node)]), TestContext.Current.CancellationToken);
        Assert.Equal(BoardVerdict.Disagrees, result.Verdict);
        var first = result.Suspects[0];
        Assert.Contains(first.Alike.Prepend(first.Fault), f => f.With is { } other && new[] { f.Parts[0], other.Parts[0] }.Order().SequenceEqual(["R18", "R2"]));
    }

    /// <summary>What the meter would show, without error, on a board with a fault in it.</summary>
    private static ReadingSet Predicted(Bench bench, Board board, ImmutableArray<string> nodes = default)
    {
        var readings = nodes.IsDefault
            ? WorkshopBoards.EveryNode(bench)
            : [.. nodes.Select(n => new Reading([], Condition.DefaultName, ReadingQuantity.Voltage, n, bench.Board.Reference, 0))];
        var probes = readings.Select(r => Probe.Of(bench, r)).ToArray();
        var model = new BoardModel(board, probes, new bool[probes.Length], new NetworkSolver(JunctionLaw.Exponential));
        var values = new double[probes.Length];
        model.Predict([.. model.Parameters.Select(p => p.Mean)], values, []);
        return new ReadingSet(null, [.. readings.Select((r, i) => r with { Value = Math.Round(values[i], 6) })]);
    }
}
