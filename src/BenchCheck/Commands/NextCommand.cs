using System.CommandLine;
using BenchCheck.Core.Checking;
using BenchCheck.Core.Diagnosis;
using BenchCheck.Files;

namespace BenchCheck.Commands;

/// <summary><c>benchcheck next BOARD READINGS</c>: which reading to take next, and what it would show in each case.</summary>
internal static class NextCommand
{
    public static Command Create(Terminal terminal)
    {
        var command = new Command("next", """
            Says which reading would tell most about what is wrong, and what it will show in each case.

            Example:
              benchcheck next fan-stage.toml fan-stage.csv
            """);
        var inputs = Inputs.BoardAndReadings(command, terminal);
        var options = new CheckOptions(command);
        var json = new Option<bool>("--json") { Description = "Print the whole check as one JSON object a board." };
        command.Add(json);
        command.SetAction((parsed, cancel) => Task.FromResult(Run(parsed, cancel)));
        return command;

        int Run(ParseResult parsed, CancellationToken cancel)
        {
            if (inputs.Bench(parsed) is not { } bench) return ExitCode.Unusable;
            if (options.Rates(parsed, bench, terminal) is not { } rates || inputs.Readings(parsed, bench) is not { } sets) return ExitCode.Unusable;
            var reconciliation = new Reconciliation(bench, options.Settings(parsed), rates);
            var exit = ExitCode.Agrees;
            foreach (var set in sets)
            {
                var result = reconciliation.Run(set, cancel);
                if (result.Verdict != BoardVerdict.Agrees) exit = ExitCode.Disagrees;
                if (parsed.GetValue(json)) terminal.Output.WriteLine(ResultJson.Line(result));
                else new CheckTables(terminal.Console, result, false).WriteNext();
            }

            return exit;
        }
    }
}
