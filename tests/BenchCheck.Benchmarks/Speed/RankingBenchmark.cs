using System.CommandLine;
using BenchCheck.Core.Boards;
using BenchCheck.Core.Checking;
using BenchCheck.Core.Diagnosis;
using BenchCheck.Core.Equations;
using BenchCheck.Core.Fitting;
using BenchCheck.Core.Metering;
using BenchCheck.Core.Quantities;
using BenchCheck.Core.Tests.Diagnosis;

namespace BenchCheck.Benchmarks.Speed;

/// <summary>All single faults of a 25-part, three-transistor board with 20 readings ranked, beside fresh refits that share nothing.</summary>
internal static class RankingBenchmark
{
    private const int Rounds = 15;

    /// <summary>The fresh way is timed on every so many hypotheses and counted up.</summary>
    private const int Every = 150;

    public static Command Command { get; } = Create();

    private static Command Create()
    {
        var command = new Command("ranking", "Ranking all single faults of a 25-part board, beside fresh refits.");
        command.SetAction(_ => Run());
        return command;
    }

    private static int Run()
    {
        var bench = Card();
        var readings = Readings(bench);
        var plan = ReadingPlan.Of(bench, readings);
        var search = new FaultSearch(bench.Board, plan.Probes, plan.HasScaleError, new NetworkSolver(JunctionLaw.Exponential), FaultRates.For(bench.Board.Origin));
        var lines = new int[plan.Measured.Length];
        List<Fault> faults = [];
        for (var warm = 0; warm < 40; warm++) faults = search.Find(plan.Measured, plan.Noise, lines, CancellationToken.None);
        // Processor time, not the clock: other work on the machine must not count.
        var start = Environment.CpuUsage.TotalTime;
        for (var round = 0; round < Rounds; round++) faults = search.Find(plan.Measured, plan.Noise, lines, CancellationToken.None);
        var fast = (Environment.CpuUsage.TotalTime - start).TotalMilliseconds / Rounds;
        var hypotheses = FaultCatalogue.Of(bench.Board).ToArray();
        var oracle = new FreshRefit(plan.Probes);
        var sample = hypotheses.Where((_, i) => i % Every == 0).ToArray();
        start = Environment.CpuUsage.TotalTime;
        foreach (var hypothesis in sample)
        {
            var model = new BoardModel(hypothesis.Board, plan.Probes, new bool[plan.Probes.Length], new NetworkSolver(JunctionLaw.Exponential));
            oracle.Score(hypothesis, plan.Measured, plan.Noise, [.. model.Parameters.Select(p => p.Mean)]);
        }

        var fresh = (Environment.CpuUsage.TotalTime - start).TotalMilliseconds / sample.Length * hypotheses.Length;
        Console.WriteLine($"{bench.Board.Parts.Length} parts, {bench.Board.Parts.OfType<Transistor>().Count()} transistors, {plan.Measured.Length} readings, {hypotheses.Length} hypotheses and {plan.Measured.Length} wrong readings");
        Console.WriteLine($"ranked in {fast:F1} ms of processor time, warm (floor 50 ms); first: {faults.MaxBy(f => f.LogWeight)!.Named[0].Text}");
        Console.WriteLine($"fresh refits, each reading from its own factorisation: {fresh:F0} ms counted up from {sample.Length} of them; ratio {fresh / fast:F0} (floor 10)");
        return 0;
    }

    private static ReadingSet Readings(Bench bench)
    {
        var faulty = bench.Board.With([R("R8", "C2", "N2", 1e3)], []);
        (string, string)[] pairs = [("B1", "E1"), ("E2", "C1"), ("N2", "OUT"), ("C1", "E1")];
        Reading[] places =
        [
            .. bench.Board.Nodes.Skip(1).Select(n => new Reading([], Condition.DefaultName, ReadingQuantity.Voltage, n, "GND", 0)),
            .. pairs.Select(p => new Reading([], Condition.DefaultName, ReadingQuantity.Voltage, p.Item1, p.Item2, 0)),
        ];
        var truth = BoardModel.AtPlaces(faulty, [.. places.Select(r => Probe.Of(bench, r))], new NetworkSolver(JunctionLaw.Exponential));
        var values = new double[places.Length];
        truth.Predict([.. truth.Parameters.Select(p => p.Mean)], values, []);
        return new ReadingSet(null, [.. places.Select((r, i) => r with { Value = Math.Round(values[i], 3) })]);
    }

    private static Bench Card() => new(
        new Board(
            "Irrigation card", "GND", BoardOrigin.NewBuild,
            [
                new Supply("V1", ["VCC", "GND"], Nominal.Within(12, Tolerance.Percent(1))), new Supply("V2", ["VEE", "GND"], Nominal.Within(-5, Tolerance.Percent(1))),
                R("R1", "VCC", "B1", 47e3), R("R2", "B1", "GND", 10e3), R("R3", "VCC", "C1", 4.7e3), R("R4", "E1", "GND", 1e3), Q(Transistor.Npn, "Q1", "C1", "B1", "E1"),
                R("R5", "VCC", "E2", 1e3), Q(Transistor.Pnp, "Q2", "C2", "C1", "E2"), R("R6", "C2", "N1", 2.2e3), R("R7", "N1", "GND", 3.3e3), R("R8", "C2", "N2", 10e3),
                R("R9", "N2", "N3", 15e3), R("R10", "N3", "GND", 22e3), R("R11", "N3", "N4", 6.8e3), R("R12", "N4", "VEE", 33e3), Q(Transistor.Npn, "Q3", "VCC", "N2", "OUT"),
                R("R13", "OUT", "N5", 470), R("R14", "N5", "VEE", 1.5e3), R("R15", "N5", "N6", 8.2e3), R("R16", "N6", "N7", 12e3), R("R17", "N7", "GND", 18e3),
                R("R18", "N7", "VCC", 100e3), R("R19", "N6", "N8", 2.7e3), R("R20", "N8", "GND", 3.9e3),
            ],
            []),
        [Meter.Usual], []);

    private static Resistor R(string name, string a, string b, double ohms) => new(name, [a, b], Nominal.Within(ohms, Tolerance.Percent(5)));

    private static Transistor Q(PartKind kind, string name, string c, string b, string e) =>
        new(kind, name, [c, b, e], Nominal.Between(80, 320), Transistor.UsualDrop, Transistor.UsualSaturation);
}
