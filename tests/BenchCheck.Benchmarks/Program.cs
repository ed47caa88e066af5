using System.CommandLine;
using BenchCheck.Benchmarks.Scoreboard;

var root = new RootCommand("Measures of the program against known truth.") { TruthCheck.Command };
return root.Parse(args).Invoke();
