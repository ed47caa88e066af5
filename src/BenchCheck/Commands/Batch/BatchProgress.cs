using System.Diagnostics;
using System.Globalization;

namespace BenchCheck.Commands.Batch;

/// <summary>One line on a terminal that says how far a batch has come and how long it will take; nothing where there is no terminal.</summary>
internal sealed class BatchProgress(TextWriter target, bool isShown, int total)
{
    private static readonly TimeSpan Quiet = TimeSpan.FromSeconds(1);
    private static readonly TimeSpan Between = TimeSpan.FromSeconds(0.2);

    private readonly Stopwatch clock = Stopwatch.StartNew();
    private TimeSpan shown = Quiet - Between;
    private int here;

    /// <param name="done">boards finished, those of an earlier run included</param>
    public void Report(int done)
    {
        here++;
        if (!isShown || clock.Elapsed < shown + Between) return;
        shown = clock.Elapsed;
        var left = clock.Elapsed / here * Math.Max(0, total - done);
        target.Write(string.Create(CultureInfo.InvariantCulture, $"\r{done} of {total} boards, {left:h\\:mm\\:ss} left "));
    }

    public void Clear()
    {
        if (isShown && clock.Elapsed > Quiet) target.Write("\r" + new string(' ', 60) + "\r");
    }
}
