using System.CommandLine;
using BenchCheck.Core.Boards;
using BenchCheck.Core.Checking;
using BenchCheck.Files;

namespace BenchCheck.Commands;

/// <summary><c>benchcheck predict BOARD</c>: what the meter will show on a healthy board.</summary>
internal static class PredictCommand
{
    public static Command Create(Terminal terminal)
    {
        var command = new Command("predict", """
            Predicts what the meter will show at every node of a healthy board, with the bands that tolerances allow, and gains and resistances of
            its small-signal conditions.

            Examples:
              benchcheck predict fan-stage.toml
              benchcheck predict vent-motor.toml --condition idle --json
              benchcheck predict fan-stage.toml --looking-in C1
              benchcheck predict fan-stage.toml --looking-in C1,E1 --bands monte-carlo --draws 20000
            """);
        var inputs = Inputs.BoardOnly(command, terminal);
        var options = new CheckOptions(command);
        var condition = new Option<string?>("--condition") { Description = "Only this condition.", HelpName = "NAME" };
        var lookingIn = new Option<string?>("--looking-in")
        {
            Description = "Also the open voltage and the resistance between a node and the reference, or between two nodes.", HelpName = "NODE[,NODE]",
        };
        var json = new Option<bool>("--json") { Description = "Print one JSON object instead of tables." };
        command.Add(condition);
        command.Add(lookingIn);
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

            var settings = options.Settings(parsed);
            (string, string)? between = null;
            if (parsed.GetValue(lookingIn) is { } pair && (between = Pair(pair, bench.Board)) is null) return ExitCode.Unusable;
            var progress = ProgressLine.On(terminal, settings.Draws, "draws");
            var prediction = Predictor.Predict(bench, settings, between, progress.Report);
            progress.Clear();
            if (parsed.GetValue(json)) terminal.Output.WriteLine(PredictionJson.Line(prediction, wanted));
            else PredictionTables.Write(terminal.Console, prediction, wanted);
            return ExitCode.Agrees;
        }

        (string At, string Against)? Pair(string text, Board board)
        {
            var names = text.Split(',', StringSplitOptions.TrimEntries);
            var unknown = names.FirstOrDefault(n => !board.Nodes.Contains(n));
            if (unknown is null && names.Length <= 2 && (names.Length == 2 ? names[0] != names[1] : names[0] != board.Reference))
                return (names[0], names.Length == 2 ? names[1] : board.Reference);
            terminal.Error.WriteLine(unknown is null
                ? $"--looking-in {Printable.Text(text)}: one node other than the reference, or two different nodes, was expected"
                : $"--looking-in: the board has no node \"{Printable.Text(unknown)}\"; it has {string.Join(", ", board.Nodes.Select(Printable.Text))}");
            return null;
        }
    }
}
