using System.CommandLine;
using BenchCheck.Benchmarks.Scoreboard;
using BenchCheck.Benchmarks.Scoreboard.Commands;

var root = new RootCommand("Measures of the program against known truth.") { TruthCheck.Command, ScoreboardCommand.Create(), IsolateCommand.Create() };
return root.Parse(args).Invoke();
