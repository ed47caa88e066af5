using System.CommandLine;
using System.Globalization;
using BenchCheck.Files;
using BenchCheck.Records;
using Spectre.Console;

namespace BenchCheck.Commands.Log;

/// <summary><c>benchcheck log trend PARAMETER</c>: one parameter over the records.</summary>
internal static class LogTrendCommand
{
    public static Command Create(Terminal terminal)
    {
        var command = new Command("trend", """
            Follows one parameter over the records, with the limits of the parts list.

            Example:
              benchcheck log trend "Q1 gain" --board "Circulation-fan stage" --verdict agrees
            """);
        var parameter = new Argument<string>("PARAMETER") { Description = "Part and parameter as estimates name them, such as \"Q1 gain\"; a part alone for all of its parameters." };
        var choice = LogChoice.Of(command);
        var search = new LogSearch(command);
        command.Add(parameter);
        command.SetAction(parsed =>
        {
            using var log = BenchLog.OpenExisting(choice.Place(parsed));
            var wanted = parsed.GetRequiredValue(parameter);
            var points = log.Records(search.Query(parsed))
                .SelectMany(r => (ResultSummary.Parse(r.Result)?.Parameters ?? []).Where(p => p.Part == wanted || p.Name == wanted).Select(p => (r.Entry, Estimate: p))).ToArray();
            if (points.Length == 0)
            {
                terminal.Error.WriteLine($"no record estimates \"{Printable.Text(wanted)}\"; log show N lists what a record estimates");
                return ExitCode.Unusable;
            }

            foreach (var group in points.GroupBy(p => (p.Entry.BoardTitle, p.Estimate.Name))) Write(terminal.Console, group.Key.BoardTitle, group.Key.Name, [.. group]);
            return ExitCode.Agrees;
        });
        return command;
    }

    private static void Write(IAnsiConsole console, string board, string name, (LogEntry Entry, FiledEstimate Estimate)[] points)
    {
        Layout.Heading(console, $"{name}, {board}");
        var table = Layout.Table(">record", "filed (UTC)", "serial", ">estimate", ">parts list", "");
        foreach (var (entry, estimate) in points)
        {
            Layout.Row(table,
                (entry.Number.ToString(CultureInfo.InvariantCulture), Style.Plain), (FiledRecords.Time(entry), Style.Plain), (entry.Serial ?? "", Style.Plain),
                (FiledRecords.Text(estimate), Style.Plain), (FiledRecords.Limits(estimate), Style.Plain),
                (estimate.Value < estimate.NominalLow ? "below" : estimate.Value > estimate.NominalHigh ? "above" : "", FiledRecords.StyleOf("out")));
        }

        console.Write(table);
    }
}
