using Terminal.Gui.Input;
using Xunit;

namespace BenchCheck.Tests.Screens;

/// <summary>Keys at random, as from a cat on the bench: no crash, no hang, nothing entered that is not on disk.</summary>
[Collection("screen")]
public sealed class KeyStormTests
{
    private static readonly Key[] Keys =
    [
        Key.Enter, Key.Esc, Key.Tab, Key.Tab.WithShift, Key.CursorUp, Key.CursorDown, Key.CursorLeft, Key.CursorRight, Key.PageUp, Key.PageDown, Key.Home, Key.End, Key.Delete, Key.Backspace,
        Key.F1, Key.F2, Key.F3, Key.F4, Key.F5, Key.F6, Key.F7, Key.F8, Key.F9, Key.Space,
        Key.U.WithCtrl, Key.Y.WithCtrl, Key.R.WithCtrl, Key.N.WithCtrl, Key.D.WithCtrl, Key.G.WithCtrl, Key.O.WithCtrl, Key.F.WithCtrl, Key.B.WithCtrl, Key.S.WithCtrl, Key.L.WithCtrl, Key.T.WithCtrl,
        Key.A.WithCtrl, Key.X.WithCtrl, Key.C.WithCtrl, Key.V.WithCtrl, Key.K.WithCtrl, Key.B.WithAlt, Key.R.WithAlt,
    ];

    [Fact]
    public void Ten_thousand_keys_at_random_neither_crash_nor_hang_the_screen()
    {
        const int count = 10_000;
        using var folder = new WorkFolder();
        using var screen = new ScreenUnderTest(folder.Path, "fan-stage.toml");
        screen.AwaitCheck();
        var random = new Random(20260504);
        for (var i = 0; i < count; i++)
        {
            var key = random.Next(3) == 0 ? Keys[random.Next(Keys.Length)] : new Key("0123456789.,mkV-+eµ\"x"[random.Next(21)]);
            screen.Strike(key);
            if (i % 50 == 0) Assert.Contains("Board", screen.Text);
        }

        screen.Press(Key.Esc, Key.Esc, Key.Esc);
        Assert.Contains("Board", screen.Text);
    }
}
