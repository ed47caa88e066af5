using System.Runtime.InteropServices;
using BenchCheck.Commands;
using BenchCheck.Commands.Log;
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
        Exception? fault = null;
        var app = Application.Create();
        using var ended = new ManualResetEventSlim();
        void Stop(PosixSignalContext context)
        {
            context.Cancel = true;
            stopped = 128 + (context.Signal switch { PosixSignal.SIGHUP => 1, PosixSignal.SIGINT => 2, _ => 15 });
            app.Invoke(() => app.RequestStop());

            // With its terminal gone the library may never come to the request; every entry is on disk, so ending at once loses nothing.
            _ = Task.Delay(LongestGoodbye).ContinueWith(_ => Environment.Exit(stopped), TaskScheduler.Default);
        }

        // A fault on another thread: the screen's own thread, which alone can give the terminal back in order, gets a moment to do so.
        void EndAfterFault(object _, UnhandledExceptionEventArgs unhandled)
        {
            fault = unhandled.ExceptionObject as Exception;
            app.Invoke(() => app.RequestStop());
            if (!ended.Wait(LongestGoodbye)) app.Dispose();
            if (fault is not null) SayFault(fault, error);
            Environment.Exit(ExitCode.Fault);
        }

        AppDomain.CurrentDomain.UnhandledException += EndAfterFault;
        using var terminate = PosixSignalRegistration.Create(PosixSignal.SIGTERM, Stop);
        using var hangUp = PosixSignalRegistration.Create(PosixSignal.SIGHUP, Stop);
        using var interrupt = PosixSignalRegistration.Create(PosixSignal.SIGINT, Stop);
        try
        {
            app.Init();
            FreeKeys(app);
            app.Driver!.Force16Colors = true;
            using var screen = new BenchScreen(UserFolder.Usual(), new BoardRecords(LogChoice.Usual), TimeProvider.System, Palette.ForEnvironment());
            using var resumed = OperatingSystem.IsWindows() ? null : PosixSignalRegistration.Create(PosixSignal.SIGCONT, _ => app.Invoke(screen.DrawAnew));
            screen.Initialized += (_, _) => screen.Begin(board, readings);
            app.Run(screen);
        }
        finally
        {
            app.Dispose();
            ended.Set();
        }

        // The thread of the fault says what it was and ends the program.
        if (fault is not null) Thread.Sleep(LongestGoodbye);
        AppDomain.CurrentDomain.UnhandledException -= EndAfterFault;
        return stopped;
    }

    private static void SayFault(Exception fault, TextWriter error) => error.WriteLine(
        $"A fault of the program, not of your files: {fault.GetType().Name}: {Printable.Text(fault.Message)}. Entries are kept and offered at the next start.");

    /// <summary>Takes from the library the keys that mean something here: leaving, suspending, redrawing.</summary>
    public static void FreeKeys(IApplication app)
    {
        foreach (var key in (Key[])[Key.Esc, Key.Z.WithCtrl, Key.F5, Key.F6, Key.F6.WithShift, Key.Q.WithCtrl]) app.Keyboard.KeyBindings.Remove(key);
    }
}
