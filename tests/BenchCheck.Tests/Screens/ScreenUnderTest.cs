using BenchCheck.Records;
using BenchCheck.Screens;
using Terminal.Gui.App;
using Terminal.Gui.Input;
using Terminal.Gui.Testing;
using Xunit;

namespace BenchCheck.Tests.Screens;

/// <summary>The bench screen without a terminal: keys go in, the drawn text comes out.</summary>
internal sealed class ScreenUnderTest : IDisposable
{
    private static readonly TimeSpan Patience = TimeSpan.FromSeconds(20);
    private readonly IApplication app;
    private readonly SessionToken token;

    public ScreenUnderTest(string folder, string? board = "mist-valve.toml", int width = 80, int height = 24, bool isFirstStart = false, bool hasColour = true)
    {
        var user = new UserFolder(Path.Combine(folder, "user"));
        if (!isFirstStart) user.AcknowledgeCautions();
        app = Application.Create();
        app.Init("ansi");
        ScreenProgram.FreeKeys(app);
        app.Driver!.SetScreenSize(width, height);
        Screen = new BenchScreen(user, new BoardRecords(() => LogPlace.Parse(Path.Combine(folder, "log.db"))), TimeProvider.System, new Palette(hasColour));
        token = app.Begin(Screen)!;
        Screen.Begin(board is null ? null : Path.Combine(folder, board), null);
        Draw();
    }

    public BenchScreen Screen { get; }

    public string Text
    {
        get
        {
            Draw();
            return app.Driver!.ToString()!;
        }
    }

    public string Ansi
    {
        get
        {
            Draw();
            return app.Driver!.ToAnsi();
        }
    }

    public ScreenUnderTest Press(params Key[] keys)
    {
        foreach (var key in keys) app.InjectKey(key);
        Draw();
        return this;
    }

    /// <summary>A key without drawing afterwards.</summary>
    public void Strike(Key key) => app.InjectKey(key);

    public ScreenUnderTest Type(string text) => Press([.. text.Select(c => new Key(c))]);

    /// <summary>Waits until the drawn text holds <paramref name="text"/>.</summary>
    public string Await(string text) => Await(drawn => drawn.Contains(text, StringComparison.Ordinal), $"\"{text}\"");

    /// <summary>Waits until the present readings are checked to the end.</summary>
    public string AwaitCheck() => Await(_ => Screen.Workbench is { Session: { IsChecked: true, Prediction: not null } }, "the check to end");

    public string Await(Func<string, bool> condition, string what)
    {
        var until = DateTime.UtcNow + Patience;
        while (true)
        {
            var drawn = Text;
            if (condition(drawn)) return drawn;
            Assert.True(DateTime.UtcNow < until, $"waited in vain for {what}; the screen shows\n{drawn}");
            Thread.Sleep(5);
        }
    }

    public void Dispose()
    {
        app.End(token);
        Screen.Dispose();
        app.Dispose();
    }

    private void Draw()
    {
        app.TimedEvents?.RunTimers();
        app.LayoutAndDraw();
    }
}
