using System.CommandLine;
using BenchCheck.Benchmarks.Batches;
using BenchCheck.Benchmarks.Scoreboard;
using BenchCheck.Benchmarks.Scoreboard.Commands;
using BenchCheck.Benchmarks.Speed;

var root = new RootCommand("Measures of the program against known truth, and of its speed beside slower ways.")
{
    TruthCheck.Command,
    ScoreboardCommand.Create(),
    IsolateCommand.Create(),
    FitBenchmark.Command,
    RankingBenchmark.Command,
    SolveBenchmark.Command,
    BatchSpeed.Create(),
    LogSpeed.Create(),
};
return root.Parse(args).Invoke();
