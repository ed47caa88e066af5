using System.CommandLine;
using BenchCheck.Benchmarks.Scoreboard.Cases;
using BenchCheck.Benchmarks.Scoreboard.Faults;
using BenchCheck.Benchmarks.Scoreboard.Physics;
using BenchCheck.Benchmarks.Scoreboard.Scoring;
using BenchCheck.Core.Checking;
using BenchCheck.Core.Equations;

namespace BenchCheck.Benchmarks.Scoreboard.Commands;

/// <summary>Scores the program on boards drawn at random, or on a folder of cases with known truth.</summary>
internal static class ScoreboardCommand
{
    public static Command Create()
    {
        var boards = new Option<int>("--boards") { Description = "how many boards to draw", DefaultValueFactory = _ => 1000 };
        var seed = new Option<int>("--seed") { Description = "seed of the whole run", DefaultValueFactory = _ => 1 };
        var mix = new Option<string>("--mix") { Description = "how often each kind of fault comes: even, or rates (those that the program assumes)", DefaultValueFactory = _ => FaultMix.Even.Name };
        mix.AcceptOnlyFromAmong(FaultMix.Even.Name, FaultMix.Rates.Name);
        var law = new Option<string>("--law") { Description = "voltage of a conducting junction: junction (follows its current) or constant-drop", DefaultValueFactory = _ => "junction" };
        law.AcceptOnlyFromAmong("junction", "constant-drop");
        var cases = new Option<DirectoryInfo?>("--cases") { Description = "score the cases in this folder instead: board.toml, readings.csv and truth.json each" };
        var only = new Option<int?>("--only") { Description = "repeat one board by its own seed, and print everything about it" };
        var export = new Option<DirectoryInfo?>("--export") { Description = "write the boards as cases into this folder instead of scoring them" };
        var command = new Command("scoreboard", "Score the program against known truth.") { boards, seed, mix, law, cases, only, export };
        command.SetAction(parsed =>
        {
            var drawnBy = parsed.GetValue(mix) == FaultMix.Rates.Name ? FaultMix.Rates : FaultMix.Even;
            var settings = CheckSettings.Default with { Law = parsed.GetValue(law) == "junction" ? JunctionLaw.Exponential : JunctionLaw.ConstantDrop };
            int[] seeds = parsed.GetValue(only) is { } one ? [one] : [.. Enumerable.Range(0, parsed.GetValue(boards)).Select(i => CaseSeeds.Of(parsed.GetValue(seed), i))];
            if (parsed.GetValue(cases) is { } folder) return ScoreFolder(folder, settings);
            if (parsed.GetValue(export) is { } target) return Export(target, seeds, drawnBy);
            if (parsed.GetValue(only) is not null) return CaseReport.Print(Console.Out, TruthCase.From(seeds[0], drawnBy, new TruthSolver()));
            Console.WriteLine($"seed {parsed.GetValue(seed)}, {drawnBy.Name} mix of faults, {parsed.GetValue(law)} law");
            ScoreSheet.Print(Console.Out, ScoreRun.Of(seeds.Length, (i, solver) => new CaseScorer(solver, settings).Score(KnownCase.Of(TruthCase.From(seeds[i], drawnBy, solver)))));
            return 0;
        });
        return command;
    }

    private static int ScoreFolder(DirectoryInfo folder, CheckSettings settings)
    {
        var known = CaseFolder.Read(folder, Console.Error);
        if (known.IsEmpty)
        {
            Console.Error.WriteLine($"{folder.FullName}: no usable case; expected folders with board.toml, readings.csv and truth.json");
            return 2;
        }

        ScoreSheet.Print(Console.Out, ScoreRun.Of(known.Length, (i, solver) => new CaseScorer(solver, settings).Score(known[i])));
        return 0;
    }

    private static int Export(DirectoryInfo target, int[] seeds, FaultMix mix)
    {
        var solver = new TruthSolver();
        foreach (var seed in seeds) CaseExport.Write(target, TruthCase.From(seed, mix, solver));
        Console.WriteLine($"{seeds.Length} cases in {target.FullName}");
        return 0;
    }
}
