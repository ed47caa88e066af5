using System.CommandLine;
using BenchCheck.Screens;

namespace BenchCheck.Commands;

/// <summary><c>benchcheck open BOARD [READINGS]</c>: the screen at the bench.</summary>
internal static class OpenCommand
{
    public static Command Create(Terminal terminal)
    {
        var command = new Command("open", """
            Opens the bench screen: readings typed beside their predictions, checked as each is entered. Without READINGS the file of the
            board's name that ends in .csv is taken, or begun. Nothing typed is lost: entries are on disk before they are shown.

            Example:
              benchcheck open fan-stage.toml
            """);
        var board = new Argument<string>("BOARD") { Description = "Board file (TOML)." };
        var readings = new Argument<string?>("READINGS") { Description = "Readings file (CSV); it need not exist yet.", Arity = ArgumentArity.ZeroOrOne };
        command.Add(board);
        command.Add(readings);
        command.SetAction(parsed => ScreenProgram.Run(parsed.GetRequiredValue(board), parsed.GetValue(readings), terminal.Error));
        return command;
    }
}
