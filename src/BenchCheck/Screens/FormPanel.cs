using System.Collections.Immutable;
using Terminal.Gui.Input;
using Terminal.Gui.ViewBase;

namespace BenchCheck.Screens;

/// <summary>A field of a form.</summary>
internal sealed record FormField(string Label, string Value, string Hint);

/// <summary>Fields to fill in; nothing is taken until all of them are right.</summary>
internal sealed class FormPanel : Panel
{
    private const int LabelWidth = 14;
    private readonly ImmutableArray<FormField> fields;
    private readonly ImmutableArray<EntryField> entries;
    private readonly Func<ImmutableArray<string>, string?> take;
    private readonly Action closed;
    private string? problem;

    /// <param name="take">takes the values; null, or what is wrong with them</param>
    public FormPanel(Palette palette, string title, ImmutableArray<FormField> fields, Func<ImmutableArray<string>, string?> take, Action closed) : base(palette, title)
    {
        (this.fields, this.take, this.closed) = (fields, take, closed);
        entries =
        [
            .. fields.Select((f, i) => new EntryField(palette, Press)
            {
                X = LabelWidth + 2, Y = 2 + 2 * i, Width = Dim.Fill(2), Height = 1, Text = f.Value,
            }),
        ];
        foreach (var entry in entries)
        {
            Add(entry);
        }
    }

    public override string Keys => "Enter take it   Tab or Down next field   Esc back";

    /// <summary>Puts the cursor behind what stands in the first field.</summary>
    public void Begin() => Go(0);

    public override void Show()
    {
        var lines = ImmutableArray.CreateBuilder<ScreenLine>();
        lines.Add(ScreenLine.Of(Heading, Tone.Strong));
        lines.Add(ScreenLine.Empty);
        foreach (var field in fields)
        {
            lines.Add(ScreenLine.Cells(new Cell(field.Label, LabelWidth, Tone.Plain, true)));
            lines.Add(new ScreenLine([new Piece(new string(' ', LabelWidth + 2), Tone.Plain), .. ScreenLine.Of(field.Hint, Tone.Dim).Pieces]));
        }

        if (problem is not null) lines.AddRange(ScreenLine.Paragraph(problem, Math.Max(20, Viewport.Width - 2), Tone.Bad, "! "));
        Body.Lines = lines.ToImmutable();
    }

    public override bool Press(Key key)
    {
        if (key == Key.Esc) closed();
        else if (key == Key.Tab || key == Key.CursorDown) Move(1);
        else if (key == Key.Tab.WithShift || key == Key.CursorUp) Move(-1);
        else if (key == Key.Enter)
        {
            problem = take([.. entries.Select(e => e.Text)]);
            Show();
        }
        else return false;
        return true;
    }

    private void Move(int by)
    {
        var at = Math.Max(0, entries.IndexOf(entries.FirstOrDefault(e => e.HasFocus)!));
        Go((at + by + entries.Length) % entries.Length);
    }

    private void Go(int field)
    {
        entries[field].SetFocus();
        entries[field].ClearAllSelection();
        entries[field].InsertionPoint = entries[field].Text.Length;
    }
}
