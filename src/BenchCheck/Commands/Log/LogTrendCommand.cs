using System.CommandLine;
using System.Globalization;
using BenchCheck.Files;
using BenchCheck.Plots;
using BenchCheck.Records;
using Spectre.Console;

namespace BenchCheck.Commands.Log;

/// <summary><c>benchcheck log trend PARAMETER</c>: one parameter over the records.</summary>
internal static class LogTrendCommand
{
    private const string Time = "time";
    private const string Serial = "serial";

    public static Command Create(Terminal terminal)
    {
        var command = new Command("trend", """
            Follows one parameter over the records, with the limits of the parts list.

            Examples:
              benchcheck log trend "Q1 gain" --board "Circulation-fan stage" --verdict agrees
              benchcheck log trend "Q1 gain" --plot gain.png --by serial
            """);
        var parameter = new Argument<string>("PARAMETER") { Description = "Part and parameter as estimates name them, such as \"Q1 gain\"; a part alone for all of its parameters." };
        var choice = LogChoice.Of(command);
        var search = new LogSearch(command);
        var plot = new Option<string?>("--plot") { Description = "Also draw it: .png or .svg; each further parameter or board gets its number before the ending.", HelpName = "FILE" };
        var by = new Option<string>("--by") { Description = "What the picture runs along: time or serial.", DefaultValueFactory = _ => Time, HelpName = "WHAT" };
        by.AcceptOnlyFromAmong(Time, Serial);
        command.Add(parameter);
        command.Add(plot);
        command.Add(by);
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

            var number = 0;
            foreach (var group in points.GroupBy(p => (p.Entry.BoardTitle, p.Estimate.Name)))
            {
                Write(terminal.Console, group.Key.BoardTitle, group.Key.Name, [.. group]);
                if (parsed.GetValue(plot) is not { } path) continue;
                var trend = TrendOf(group.Key.BoardTitle, group.Key.Name, [.. group]);
                var figure = parsed.GetValue(by) == Serial ? TrendPlot.InOrder(trend) : TrendPlot.InTime(trend);
                if (figure.Save(NumberedPath.Of(path, number++)) is not { } fault) continue;
                terminal.Error.WriteLine(Printable.Text(fault.ToString()));
                return ExitCode.Unusable;
            }

            return ExitCode.Agrees;
        });
        return command;
    }

    /// <summary>The limits are those of the newest record: a parts list may have been changed since the first.</summary>
    private static Trend TrendOf(string board, string name, (LogEntry Entry, FiledEstimate Estimate)[] points)
    {
        var newest = points[^1].Estimate;
        return new Trend(
            board, name, FiledRecords.UnitOf(newest.Unit),
            [
                .. points.Select(p => new TrendPoint(
                    p.Entry.Serial ?? string.Create(CultureInfo.InvariantCulture, $"record {p.Entry.Number}"), FiledRecords.Instant(p.Entry), p.Estimate.Value, p.Estimate.Low, p.Estimate.High)),
            ], new Limits(newest.NominalLow, newest.Nominal, newest.NominalHigh));
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
