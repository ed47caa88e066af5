using System.CommandLine;
using System.Diagnostics;
using System.Globalization;
using BenchCheck.Core.Batches;
using BenchCheck.Core.Checking;

namespace BenchCheck.Benchmarks.Batches;

/// <summary><c>-- batch</c>: boards a second with full ranking of single faults, and growth without it.</summary>
internal static class BatchSpeed
{
    public static Command Create()
    {
        var command = new Command("batch", "Boards a second of a batch, and how time and memory grow with it.");
        var count = new Option<int>("--boards") { Description = "Boards with full ranking.", DefaultValueFactory = _ => 10_000 };
        command.Add(count);
        command.SetAction(parsed =>
        {
            var shelf = new Shelf();
            Console.WriteLine($"processors {Environment.ProcessorCount}");
            Console.WriteLine("boards a processor second tell the work where other programs take their share of the processors");
            Console.WriteLine($"{"boards",10} {"ranking",8} {"seconds",9} {"boards/s",9} {"/proc. s",9} {"agree",7} {"MB peak",8}");
            Measure(shelf, 200, true);
            Measure(shelf, parsed.GetValue(count), true);
            foreach (var n in new[] { 1_000, 10_000, 100_000 }) Measure(shelf, n, false);
        });
        return command;
    }

    private static void Measure(Shelf shelf, int count, bool ranks)
    {
        using var self = Process.GetCurrentProcess();
        var before = self.TotalProcessorTime;
        var clock = Stopwatch.StartNew();
        var summary = new BatchSummary();
        var run = new BatchRun(shelf.Bench, CheckSettings.Default with { FindFaults = ranks }, null, Environment.ProcessorCount);
        foreach (var outcome in run.Run(shelf.Boards(count, 7), (result, _) => BoardOutcome.Of(result), (b, reason) => BoardOutcome.Failed(b.Serial, reason))) summary.Add(outcome);
        var seconds = clock.Elapsed.TotalSeconds;
        self.Refresh();
        var processor = (self.TotalProcessorTime - before).TotalSeconds;
        Console.WriteLine(string.Create(
            CultureInfo.InvariantCulture,
            $"{count,10} {(ranks ? "full" : "none"),8} {seconds,9:0.00} {count / seconds,9:0} {count / processor,9:0} {100.0 * summary.Agreeing / summary.Boards,6:0.0}% {self.PeakWorkingSet64 / 1e6,8:0}"));
    }
}
