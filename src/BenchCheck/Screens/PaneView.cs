using System.Collections.Immutable;
using Terminal.Gui.Input;
using Terminal.Gui.Text;
using Terminal.Gui.ViewBase;

namespace BenchCheck.Screens;

/// <summary>Draws lines as they are given, from a first one on; says which was clicked.</summary>
internal sealed class PaneView : View
{
    private readonly Palette palette;
    private ImmutableArray<ScreenLine> lines = [];

    public PaneView(Palette palette)
    {
        this.palette = palette;
        CanFocus = false;
        SetScheme(palette.Scheme());
    }

    public event Action<int>? Clicked;

    public event Action<int>? Wheeled;

    public ImmutableArray<ScreenLine> Lines
    {
        get => lines;
        set
        {
            lines = value;
            SetNeedsDraw();
        }
    }

    protected override bool OnDrawingContent(DrawContext? context)
    {
        for (var row = 0; row < Viewport.Height; row++)
        {
            var column = 0;
            var last = Tone.Plain;
            foreach (var piece in row < lines.Length ? lines[row].Pieces : [])
            {
                var room = Viewport.Width - column;
                if (room <= 0) break;
                var width = Math.Min(room, piece.Text.GetColumns());
                last = piece.Tone;
                SetAttribute(palette.Of(piece.Tone));
                AddStr(column, row, ScreenLine.Fit(piece.Text, width));
                column += width;
            }

            if (column >= Viewport.Width) continue;
            SetAttribute(palette.Of(last == Tone.Chosen ? Tone.Chosen : Tone.Plain));
            AddStr(column, row, new string(' ', Viewport.Width - column));
        }

        return true;
    }

    protected override bool OnMouseEvent(Mouse mouse)
    {
        if (mouse.Flags.HasFlag(MouseFlags.WheeledDown)) Wheeled?.Invoke(1);
        else if (mouse.Flags.HasFlag(MouseFlags.WheeledUp)) Wheeled?.Invoke(-1);
        else if (mouse.Flags.HasFlag(MouseFlags.LeftButtonClicked) && mouse.Position is { } at) Clicked?.Invoke(at.Y);
        else return false;
        return true;
    }
}
