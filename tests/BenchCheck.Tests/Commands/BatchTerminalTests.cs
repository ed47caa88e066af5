using BenchCheck.Tests.Screens;
using Xunit;

namespace BenchCheck.Tests.Commands;

/// <summary>A batch on a real terminal: what it says while it runs, and what Ctrl-C leaves.</summary>
public sealed class BatchTerminalTests
{
    [Fact]
    public void A_stopped_batch_has_told_how_long_it_takes_and_leaves_whole_results()
    {
        Assert.SkipWhen(OperatingSystem.IsWindows(), "tmux runs on Unix");
        using var folder = new WorkFolder();
        File.WriteAllText(folder.In("board.toml"), WorkshopFiles.Board);
        const int Boards = 400;
        File.WriteAllLines(folder.In("shelf.csv"), Enumerable.Range(0, Boards).Select(i => $"S{i:000},11.94,{2139 + i % 7}e-3,5.306,1.484,4.131").Prepend("serial,VCC,B1,C1,E1,OUT"));
        using var terminal = new TerminalSession(folder, "trap : INT; $BENCHCHECK batch board.toml shelf.csv --out part.csv; echo EXIT $?; sleep 60", 100, 40);
        Assert.Matches(@"\d+ of 400 boards, 0:\d\d:\d\d left", terminal.Await(" left"));
        terminal.Press("C-c");
        var screen = terminal.Await("EXIT");
        Assert.Contains("EXIT 130", screen, StringComparison.Ordinal);
        Assert.Contains("their results are complete, and --resume goes on from there", screen, StringComparison.Ordinal);
        var rows = File.ReadAllLines(folder.In("part.csv")).Length - 1;
        Assert.InRange(rows, 1, Boards - 1);
        Assert.Contains($"Stopped after {rows} of 400 boards", screen, StringComparison.Ordinal);
        Assert.EndsWith("\n", File.ReadAllText(folder.In("part.csv")), StringComparison.Ordinal);
    }
}
