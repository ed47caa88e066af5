using System.CommandLine;
using BenchCheck.Records;

namespace BenchCheck.Commands.Log;

/// <summary><c>benchcheck log export</c>: records with their files as JSON lines.</summary>
internal static class LogExportCommand
{
    public static Command Create(Terminal terminal)
    {
        var command = new Command("export", "Writes records and their files as JSON lines; the same records give the same bytes from a file and from PostgreSQL.");
        var choice = LogChoice.Of(command);
        var search = new LogSearch(command);
        var target = new Option<string?>("--out") { Description = "File to write; left out: standard output.", HelpName = "FILE" };
        command.Add(target);
        command.SetAction((parsed, cancel) =>
        {
            using var log = BenchLog.OpenExisting(choice.Place(parsed));
            using var stream = parsed.GetValue(target) is { } path ? new FileStream(path, FileMode.CreateNew, FileAccess.Write) : Console.OpenStandardOutput();
            using var buffered = new BufferedStream(stream, 1 << 16);
            var count = LogExport.Write(log, search.Query(parsed), buffered, cancel);
            buffered.Flush();
            terminal.Error.WriteLine($"{count} records");
            return Task.FromResult(ExitCode.Agrees);
        });
        return command;
    }
}
