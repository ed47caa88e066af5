using System.Diagnostics;
using System.Globalization;
using Xunit;

namespace BenchCheck.Tests.Screens;

/// <summary>The program in a real pseudo-terminal, by tmux: keys go in, the screen comes out.</summary>
internal sealed class TerminalSession : IDisposable
{
    private static readonly TimeSpan Patience = TimeSpan.FromSeconds(30);
    private readonly string socket = "benchcheck-" + Guid.NewGuid().ToString("N")[..12];

    /// <param name="command">a shell command; the program is in $BENCHCHECK</param>
    public TerminalSession(WorkFolder folder, string command, int width = 80, int height = 24)
    {
        var program = Path.Combine(AppContext.BaseDirectory, "benchcheck.dll");
        Tmux("-f", "/dev/null", "new-session", "-d", "-x", width.ToString(CultureInfo.InvariantCulture), "-y", height.ToString(CultureInfo.InvariantCulture),
            "-c", folder.Path, "-e", $"XDG_DATA_HOME={folder.In("xdg")}", "-e", $"BENCHCHECK=dotnet {program}", "-e", "PS1=READY> ", "sh", "-c", command);
    }

    public int ProcessId => int.Parse(Tmux("display-message", "-p", "#{pane_pid}"), CultureInfo.InvariantCulture);

    public string Screen => Tmux("capture-pane", "-p");

    /// <summary>"1" while the terminal's alternate screen is in use.</summary>
    public string AlternateScreen => Tmux("display-message", "-p", "#{alternate_on}").Trim();

    /// <summary>"1" while the program asked for mouse events.</summary>
    public string MouseReports => Tmux("display-message", "-p", "#{mouse_any_flag}").Trim();

    public void Press(params string[] keys) => Tmux(["send-keys", .. keys]);

    public void Type(string text) => Tmux("send-keys", "-l", text);

    public string Await(string text) => Await(s => s.Contains(text, StringComparison.Ordinal), text);

    public string Await(Func<string, bool> condition, string what)
    {
        var clock = Stopwatch.StartNew();
        while (true)
        {
            var screen = Screen;
            if (condition(screen)) return screen;
            Assert.True(clock.Elapsed < Patience, $"waited in vain for \"{what}\"; the terminal shows\n{screen}");
            Thread.Sleep(20);
        }
    }

    public void Dispose()
    {
        try
        {
            Tmux("kill-server");
        }
        catch (InvalidOperationException)
        {
            // The server ended with its last program.
        }
    }

    private string Tmux(params string[] arguments)
    {
        var start = new ProcessStartInfo("tmux", ["-L", socket, "-u", .. arguments]) { RedirectStandardOutput = true, RedirectStandardError = true };
        start.Environment.Remove("TMUX");
        start.Environment.Remove("NO_COLOR");
        using var process = Process.Start(start) ?? throw new InvalidOperationException("tmux did not start");
        var output = process.StandardOutput.ReadToEnd();
        var error = process.StandardError.ReadToEnd();
        process.WaitForExit();
        return process.ExitCode == 0 ? output : throw new InvalidOperationException($"tmux {string.Join(' ', arguments)}: {error}");
    }
}
