using System.CommandLine;
using System.Globalization;
using System.Text;
using System.Text.Json;
using BenchCheck.Core.Checking;
using BenchCheck.Core.Diagnosis;
using BenchCheck.Files;
using BenchCheck.Records;

namespace BenchCheck.Commands.Log;

/// <summary><c>benchcheck log again N</c>: checks a record's files anew and says whether the answer is still the same.</summary>
internal static class LogAgainCommand
{
    public static Command Create(Terminal terminal)
    {
        var command = new Command("again", "Checks a record's files anew with its settings: exit code 0 when the answer is still the same, 1 when it is not.");
        var number = FiledRecords.Number("RECORD");
        var choice = LogChoice.Of(command);
        command.Add(number);
        command.SetAction((parsed, cancel) =>
        {
            using var log = BenchLog.OpenExisting(choice.Place(parsed));
            if (FiledRecords.Find(log, parsed.GetValue(number), terminal) is not var (record, before)) return Task.FromResult(ExitCode.Unusable);
            if (Rerun(log, record, terminal, cancel) is not { } result) return Task.FromResult(ExitCode.Unusable);
            return Task.FromResult(Compare(terminal, record, before, ResultJson.Line(result)));
        });
        return command;
    }

    private static CheckResult? Rerun(BenchLog log, LogRecord record, Terminal terminal, CancellationToken cancel)
    {
        FiledSettings settings;
        try
        {
            settings = FiledSettings.Parse(record.Settings);
        }
        catch (JsonException)
        {
            terminal.Error.WriteLine("the settings of the record cannot be read");
            return null;
        }

        var folder = Directory.CreateTempSubdirectory("benchcheck");
        try
        {
            if (Put(log, record.BoardFile, folder, "board.toml") is not { } boardPath || Put(log, record.ReadingsFile, folder, "readings.csv") is not { } readingsPath)
            {
                terminal.Error.WriteLine("a file of the record is missing from the log; log check says more");
                return null;
            }

            var board = BoardFile.Read(boardPath);
            if (board.Bench is not { } bench) return Refused("board", board.Problems);
            var readings = ReadingsFile.Read(readingsPath, bench, new ReadingsOptions { SkipBadRows = settings.SkipBadRows });
            if (!readings.IsUsable) return Refused("readings", readings.Problems);
            if (readings.Sets.FirstOrDefault(s => s.Serial == record.Entry.Serial) is not { } set)
            {
                terminal.Error.WriteLine("the readings file of the record holds no board of its serial");
                return null;
            }

            var usual = FaultRates.For(bench.Board.Origin);
            var rates = record.RatesFile is { } hash && log.Input(hash) is { } body ? FaultRates.Parse(Encoding.UTF8.GetString(body), bench.Board.Origin, usual) : usual;
            return new Reconciliation(bench, settings.Settings, rates).Run(set, cancel);
        }
        finally
        {
            folder.Delete(true);
        }

        CheckResult? Refused(string file, IEnumerable<FileProblem> problems)
        {
            terminal.Error.WriteLine($"this program no longer accepts the {file} file of the record:");
            foreach (var problem in problems) terminal.Error.WriteLine(Printable.Text((problem with { File = file }).ToString()));
            return null;
        }
    }

    private static string? Put(BenchLog log, string hash, DirectoryInfo folder, string name)
    {
        if (log.Input(hash) is not { } body) return null;
        var path = Path.Combine(folder.FullName, name);
        File.WriteAllBytes(path, body);
        return path;
    }

    private static int Compare(Terminal terminal, LogRecord record, ResultSummary before, string json)
    {
        if (json == record.Result)
        {
            terminal.Output.WriteLine($"the same answer, to the last digit: {before.Verdict}");
            return ExitCode.Agrees;
        }

        var now = ResultSummary.Parse(json)!;
        var differences = Differences(before, now).ToArray();
        var programs = record.Entry.Program == CheckFiling.Program ? "" : $" (filed by {Printable.Text(record.Entry.Program)}, now {CheckFiling.Program})";
        if (differences.Length == 0)
        {
            terminal.Output.WriteLine($"the same answer, {now.Verdict}; only digits beyond the uncertainties or words differ{programs}");
            return ExitCode.Agrees;
        }

        terminal.Output.WriteLine($"the answer is no longer the same{programs}:");
        foreach (var difference in differences) terminal.Output.WriteLine("  " + Printable.Text(difference));
        return ExitCode.Disagrees;
    }

    private static IEnumerable<string> Differences(ResultSummary before, ResultSummary now)
    {
        if (before.Verdict != now.Verdict) yield return $"verdict: {before.Verdict}, now {now.Verdict}";
        var (suspect, suspectNow) = (before.Suspects.FirstOrDefault(), now.Suspects.FirstOrDefault());
        if (suspect?.Text != suspectNow?.Text) yield return $"first suspect: {suspect?.Text ?? "none"}, now {suspectNow?.Text ?? "none"}";
        else if (suspect is not null && Math.Abs(suspect.Probability - suspectNow!.Probability) > 0.01)
            yield return string.Create(CultureInfo.InvariantCulture, $"its probability: {suspect.Probability:0.00}, now {suspectNow.Probability:0.00}");
        var estimates = now.Parameters.GroupBy(p => p.Name).ToDictionary(g => g.Key, g => g.First());
        foreach (var estimate in before.Parameters)
        {
            if (!estimates.TryGetValue(estimate.Name, out var other)) yield return $"{estimate.Name}: no longer estimated";
            else if (Math.Abs(estimate.Value - other.Value) > 0.01 * estimate.StandardUncertainty) yield return $"{estimate.Name}: {FiledRecords.Text(estimate)}, now {FiledRecords.Text(other)}";
        }
    }
}
