using System.CommandLine;
using System.Globalization;
using BenchCheck.Records;
using Spectre.Console;

namespace BenchCheck.Commands.Log;

/// <summary><c>benchcheck log list</c>: the newest records, one a line.</summary>
internal static class LogListCommand
{
    public static Command Create(Terminal terminal)
    {
        var command = new Command("list", "Lists records, the newest last.");
        var choice = LogChoice.Of(command);
        var search = new LogSearch(command);
        var most = new Option<int>("--most") { Description = "How many at most.", DefaultValueFactory = _ => 50, HelpName = "N" };
        most.Validators.Add(result =>
        {
            if (result.GetValueOrDefault<int>() < 1) result.AddError("--most takes a number of one or more");
        });
        command.Add(most);
        command.SetAction(parsed =>
        {
            using var log = BenchLog.OpenExisting(choice.Place(parsed));
            var entries = log.List(search.Query(parsed), parsed.GetValue(most));
            if (entries.IsEmpty)
            {
                terminal.Error.WriteLine("no record matches");
                return ExitCode.Agrees;
            }

            var table = Layout.Table(">record", "filed (UTC)", "serial", "verdict", "board");
            foreach (var e in entries)
            {
                Layout.Row(table,
                    (e.Number.ToString(CultureInfo.InvariantCulture), Style.Plain), (FiledRecords.Time(e), Style.Plain), (e.Serial ?? "", Style.Plain),
                    (e.Verdict, FiledRecords.StyleOf(e.Verdict)), (e.BoardTitle, Style.Plain));
            }

            terminal.Console.Write(table);
            return ExitCode.Agrees;
        });
        return command;
    }
}
