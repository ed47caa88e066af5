using System.CommandLine;
using System.Globalization;
using BenchCheck.Files;
using BenchCheck.Records;
using Spectre.Console;

namespace BenchCheck.Commands.Log;

/// <summary><c>benchcheck log show N</c>: one record as it was filed.</summary>
internal static class LogShowCommand
{
    private const string Result = "result";
    private const string Settings = "settings";
    private const string Board = "board";
    private const string Readings = "readings";
    private const string Rates = "rates";
    private const string Plot = "plot";

    public static Command Create(Terminal terminal)
    {
        var command = new Command("show", """
            Shows a record as it was filed.

            Examples:
              benchcheck log show 17
              benchcheck log show 17 --raw readings > readings.csv
              benchcheck log show 17 --raw plot > plot.svg
            """);
        var number = FiledRecords.Number("RECORD");
        var choice = LogChoice.Of(command);
        var raw = new Option<string?>("--raw") { Description = "Only one part of it, byte for byte: result (JSON), settings (JSON), plot (SVG), board, readings or rates.", HelpName = "PART" };
        raw.AcceptOnlyFromAmong(Result, Settings, Board, Readings, Rates, Plot);
        command.Add(number);
        command.Add(raw);
        command.SetAction(parsed =>
        {
            using var log = BenchLog.OpenExisting(choice.Place(parsed));
            if (parsed.GetValue(raw) is { } part) return WriteRaw(terminal, log, parsed.GetValue(number), part);
            if (FiledRecords.Find(log, parsed.GetValue(number), terminal) is not var (record, result)) return ExitCode.Unusable;
            Write(terminal.Console, record, result);
            return ExitCode.Agrees;
        });
        return command;
    }

    private static int WriteRaw(Terminal terminal, BenchLog log, long number, string part)
    {
        if (log.Find(number) is not { } record)
        {
            terminal.Error.WriteLine($"there is no record {number}; log list shows what there is");
            return ExitCode.Unusable;
        }

        if (part is Result or Settings)
        {
            terminal.Output.WriteLine(part == Result ? record.Result : record.Settings);
            return ExitCode.Agrees;
        }

        if ((part switch { Board => record.BoardFile, Readings => record.ReadingsFile, Plot => record.Plot, _ => record.RatesFile }) is not { } hash || log.Input(hash) is not { } bytes)
        {
            terminal.Error.WriteLine($"record {number} has no {part}");
            return ExitCode.Unusable;
        }

        terminal.Output.Flush();
        using var output = Console.OpenStandardOutput();
        output.Write(bytes);
        return ExitCode.Agrees;
    }

    private static IEnumerable<string> Parts(LogRecord record) =>
        [Result, Settings, Board, Readings, .. record.RatesFile is null ? Array.Empty<string>() : [Rates], .. record.Plot is null ? Array.Empty<string>() : [Plot]];

    private static void Write(IAnsiConsole console, LogRecord record, ResultSummary result)
    {
        var entry = record.Entry;
        Layout.Paragraph(console, result.Board + (result.Serial is null ? "" : $", serial {result.Serial}"), new Style(decoration: Decoration.Bold));
        Layout.Paragraph(console, $"{result.Verdict.ToUpperInvariant()}: {result.Reason}", FiledRecords.StyleOf(result.Verdict));
        Layout.Paragraph(console, string.Create(CultureInfo.InvariantCulture, $"Record {entry.Number}, filed {FiledRecords.Time(entry)} UTC by {entry.Program}."));
        Layout.Heading(console, "Readings");
        var readings = Layout.Table("condition", "at", ">measured", ">predicted", ">En", "verdict", ">after fit");
        foreach (var r in result.Readings)
        {
            Layout.Row(readings,
                (r.Condition, Style.Plain), (FiledRecords.Place(r, result.Reference), Style.Plain), (FiledRecords.Text(r.Measured, r.Unit), Style.Plain),
                (FiledRecords.Text(r.Predicted, r.Unit), Style.Plain), (r.En.ToString("+0.0;-0.0;0.0", CultureInfo.InvariantCulture), Style.Plain),
                (r.Verdict, FiledRecords.StyleOf(r.Verdict)), (FiledRecords.Text(r.Fitted, r.Unit), Style.Plain));
        }

        console.Write(readings);
        Layout.Heading(console, "Estimates");
        var estimates = Layout.Table("parameter", ">parts list", ">estimate", "determined");
        foreach (var e in result.Parameters)
            Layout.Row(estimates, (e.Name, Style.Plain), (FiledRecords.Limits(e), Style.Plain), (FiledRecords.Text(e), Style.Plain), (e.Determined, Style.Plain));
        console.Write(estimates);
        if (!result.Suspects.IsEmpty)
        {
            Layout.Heading(console, "Suspects");
            foreach (var s in result.Suspects.Take(6)) Layout.Entry(console, $"{100 * s.Probability:0} %", s.Text);
        }

        Layout.Heading(console, "On record");
        Layout.Entry(console, "files", string.Create(CultureInfo.InvariantCulture, $"log show {entry.Number} --raw {string.Join('|', Parts(record))}"));
        Layout.Entry(console, "settings", record.Settings);
        Layout.Entry(console, "hash", entry.Hash);
    }
}
