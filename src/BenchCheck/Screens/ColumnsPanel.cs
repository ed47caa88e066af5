using System.Collections.Immutable;
using BenchCheck.Core.Metering;
using BenchCheck.Files;
using Terminal.Gui.Input;

namespace BenchCheck.Screens;

/// <summary>The columns of a table from elsewhere, each told what it is.</summary>
internal sealed class ColumnsPanel : Panel
{
    private const int HeaderWidth = 16;
    private const int MeaningWidth = 16;
    private readonly ImmutableArray<ImmutableArray<string>> rows;
    private readonly ImmutableArray<string> choices;
    private readonly ImmutableArray<FileProblem> problems;
    private readonly Action<ColumnMap> take;
    private readonly Action closed;
    private readonly string[] fields;
    private bool hasHeader;
    private int cursor;

    /// <param name="rows">the first rows of the table; not empty</param>
    /// <param name="problems">why it was not understood as it is; may be empty</param>
    /// <param name="columns">what they are taken for at first</param>
    public ColumnsPanel(Palette palette, string title, ImmutableArray<ImmutableArray<string>> rows, ImmutableArray<FileProblem> problems, ColumnMap columns, Bench bench, Action<ColumnMap> take, Action closed) : base(palette, title)
    {
        (this.rows, this.problems, this.take, this.closed) = (rows, problems, take, closed);
        choices = ["", .. ColumnMap.Choices(bench)];
        hasHeader = columns.HasHeader;
        fields = [.. columns.Names.Select(ColumnMap.FieldOf)];
        Body.Wheeled += Move;
        Body.Clicked += line =>
        {
            if (line < FirstLine || line - FirstLine + Top >= fields.Length) return;
            cursor = line - FirstLine + Top;
            Turn(1);
        };
    }

    private int FirstLine => 4 + Math.Min(1, problems.Length);

    private int Room => Math.Max(1, Viewport.Height - FirstLine);

    private int Top => Math.Clamp(cursor - Room / 2, 0, Math.Max(0, fields.Length - Room));

    public override string Keys => "Up Down column   Left Right what it is   Space first row   Enter look   Esc back";

    public override void Show()
    {
        var width = Math.Max(20, Viewport.Width - 1);
        Body.Lines =
        [
            ScreenLine.Of(Heading, Tone.Strong),
            .. problems.Take(1).Select(p => ScreenLine.Of(ScreenLine.Fit(p.Read + (p.Expected is null ? "" : $"; expected {p.Expected}"), width), Tone.Bad)),
            ScreenLine.Of(hasHeader ? "The first row names the columns." : "The first row is a reading like the others."),
            ScreenLine.Empty,
            ScreenLine.Cells(new Cell("  column", HeaderWidth + 2, Tone.Dim), new Cell("is", MeaningWidth, Tone.Dim), new Cell("holds", Math.Max(8, width - HeaderWidth - MeaningWidth - 4), Tone.Dim)),
            .. fields.Select((field, i) => Line(field, i, width)).Skip(Top).Take(Room),
        ];
    }

    public override bool Press(Key key)
    {
        if (key == Key.CursorDown) Move(1);
        else if (key == Key.CursorUp) Move(-1);
        else if (key == Key.CursorRight) Turn(1);
        else if (key == Key.CursorLeft) Turn(-1);
        else if (key == Key.Space) Swap();
        else if (key == Key.Enter) take(new ColumnMap([.. fields.Select((f, i) => ColumnMap.Named(f, hasHeader ? rows[0][i] : ""))], hasHeader));
        else if (key == Key.Esc) closed();
        else return false;
        return true;
    }

    private ScreenLine Line(string field, int i, int width)
    {
        var holds = string.Join("   ", rows.Skip(hasHeader ? 1 : 0).Select(r => i < r.Length ? r[i] : "").Where(c => c.Length > 0).Take(6));
        var line = ScreenLine.Cells(
            new Cell((i == cursor ? "> " : "  ") + (hasHeader ? rows[0][i] : $"column {i + 1}"), HeaderWidth + 2), new Cell(field.Length == 0 ? "not read" : field, MeaningWidth, field.Length == 0 ? Tone.Dim : Tone.Strong),
            new Cell(holds, Math.Max(8, width - HeaderWidth - MeaningWidth - 4), Tone.Dim));
        return i == cursor ? line.AsChosen() : line;
    }

    private void Move(int by)
    {
        cursor = Math.Clamp(cursor + by, 0, fields.Length - 1);
        Show();
    }

    private void Turn(int by)
    {
        fields[cursor] = choices[(Math.Max(0, choices.IndexOf(fields[cursor])) + by + choices.Length) % choices.Length];
        Show();
    }

    private void Swap()
    {
        hasHeader = !hasHeader;
        Show();
    }
}
