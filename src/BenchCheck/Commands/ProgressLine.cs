using System.Diagnostics;
using System.Globalization;

namespace BenchCheck.Commands;

/// <summary>One line on a terminal that says how far a long piece of work has come and how long it will take; nothing where there is no terminal.</summary>
/// <param name="things">what is counted: "boards"</param>
internal sealed class ProgressLine(TextWriter target, bool isShown, int total, string things)
{
    private static readonly TimeSpan Quiet = TimeSpan.FromSeconds(1);
    private static readonly TimeSpan Between = TimeSpan.FromSeconds(0.2);

    /// <summary>A line on the error stream where that is a terminal.</summary>
    public static ProgressLine On(Terminal terminal, int total, string things) =>
        new(terminal.Error, ReferenceEquals(terminal.Error, Console.Error) && !Console.IsErrorRedirected, total, things);

    private readonly Stopwatch clock = Stopwatch.StartNew();
    private TimeSpan shown = Quiet - Between;
    private int here;

    /// <param name="done">how many are finished, those of an earlier run included</param>
    public void Report(int done)
    {
        here++;
        if (!isShown || clock.Elapsed < shown + Between) return;
        shown = clock.Elapsed;
        var left = clock.Elapsed / here * Math.Max(0, total - done);
        target.Write(string.Create(CultureInfo.InvariantCulture, $"\r{done} of {total} {things}, {left:h\\:mm\\:ss} left "));
    }

    public void Clear()
    {
        if (isShown && clock.Elapsed > Quiet) target.Write("\r" + new string(' ', 60) + "\r");
    }
}
