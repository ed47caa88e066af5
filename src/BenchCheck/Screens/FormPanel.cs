using System.Collections.Immutable;
using Terminal.Gui.Input;
using Terminal.Gui.ViewBase;

namespace BenchCheck.Screens;

/// <summary>A field of a form.</summary>
internal sealed record FormField(string Label, string Value, string Hint);

/// <summary>Fields to fill in, a line each; nothing is taken until all of them are right.</summary>
internal sealed class FormPanel : Panel
{
    private const int FirstLine = 2;
    private readonly ImmutableArray<FormField> fields;
    private readonly ImmutableArray<EntryField> entries;
    private readonly Func<ImmutableArray<string>, string?> take;
    private readonly Action closed;
    private readonly int labelWidth;
    private string? problem;
    private int first;

    /// <param name="take">takes the values; null, or what is wrong with them</param>
    public FormPanel(Palette palette, string title, ImmutableArray<FormField> fields, Func<ImmutableArray<string>, string?> take, Action closed) : base(palette, title)
    {
        (this.fields, this.take, this.closed) = (fields, take, closed);
        labelWidth = fields.Max(f => f.Label.Length);
        entries = [.. fields.Select(f => new EntryField(palette, Press) { Height = 1, Text = f.Value })];
        foreach (var entry in entries)
        {
            entry.HasFocusChanged += (_, _) => Show();
            Add(entry);
        }
    }

    public override string Keys => "Enter take it   Tab or Down next field   Esc back";

    /// <summary>Puts the cursor behind what stands in the first field.</summary>
    public void Begin() => Go(0);

    public override void Show()
    {
        var width = Math.Max(20, Viewport.Width - 1);
        var at = Math.Max(0, entries.IndexOf(entries.FirstOrDefault(e => e.HasFocus)!));
        ImmutableArray<ScreenLine> below =
        [
            ScreenLine.Empty, .. ScreenLine.Paragraph(fields[at].Hint, width, Tone.Dim, fields[at].Hint.Length == 0 ? "" : $"{fields[at].Label}: "),
            .. problem is null ? [] : ScreenLine.Paragraph(problem, width, Tone.Bad, "! "),
        ];
        var room = Math.Clamp(Viewport.Height - FirstLine - below.Length, 1, fields.Length);
        first = Math.Clamp(Math.Clamp(first, at - room + 1, at), 0, fields.Length - room);
        var more = room < fields.Length ? $"  (fields {first + 1} to {first + room} of {fields.Length})" : "";
        Body.Lines =
        [
            ScreenLine.Of(Heading + more, Tone.Strong), ScreenLine.Empty,
            .. fields.Skip(first).Take(room).Select((f, i) => ScreenLine.Cells(new Cell(first + i == at ? ">" : " ", 1), new Cell(f.Label, labelWidth, first + i == at ? Tone.Strong : Tone.Plain))),
            .. below,
        ];
        for (var i = 0; i < entries.Length; i++)
        {
            entries[i].X = labelWidth + 3;
            entries[i].Y = FirstLine + i - first;
            entries[i].Width = Math.Max(1, width - labelWidth - 3);
            entries[i].Visible = i >= first && i < first + room;
        }
    }

    public override bool Press(Key key)
    {
        if (key == Key.Esc) closed();
        else if (key == Key.Tab || key == Key.CursorDown) Move(1);
        else if (key == Key.Tab.WithShift || key == Key.CursorUp) Move(-1);
        else if (key == Key.Enter)
        {
            problem = take([.. entries.Select(e => e.Text)]);
            if (problem is not null) Show();
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
        entries[field].Visible = true;
        entries[field].SetFocus();
        entries[field].ClearAllSelection();
        entries[field].InsertionPoint = entries[field].Text.Length;
        Show();
    }
}
