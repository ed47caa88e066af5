using System.Diagnostics;
using System.Globalization;
using System.Text.RegularExpressions;
using BenchCheck.Screens;
using Xunit;

namespace BenchCheck.Tests.Screens;

/// <summary>The program in a real terminal, from the shell to the shell.</summary>
[Collection("terminal")]
public sealed partial class TerminalTests : IDisposable
{
    private readonly WorkFolder folder = new();

    public void Dispose() => folder.Dispose();

    [Fact]
    public void A_sample_is_opened_a_reading_typed_the_verdict_changes_and_the_terminal_comes_back()
    {
        using var terminal = Shell();
        Begin(terminal, "open fan-stage.toml");
        terminal.Await("AGREES");
        terminal.Press("Down", "Down");
        terminal.Type("11.2");
        terminal.Press("Enter");
        terminal.Await("DISAGREES !");
        terminal.Press("F4");
        terminal.Await("measured against its band");
        terminal.Press("C-e");
        terminal.Await("Export the check");
        terminal.Press("Enter");
        terminal.Await("Written to");
        Assert.Equal([0x89, .. "PNG"u8], File.ReadAllBytes(folder.In("fan-stage-check.png"))[..4]);
        terminal.Press("F2", "C-s");
        terminal.Await("Saved to");
        Assert.Contains("11.2", File.ReadAllText(folder.In("fan-stage.csv")), StringComparison.Ordinal);
        terminal.Press("C-q");
        AssertRestored(terminal, 0);
    }

    [Theory]
    [InlineData("TERM", 143)]
    [InlineData("HUP", 129)]
    [InlineData("INT", 130)]
    public void A_signal_ends_the_screen_in_order_and_entries_are_kept(string signal, int exit)
    {
        using var terminal = Shell();
        Begin(terminal, "open fan-stage.toml");
        terminal.Await("AGREES");
        terminal.Type("11.5");
        terminal.Press("Enter");
        terminal.Await("VCC = 11.50 V");
        using (var kill = Process.Start("sh", ["-c", $"kill -{signal} $(cat '{folder.In("pid")}')"])) kill.WaitForExit();
        AssertRestored(terminal, exit);
        using var left = Workbench.Open(folder.In("fan-stage.toml"), null, false, TimeProvider.System).Workbench!;
        Assert.Equal(11.5, left.Left!.Readings!.Sets[0].Readings[0].Value);
    }

    [Fact]
    public void After_a_fault_that_nobody_catches_the_terminal_comes_back_and_entries_are_kept()
    {
        using var terminal = new TerminalSession(folder, "exec sh", 160);
        terminal.Type($"export DOTNET_STARTUP_HOOKS='{typeof(TerminalTests).Assembly.Location}' BENCHCHECK_CRASH_WHEN='{folder.In("crash")}'");
        terminal.Press("Enter");
        Begin(terminal, "open fan-stage.toml");
        terminal.Await("AGREES");
        terminal.Type("11.5");
        terminal.Press("Enter");
        terminal.Await("VCC = 11.50 V");
        File.WriteAllText(folder.In("crash"), "");
        AssertRestored(terminal, 3);
        Assert.Contains("thrown on purpose", terminal.Screen);
        using var left = Workbench.Open(folder.In("fan-stage.toml"), null, false, TimeProvider.System).Workbench!;
        Assert.Equal(11.5, left.Left!.Readings!.Sets[0].Readings[0].Value);
    }

    [Fact]
    public void Suspended_the_shell_has_the_terminal_and_fg_draws_the_screen_anew()
    {
        using var terminal = new TerminalSession(folder, "exec bash --norc");
        terminal.Type("$BENCHCHECK open fan-stage.toml");
        terminal.Press("Enter");
        terminal.Await("I have read this");
        terminal.Press("Enter");
        terminal.Await("AGREES");
        terminal.Press("C-z");
        terminal.Await("Stopped");
        Assert.Equal("0", terminal.AlternateScreen);
        Assert.Equal("0", terminal.MouseReports);
        terminal.Type("echo back again");
        terminal.Press("Enter");
        terminal.Await(s => s.Split("back again").Length == 3, "an echoing shell");
        terminal.Type("fg");
        terminal.Press("Enter");
        terminal.Await("AGREES");
        terminal.Type("11.5");
        terminal.Press("Enter");
        terminal.Await("VCC = 11.50 V");
    }

    [Fact]
    public void Closing_the_terminal_ends_the_program()
    {
        using var terminal = new TerminalSession(folder, "exec $BENCHCHECK open fan-stage.toml");
        terminal.Await("I have read this");
        using var process = Process.GetProcessById(terminal.ProcessId);
        terminal.Dispose();
        Assert.True(process.WaitForExit(TimeSpan.FromSeconds(20)), "the program runs on without a terminal");
    }

    [Theory]
    [InlineData("TERM=dumb $BENCHCHECK open fan-stage.toml", "cannot be drawn on a terminal of kind")]
    [InlineData("echo | $BENCHCHECK open fan-stage.toml", "needs a terminal for input and output")]
    public void A_terminal_that_cannot_show_the_screen_is_told_so_in_a_sentence(string command, string sentence)
    {
        using var terminal = new TerminalSession(folder, $"{command}; echo EXIT=$?; exec sleep 100", 120);
        Assert.Contains(sentence, terminal.Await("EXIT=2"));
    }

    [Fact]
    public void Killed_at_any_moment_nothing_that_was_shown_is_lost()
    {
        var rounds = int.Parse(Environment.GetEnvironmentVariable("BENCHCHECK_KILL_ROUNDS") ?? "12", CultureInfo.InvariantCulture);
        var random = new Random(rounds);
        var kept = 0;
        for (var round = 0; round < rounds; round++)
        {
            using var terminal = new TerminalSession(folder, "exec $BENCHCHECK open fan-stage.toml");
            var first = terminal.Await(s => s.Contains("I have read this") || s.Contains("left unsaved") || s.Contains("VCC, powered"), "the screen");
            if (first.Contains("I have read this")) terminal.Press("Enter");
            terminal.Await(s => s.Contains("left unsaved") || s.Contains("VCC, powered"), "the board");
            if (kept > 0)
            {
                terminal.Await("left unsaved");
                terminal.Press("1");
                terminal.Await("Taken back");
            }

            for (var i = random.Next(1, 4); i > 0; i--)
            {
                terminal.Type((10 + (++kept / 100.0)).ToString(CultureInfo.InvariantCulture));
                terminal.Press("Enter", "Up");
            }

            var pid = terminal.ProcessId;
            if (round == 0) terminal.Await("VCC = ");
            Thread.Sleep(random.Next(0, 60));
            var shown = terminal.Screen;
            using (var process = Process.GetProcessById(pid))
            {
                process.Kill();
                process.WaitForExit();
            }

            var entered = Shown().Match(shown) is { Success: true } m ? double.Parse(m.Groups[1].Value, CultureInfo.InvariantCulture) : 0;
            using var left = Workbench.Open(folder.In("fan-stage.toml"), null, false, TimeProvider.System).Workbench!;
            Assert.True(left.IsOurs, "the lock of a killed program must not hold");
            var onDisk = left.Left?.Readings?.Sets[0].Readings[0].Value ?? throw new InvalidOperationException($"round {round}: nothing kept; the screen showed\n{shown}");
            Assert.True(onDisk >= entered - 1e-9, $"round {round}: the screen showed {entered} V, the journal holds {onDisk} V");
            kept = (int)Math.Round((onDisk - 10) * 100);
        }
    }

    private static void AssertRestored(TerminalSession terminal, int exit)
    {
        var screen = terminal.Await($"EXIT={exit}");
        Assert.Equal("0", terminal.AlternateScreen);
        Assert.Equal("0", terminal.MouseReports);
        Assert.Contains("before the screen", screen);
        terminal.Type("echo back again");
        terminal.Press("Enter");
        terminal.Await(s => s.Split("back again").Length == 3, "an echoing shell");
    }

    private static void Begin(TerminalSession terminal, string arguments)
    {
        terminal.Type($"echo before the screen; sh -c 'echo $$ > pid; exec $BENCHCHECK {arguments}'; echo EXIT=$?");
        terminal.Press("Enter");
        terminal.Await("I have read this");
        terminal.Press("Enter");
    }

    private TerminalSession Shell() => new(folder, "exec sh");

    [GeneratedRegex(@"VCC = (\d+\.\d+) V")]
    private static partial Regex Shown();
}
