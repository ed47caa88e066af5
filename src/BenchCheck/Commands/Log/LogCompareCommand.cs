using System.CommandLine;
using System.Globalization;
using BenchCheck.Files;
using BenchCheck.Records;
using Spectre.Console;

namespace BenchCheck.Commands.Log;

/// <summary><c>benchcheck log compare A B</c>: two records side by side, before and after a repair.</summary>
internal static class LogCompareCommand
{
    public static Command Create(Terminal terminal)
    {
        var command = new Command("compare", "Shows two records side by side, such as a board before and after its repair.");
        var (first, second) = (FiledRecords.Number("A"), FiledRecords.Number("B"));
        var choice = LogChoice.Of(command);
        command.Add(first);
        command.Add(second);
        command.SetAction(parsed =>
        {
            using var log = BenchLog.OpenExisting(choice.Place(parsed));
            if (FiledRecords.Find(log, parsed.GetValue(first), terminal) is not { } a || FiledRecords.Find(log, parsed.GetValue(second), terminal) is not { } b)
                return ExitCode.Unusable;
            if (a.Record.BoardFile != b.Record.BoardFile) terminal.Error.WriteLine("the two records were checked against different board files");
            Write(terminal.Console, a, b);
            return ExitCode.Agrees;
        });
        return command;
    }

    private static void Write(IAnsiConsole console, (LogRecord Record, ResultSummary Result) a, (LogRecord Record, ResultSummary Result) b)
    {
        var heads = Layout.Table("", "A", "B");
        Pair("record", x => $"{x.Record.Entry.Number}, {FiledRecords.Time(x.Record.Entry)} UTC");
        Pair("board", x => x.Result.Board);
        Pair("serial", x => x.Result.Serial ?? "");
        Layout.Row(heads, ("verdict", Style.Plain), (a.Result.Verdict, FiledRecords.StyleOf(a.Result.Verdict)), (b.Result.Verdict, FiledRecords.StyleOf(b.Result.Verdict)));
        Pair("first suspect", x => x.Result.Suspects is [var s, ..] ? string.Create(CultureInfo.InvariantCulture, $"{100 * s.Probability:0} % {s.Text}") : "");
        console.Write(heads);

        Layout.Heading(console, "Readings");
        var readings = Layout.Table("condition", "at", ">A", ">B", ">B - A", ">En A", ">En B", "verdicts");
        foreach (var (x, y) in Joined(a.Result.Readings, b.Result.Readings, r => (r.Condition, r.Quantity, r.At, r.Against)))
        {
            var any = x ?? y!;
            Layout.Row(readings,
                (any.Condition, Style.Plain), (FiledRecords.Place(any, a.Result.Reference), Style.Plain), (Value(x?.Measured, any.Unit), Style.Plain), (Value(y?.Measured, any.Unit), Style.Plain),
                (Value(y?.Measured - x?.Measured, any.Unit), Style.Plain), (En(x), Style.Plain), (En(y), Style.Plain), ($"{x?.Verdict ?? "-"} / {y?.Verdict ?? "-"}", Style.Plain));
        }

        console.Write(readings);
        Layout.Heading(console, "Estimates");
        var estimates = Layout.Table("parameter", ">A", ">B");
        foreach (var (x, y) in Joined(a.Result.Parameters, b.Result.Parameters, e => e.Name))
            Layout.Row(estimates, ((x ?? y!).Name, Style.Plain), (x is null ? "-" : FiledRecords.Text(x), Style.Plain), (y is null ? "-" : FiledRecords.Text(y), Style.Plain));
        console.Write(estimates);

        void Pair(string label, Func<(LogRecord Record, ResultSummary Result), string> text) => Layout.Row(heads, (label, Style.Plain), (text(a), Style.Plain), (text(b), Style.Plain));
    }

    /// <summary>What stands in either list, in the order of the first and then of the second.</summary>
    private static IEnumerable<(T? A, T? B)> Joined<T, TKey>(IEnumerable<T> a, IEnumerable<T> b, Func<T, TKey> key)
        where T : class
        where TKey : notnull
    {
        var others = b.GroupBy(key).ToDictionary(g => g.Key, g => g.First());
        foreach (var x in a) yield return (x, others.Remove(key(x), out var y) ? y : null);
        foreach (var y in others.Values) yield return (null, y);
    }

    private static string Value(double? value, string unit) => value is { } number ? FiledRecords.Text(number, unit) : "-";

    private static string En(FiledReading? reading) => reading?.En.ToString("+0.0;-0.0;0.0", CultureInfo.InvariantCulture) ?? "-";
}
