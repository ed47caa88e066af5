using System.CommandLine;
using System.Globalization;
using BenchCheck.Records;

namespace BenchCheck.Commands.Log;

/// <summary>The options by which records are sought.</summary>
internal sealed class LogSearch
{
    private readonly Option<string?> board = new("--board") { Description = "Only boards whose title holds this.", HelpName = "TEXT" };
    private readonly Option<string?> serial = new("--serial") { Description = "Only this serial.", HelpName = "SERIAL" };
    private readonly Option<string?> verdict = new("--verdict") { Description = "Only this verdict: agrees, disagrees or undecided.", HelpName = "VERDICT" };
    private readonly Option<string?> from = new("--from") { Description = "Filed on this day or later (UTC).", HelpName = "DATE" };
    private readonly Option<string?> to = new("--to") { Description = "Filed on this day or earlier (UTC).", HelpName = "DATE" };

    public LogSearch(Command command)
    {
        verdict.AcceptOnlyFromAmong("agrees", "disagrees", "undecided");
        foreach (var date in new[] { from, to })
        {
            date.Validators.Add(result =>
            {
                if (Day(result.GetValueOrDefault<string?>()) is null) result.AddError($"{date.Name} takes a date such as 2026-03-01");
            });
        }

        foreach (var option in new Option[] { board, serial, verdict, from, to }) command.Add(option);
    }

    public LogQuery Query(ParseResult parsed) => new()
    {
        Board = parsed.GetValue(board), Serial = parsed.GetValue(serial), Verdict = parsed.GetValue(verdict), From = Day(parsed.GetValue(from)),
        Before = Day(parsed.GetValue(to))?.AddDays(1),
    };

    private static DateTimeOffset? Day(string? text) =>
        DateTimeOffset.TryParseExact(text, "yyyy-MM-dd", CultureInfo.InvariantCulture, DateTimeStyles.AssumeUniversal, out var day) && day.Year < 9999 ? day : null;
}
