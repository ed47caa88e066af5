using System.CommandLine;
using System.Diagnostics;
using System.Globalization;
using System.Text;
using BenchCheck.Core.Checking;
using BenchCheck.Core.Diagnosis;
using BenchCheck.Files;
using BenchCheck.Records;

namespace BenchCheck.Benchmarks.Batches;

/// <summary><c>-- log</c>: records a second filed in batches, in a file and, where one is named, in a PostgreSQL database.</summary>
internal static class LogSpeed
{
    private const int Count = 20_000;

    public static Command Create()
    {
        var command = new Command("log", "Records a second filed in the bench log.");
        var connection = new Option<string?>("--connection") { Description = "A PostgreSQL database beside the file.", HelpName = "CONNECTION" };
        command.Add(connection);
        command.SetAction(parsed =>
        {
            var shelf = new Shelf();
            var result = new Reconciliation(shelf.Bench, CheckSettings.Default).Run(shelf.Boards(10, 7).Last());
            var filing = new Filing(
                DateTimeOffset.UnixEpoch, "benchmark", result.BoardTitle, result.Serial, "disagrees", "{}", ResultJson.Line(result), Encoding.UTF8.GetBytes(Shelf.BoardText),
                "at,value\nC1,5 V\n"u8.ToArray());
            Console.WriteLine($"a record is {filing.Result.Length} characters");
            Console.WriteLine($"{"log",12} {"at a time",10} {"records/s",10}");
            var folder = Directory.CreateTempSubdirectory();
            foreach (var size in new[] { 1, 100, 1000 }) Measure("SQLite", Path.Combine(folder.FullName, $"{size}.db"), filing, size);
            folder.Delete(true);
            if (parsed.GetValue(connection) is not { } named) return;
            foreach (var size in new[] { 1, 100, 1000 }) Measure("PostgreSQL", named, filing, size);
        });
        return command;
    }

    private static void Measure(string name, string place, Filing filing, int size)
    {
        using var log = BenchLog.Open(LogPlace.Parse(place));
        var count = size == 1 ? Count / 20 : Count;
        var clock = Stopwatch.StartNew();
        foreach (var part in Enumerable.Repeat(filing, count).Chunk(size)) log.Append(part);
        Console.WriteLine(string.Create(CultureInfo.InvariantCulture, $"{name,12} {size,10} {count / clock.Elapsed.TotalSeconds,10:0}"));
    }
}
