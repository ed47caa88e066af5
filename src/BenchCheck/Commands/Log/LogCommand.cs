using System.CommandLine;

namespace BenchCheck.Commands.Log;

/// <summary><c>benchcheck log …</c>: looks back on the checks on record.</summary>
internal static class LogCommand
{
    public static Command Create(Terminal terminal) => new("log", """
        Looks back on the checks that were filed with check --log.

        Examples:
          benchcheck log list --serial 0042
          benchcheck log compare 17 23
          benchcheck log trend "Q1 gain"
          benchcheck log check
        """)
    {
        LogListCommand.Create(terminal), LogShowCommand.Create(terminal), LogAgainCommand.Create(terminal), LogCompareCommand.Create(terminal),
        LogTrendCommand.Create(terminal), LogExportCommand.Create(terminal), LogCheckCommand.Create(terminal),
        LogDefaultCommand.Create(terminal),
    };
}
