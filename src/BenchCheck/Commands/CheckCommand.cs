using System.CommandLine;
using BenchCheck.Commands.Log;
using BenchCheck.Core.Checking;
using BenchCheck.Core.Diagnosis;
using BenchCheck.Files;

namespace BenchCheck.Commands;

/// <summary><c>benchcheck check BOARD READINGS</c>: the whole job, once.</summary>
internal static class CheckCommand
{
    public static Command Create(Terminal terminal)
    {
        var command = new Command("check", """
            Checks readings against a board: prediction, estimates, verdicts, suspects, next reading.

            Examples:
              benchcheck check fan-stage.toml fan-stage.csv
              benchcheck check fan-stage.toml shelf.csv --serial 0042 --json
              benchcheck check fan-stage.toml fan-stage.csv --plot fan-stage.png --report fan-stage.html
              benchcheck check fan-stage.toml fan-stage.csv --log
            """);
        var inputs = Inputs.BoardAndReadings(command, terminal);
        var options = new CheckOptions(command);
        var pictures = new CheckPictures(command, terminal);
        var filing = LogChoice.ToFileIn(command);
        var json = new Option<bool>("--json") { Description = "Print one JSON object a board, SI units, instead of tables." };
        var all = new Option<bool>("--all") { Description = "Show every estimate, not only those that the readings moved." };
        command.Add(json);
        command.Add(all);
        command.SetAction((parsed, cancel) => Task.FromResult(Run(parsed, cancel)));
        return command;

        int Run(ParseResult parsed, CancellationToken cancel)
        {
            if (inputs.Bench(parsed) is not { } bench) return ExitCode.Unusable;
            if (options.Rates(parsed, bench, terminal) is not { } rates || inputs.Readings(parsed, bench) is not { } sets) return ExitCode.Unusable;
            var settings = options.Settings(parsed);
            var reconciliation = new Reconciliation(bench, settings, rates);
            using var record = filing.IsAsked(parsed)
                ? new CheckFiling(filing.Place(parsed), settings, inputs.SkipsBadRows(parsed), inputs.BoardPath(parsed), inputs.ReadingsPath(parsed), options.RatesPath(parsed))
                : null;
            var exit = ExitCode.Agrees;
            var number = 0;
            foreach (var set in sets)
            {
                var result = reconciliation.Run(set, cancel);
                if (result.Verdict != BoardVerdict.Agrees) exit = ExitCode.Disagrees;
                if (parsed.GetValue(json)) terminal.Output.WriteLine(ResultJson.Line(result));
                else new CheckTables(terminal.Console, result, parsed.GetValue(all)).Write();
                if (!pictures.Write(parsed, result, settings, inputs, number++)) return ExitCode.Unusable;
                if (record?.Add(result) is { } entry) terminal.Error.WriteLine($"filed as record {entry.Number}");
            }

            return exit;
        }
    }
}
