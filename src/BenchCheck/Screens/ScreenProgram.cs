using System.Runtime.InteropServices;
using BenchCheck.Commands;
using Terminal.Gui.App;
using Terminal.Gui.Input;

namespace BenchCheck.Screens;

/// <summary>Runs the bench screen in the terminal and gives the terminal back as it was, however the run ends.</summary>
internal static class ScreenProgram
{
    private const int SmallestWidth = 60;
    private const int SmallestHeight = 16;
    private static readonly TimeSpan LongestGoodbye = TimeSpan.FromSeconds(2);

    /// <summary>Why the screen cannot be shown here; null when it can.</summary>
    public static string? Obstacle()
    {
        if (Console.IsInputRedirected || Console.IsOutputRedirected)
            return "The bench screen needs a terminal for input and output. Use benchcheck check, predict or next here.";
        if (Environment.GetEnvironmentVariable("TERM") is "dumb")
            return "The bench screen cannot be drawn on a terminal of kind \"dumb\". Use benchcheck check, predict or next here.";
        return Console.WindowWidth < SmallestWidth || Console.WindowHeight < SmallestHeight
            ? $"The bench screen needs at least {SmallestWidth} columns and {SmallestHeight} rows; this terminal has {Console.WindowWidth} by {Console.WindowHeight}."
            : null;
    }

    /// <param name="board">path of a board file; null for the choice of one</param>
    /// <param name="readings">path of a readings file; null for the one beside the board</param>
    /// <returns>an exit code</returns>
    public static int Run(string? board, string? readings, TextWriter error)
    {
        if (Obstacle() is { } obstacle)
        {
            error.WriteLine(obstacle);
            return ExitCode.Unusable;
        }

        var stopped = 0;
        using var app = Application.Create();
        void Stop(PosixSignalContext context)
        {
            context.Cancel = true;
            stopped = 128 + (context.Signal switch { PosixSignal.SIGHUP => 1, PosixSignal.SIGINT => 2, _ => 15 });
            app.Invoke(() => app.RequestStop());

            // With its terminal gone the library may never come to the request; every entry is on disk, so ending at once loses nothing.
            _ = Task.Delay(LongestGoodbye).ContinueWith(_ => Environment.Exit(stopped), TaskScheduler.Default);
        }

        using var terminate = PosixSignalRegistration.Create(PosixSignal.SIGTERM, Stop);
        using var hangUp = PosixSignalRegistration.Create(PosixSignal.SIGHUP, Stop);
        using var interrupt = PosixSignalRegistration.Create(PosixSignal.SIGINT, Stop);
        app.Init();
        FreeKeys(app);
        app.Driver!.Force16Colors = true;
        using var screen = new BenchScreen(UserFolder.Usual(), TimeProvider.System, Palette.ForEnvironment());
        screen.Initialized += (_, _) => screen.Begin(board, readings);
        app.Run(screen);
        return stopped;
    }

    /// <summary>Takes from the library the keys that mean something here: leaving, suspending, redrawing.</summary>
    public static void FreeKeys(IApplication app)
    {
        foreach (var key in (Key[])[Key.Esc, Key.Z.WithCtrl, Key.F5, Key.F6, Key.F6.WithShift, Key.Q.WithCtrl]) app.Keyboard.KeyBindings.Remove(key);
    }
}
