using System.CommandLine;
using System.Globalization;
using BenchCheck.Benchmarks.Scoreboard.Cases;
using BenchCheck.Benchmarks.Scoreboard.Faults;
using BenchCheck.Benchmarks.Scoreboard.Scoring;

namespace BenchCheck.Benchmarks.Scoreboard.Commands;

/// <summary>Counts the readings that the program's own advice saves.</summary>
internal static class IsolateCommand
{
    private const int Shown = 30;

    public static Command Create()
    {
        var boards = new Option<int>("--boards") { Description = "how many boards to draw", DefaultValueFactory = _ => 300 };
        var seed = new Option<int>("--seed") { Description = "seed of the whole run", DefaultValueFactory = _ => 1 };
        var command = new Command("isolate", "Isolate single faults from three readings: guided by the program, and at random.") { boards, seed };
        command.SetAction(parsed =>
        {
            var from = parsed.GetValue(seed);
            var scores = ScoreRun.Of(parsed.GetValue(boards), (i, solver) => new Isolation(solver).Run(CaseSeeds.Of(from, i), FaultMix.Even)).OfType<IsolationScore>().ToArray();
            Print(Console.Out, scores);
            return 0;
        });
        return command;
    }

    private static void Print(TextWriter output, IsolationScore[] scores)
    {
        new Table("further readings after three", "median", "quartiles", "mean where ever", "within 4", "never")
            .Row(Cells("leading group over 90 % with the truth in it: guided (floor: median at most 4)", scores, s => s.Guided.Grouped))
            .Row(Cells("… at random", scores, s => s.AtRandom.Grouped))
            .Row(Cells("… and nothing else in it that a reading could tell: guided", scores, s => s.Guided.Settled))
            .Row(Cells("… at random", scores, s => s.AtRandom.Settled))
            .Write(output, $"{scores.Length} single faults that move a voltage by more than {ScoreSheet.Plain} standard uncertainties");
        foreach (var s in scores.Where(s => (s.Guided.Failure ?? s.AtRandom.Failure) is not null))
            output.WriteLine($"  exception: {s.Case.Seed} {s.Case.Bench.Board.Title}, {s.Case.Faults[0]}: {s.Guided.Failure ?? s.AtRandom.Failure}");
        var lost = scores.Where(s => s.Guided.Grouped is null).ToArray();
        if (lost.Length == 0) return;
        var table = new Table("case", "at random", "board: truth");
        foreach (var s in lost.Take(Shown)) table.Row($"{s.Case.Seed}", s.AtRandom.Grouped?.ToString(CultureInfo.InvariantCulture) ?? "never", $" {s.Case.Bench.Board.Title}: {s.Case.Faults[0]}");
        table.Write(output, $"Never isolated by the program's advice: {lost.Length}{(lost.Length > Shown ? $", the first {Shown}" : "")}");
    }

    private static string[] Cells(string name, IsolationScore[] scores, Func<IsolationScore, int?> count)
    {
        // Never counts as more than any number.
        var counts = scores.Select(s => count(s) ?? int.MaxValue).Order().ToArray();
        if (counts.Length == 0) return [name, "-", "-", "-", "-", "-"];
        string At(int quarter) => counts[(counts.Length - 1) * quarter / 4] is var n && n == int.MaxValue ? "never" : n.ToString(CultureInfo.InvariantCulture);
        var isolated = counts.Where(n => n < int.MaxValue).ToArray();
        return
        [
            name, At(2), $"{At(1)} to {At(3)}", isolated.Length == 0 ? "-" : isolated.Average().ToString("F1", CultureInfo.InvariantCulture),
            Table.Share(counts, n => n <= 4), Table.Share(counts, n => n == int.MaxValue),
        ];
    }
}
