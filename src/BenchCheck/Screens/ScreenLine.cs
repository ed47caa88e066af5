using System.Collections.Immutable;
using System.Text;
using BenchCheck.Commands;
using Terminal.Gui.Text;

namespace BenchCheck.Screens;

/// <summary>A piece of a line. Its text is fit for a terminal whatever it came from.</summary>
internal readonly record struct Piece(string Text, Tone Tone);

/// <summary>One line of a pane, from left to right: what is drawn, and what a test or a screen reader reads.</summary>
internal sealed record ScreenLine(ImmutableArray<Piece> Pieces)
{
    public static ScreenLine Empty { get; } = new([]);

    public string Text => string.Concat(Pieces.Select(p => p.Text));

    /// <summary>Text from anywhere, made printable.</summary>
    public static ScreenLine Of(string text, Tone tone = Tone.Plain) => new([new Piece(Printable.Text(text), tone)]);

    /// <summary>Cells of fixed widths with one blank between them.</summary>
    public static ScreenLine Cells(params ReadOnlySpan<Cell> cells)
    {
        var pieces = ImmutableArray.CreateBuilder<Piece>(cells.Length);
        for (var i = 0; i < cells.Length; i++)
            pieces.Add(new Piece((i == 0 ? "" : " ") + Fit(Printable.Text(cells[i].Text), cells[i].Width, cells[i].IsRight), cells[i].Tone));
        return new ScreenLine(pieces.MoveToImmutable());
    }

    /// <summary>The whole line as the row that the cursor is on.</summary>
    public ScreenLine AsChosen() => new([.. Pieces.Select(p => p with { Tone = Tone.Chosen })]);

    /// <summary>A paragraph broken at blanks into lines of at most <paramref name="width"/> columns; further lines stand under the first.</summary>
    /// <param name="label">stands before the first line</param>
    public static IEnumerable<ScreenLine> Paragraph(string text, int width, Tone tone = Tone.Plain, string label = "")
    {
        var indent = label.GetColumns();
        var room = Math.Max(8, width - indent);
        var line = new StringBuilder();
        var isFirst = true;
        foreach (var word in text.Split(' ', StringSplitOptions.RemoveEmptyEntries).Select(Printable.Text).SelectMany(w => Chunks(w, room)))
        {
            if (line.Length > 0 && line.ToString().GetColumns() + 1 + word.GetColumns() > room)
            {
                yield return Labelled(line.ToString());
                line.Clear();
            }

            if (line.Length > 0) line.Append(' ');
            line.Append(word);
        }

        yield return Labelled(line.ToString());

        ScreenLine Labelled(string body)
        {
            var head = isFirst ? label : new string(' ', indent);
            isFirst = false;
            return new ScreenLine([new Piece(head, Tone.Strong), new Piece(body, tone)]);
        }
    }

    /// <summary>Exactly so many columns: padded with blanks, or cut with "…".</summary>
    public static string Fit(string text, int width, bool isRight = false)
    {
        if (width <= 0) return "";
        var columns = text.GetColumns();
        if (columns <= width) return isRight ? new string(' ', width - columns) + text : text + new string(' ', width - columns);
        var cut = new StringBuilder();
        var used = 0;
        foreach (var rune in text.EnumerateRunes())
        {
            var wide = Math.Max(0, rune.GetColumns());
            if (used + wide > width - 1) break;
            used += wide;
            cut.Append(rune.ToString());
        }

        return cut.Append('…').Append(' ', width - 1 - used).ToString();
    }

    private static IEnumerable<string> Chunks(string word, int room)
    {
        while (word.GetColumns() > room)
        {
            var head = 0;
            var used = 0;
            foreach (var rune in word.EnumerateRunes())
            {
                used += Math.Max(0, rune.GetColumns());
                if (used > room) break;
                head += rune.Utf16SequenceLength;
            }

            yield return word[..Math.Max(1, head)];
            word = word[Math.Max(1, head)..];
        }

        yield return word;
    }
}

/// <summary>A cell of a table row.</summary>
internal readonly record struct Cell(string Text, int Width, Tone Tone = Tone.Plain, bool IsRight = false);
