using System.CommandLine;
using BenchCheck.Records;

namespace BenchCheck.Commands.Log;

/// <summary><c>benchcheck log check</c>: whether every record is as it was filed.</summary>
internal static class LogCheckCommand
{
    public static Command Create(Terminal terminal)
    {
        var command = new Command("check", """
            Recomputes the hash of every record and file: exit code 0 when the log is whole, 1 when it is not.

            Note the newest hash elsewhere; --known HASH shows later that no newer record was cut off.
            """);
        var choice = LogChoice.Of(command);
        var known = new Option<string?>("--known") { Description = "A hash noted before, which has to be among the records.", HelpName = "HASH" };
        command.Add(known);
        command.SetAction(parsed =>
        {
            var place = choice.Place(parsed);
            using var log = BenchLog.OpenExisting(place);
            var report = ChainReport.Of(log, parsed.GetValue(known));
            foreach (var fault in report.Faults) terminal.Output.WriteLine(Printable.Text(fault));
            if (!report.HoldsKnown) terminal.Output.WriteLine("the hash noted before is not among the records: records were cut off, or it belongs to another log");
            if (report.IsWhole) terminal.Output.WriteLine($"whole: {report.Count} records");
            terminal.Output.WriteLine($"newest hash: {report.Newest}");
            return report.IsWhole ? ExitCode.Agrees : ExitCode.Disagrees;
        });
        return command;
    }
}
