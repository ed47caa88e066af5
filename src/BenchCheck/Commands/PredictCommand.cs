using System.CommandLine;
using BenchCheck.Core.Checking;
using BenchCheck.Files;

namespace BenchCheck.Commands;

/// <summary><c>benchcheck predict BOARD</c>: what the meter will show on a healthy board.</summary>
internal static class PredictCommand
{
    public static Command Create(Terminal terminal)
    {
        var command = new Command("predict", """
            Predicts what the meter will show at every node of a healthy board, with the bands that tolerances allow.

            Examples:
              benchcheck predict fan-stage.toml
              benchcheck predict fan-stage.toml --condition high --json
            """);
        var inputs = Inputs.BoardOnly(command, terminal);
        var options = new CheckOptions(command);
        var condition = new Option<string?>("--condition") { Description = "Only this condition.", HelpName = "NAME" };
        var json = new Option<bool>("--json") { Description = "Print one JSON object instead of tables." };
        command.Add(condition);
        command.Add(json);
        command.SetAction(Run);
        return command;

        int Run(ParseResult parsed)
        {
            if (inputs.Bench(parsed) is not { } bench) return ExitCode.Unusable;
            var wanted = parsed.GetValue(condition);
            if (wanted is not null && bench.Board.FindCondition(wanted) is null)
            {
                terminal.Error.WriteLine($"the board has no condition \"{Printable.Text(wanted)}\"; it has {string.Join(", ", bench.Board.Conditions.Select(c => Printable.Text(c.Name)))}");
                return ExitCode.Unusable;
            }

            var prediction = Predictor.Predict(bench, options.Settings(parsed));
            if (parsed.GetValue(json)) terminal.Output.WriteLine(PredictionJson.Line(prediction, wanted));
            else PredictionTables.Write(terminal.Console, prediction, wanted);
            return ExitCode.Agrees;
        }
    }
}
