using System.Collections.Immutable;
using Terminal.Gui.Input;
using Terminal.Gui.ViewBase;

namespace BenchCheck.Screens;

/// <summary>Something that lies over the work area until it is answered or closed.</summary>
internal abstract class Panel : View
{
    protected Panel(Palette palette, string title)
    {
        (Palette, Heading) = (palette, title);
        CanFocus = true;
        Width = Dim.Fill();
        Height = Dim.Fill();
        SetScheme(palette.Scheme());
        Body = new PaneView(palette) { Width = Dim.Fill(), Height = Dim.Fill() };
        Add(Body);
        FrameChanged += (_, _) => Show();
    }

    protected Palette Palette { get; }

    protected string Heading { get; }

    protected PaneView Body { get; }

    /// <summary>Keys that work here, for the line at the bottom.</summary>
    public abstract string Keys { get; }

    /// <summary>Puts the content into <see cref="Body"/> for the present size.</summary>
    public abstract void Show();

    /// <summary>True when the key was meant for this panel.</summary>
    public abstract bool Press(Key key);

    protected override bool OnKeyDown(Key key) => Press(key);
}

/// <summary>A text to read, scrolled when it is longer than the screen.</summary>
internal sealed class TextPanel : Panel
{
    private readonly Func<int, ImmutableArray<ScreenLine>> text;
    private readonly Action closed;
    private readonly string keys;
    private int top;

    /// <param name="text">lines for a width</param>
    public TextPanel(Palette palette, string title, Func<int, ImmutableArray<ScreenLine>> text, string keys, Action closed) : base(palette, title)
    {
        (this.text, this.keys, this.closed) = (text, keys, closed);
        Body.Wheeled += step => Scroll(3 * step);
    }

    public override string Keys => keys;

    public override void Show()
    {
        var lines = text(Math.Max(20, Viewport.Width - 2));
        var room = Math.Max(1, Viewport.Height - 2);
        top = Math.Clamp(top, 0, Math.Max(0, lines.Length - room));
        var more = lines.Length > room ? $"  (lines {top + 1} to {Math.Min(lines.Length, top + room)} of {lines.Length}; arrows scroll)" : "";
        Body.Lines = [ScreenLine.Of(Heading + more, Tone.Strong), ScreenLine.Empty, .. lines.Skip(top).Take(room)];
    }

    public override bool Press(Key key)
    {
        var page = Math.Max(1, Viewport.Height - 3);
        if (key == Key.CursorDown) Scroll(1);
        else if (key == Key.CursorUp) Scroll(-1);
        else if (key == Key.PageDown || key == Key.Space) Scroll(page);
        else if (key == Key.PageUp) Scroll(-page);
        else if (key == Key.Enter || key == Key.Esc || key == Key.F1) closed();
        else return false;
        return true;
    }

    private void Scroll(int by)
    {
        top = Math.Max(0, top + by);
        Show();
    }
}

/// <summary>One thing to choose.</summary>
/// <param name="Label">what it is</param>
/// <param name="Hint">what follows from it; may be empty</param>
internal sealed record Choice(string Label, string Hint, Action Take);

/// <summary>Things of which one is chosen: by arrows and Enter, by its number, or by the mouse.</summary>
internal sealed class ChoicePanel : Panel
{
    private readonly Func<int, ImmutableArray<ScreenLine>> intro;
    private readonly ImmutableArray<Choice> choices;
    private readonly Action? closed;
    private int cursor;
    private int firstLine;

    /// <param name="closed">what Esc does; null when one must be chosen</param>
    public ChoicePanel(Palette palette, string title, Func<int, ImmutableArray<ScreenLine>> intro, ImmutableArray<Choice> choices, Action? closed) : base(palette, title)
    {
        (this.intro, this.choices, this.closed) = (intro, choices, closed);
        Body.Clicked += line =>
        {
            if (line >= firstLine && line - firstLine + top < choices.Length) choices[line - firstLine + top].Take();
        };
        Body.Wheeled += Move;
    }

    private int top;

    public override string Keys => "Up Down choose   Enter take it   1-9 take by number" + (closed is null ? "" : "   Esc back");

    public override void Show()
    {
        var width = Math.Max(20, Viewport.Width - 2);
        var head = ImmutableArray.Create(ScreenLine.Of(Heading, Tone.Strong)).AddRange(intro(width)).Add(ScreenLine.Empty);
        firstLine = head.Length;
        var room = Math.Max(1, Viewport.Height - firstLine);
        top = Math.Clamp(cursor - room / 2, 0, Math.Max(0, choices.Length - room));
        var label = Math.Min(width - 6, Math.Max(12, choices.Max(c => c.Label.Length)));
        Body.Lines = [.. head, .. choices.Select(Line).Skip(top).Take(room)];

        ScreenLine Line(Choice choice, int i)
        {
            var number = i < 9 ? $"{i + 1}" : " ";
            var line = ScreenLine.Cells(new Cell(i == cursor ? ">" : " ", 1), new Cell(number, 1), new Cell(choice.Label, label), new Cell(choice.Hint, Math.Max(0, width - label - 5), Tone.Dim));
            return i == cursor ? line.AsChosen() : line;
        }
    }

    public override bool Press(Key key)
    {
        if (key == Key.CursorDown) Move(1);
        else if (key == Key.CursorUp) Move(-1);
        else if (key == Key.Enter) choices[cursor].Take();
        else if (key == Key.Esc && closed is not null) closed();
        else if (key.AsRune.Value is >= '1' and <= '9' && !key.IsCtrl && !key.IsAlt && key.AsRune.Value - '1' < choices.Length) choices[key.AsRune.Value - '1'].Take();
        else return false;
        return true;
    }

    private void Move(int by)
    {
        cursor = Math.Clamp(cursor + by, 0, choices.Length - 1);
        Show();
    }
}
