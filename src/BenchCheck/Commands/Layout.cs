using System.Text;
using Spectre.Console;

namespace BenchCheck.Commands;

/// <summary>How tables and headings of the command line look: plain columns, no frames, right-aligned numbers.</summary>
internal static class Layout
{
    /// <summary>A table without frame; a heading that begins with ">" is right-aligned.</summary>
    public static Table Table(params string[] headings)
    {
        var table = new Table().Border(TableBorder.None);
        foreach (var heading in headings)
        {
            var isRight = heading.StartsWith('>');
            var column = new TableColumn(new Text(isRight ? heading[1..] : heading, new Style(decoration: Decoration.Dim))) { NoWrap = true };
            table.AddColumn(isRight ? column.RightAligned().PadLeft(0).PadRight(2) : column.LeftAligned().PadLeft(0).PadRight(2));
        }

        return table;
    }

    public static void Row(Table table, params (string Text, Style Style)[] cells) =>
        table.AddRow(cells.Select(c => new Text(Printable.Text(c.Text), c.Style)));

    public static void Heading(IAnsiConsole console, string text)
    {
        console.WriteLine();
        console.Write(new Text(Printable.Text(text), new Style(decoration: Decoration.Bold)));
        console.WriteLine();
    }

    /// <summary>A paragraph, wrapped at the width of the terminal.</summary>
    public static void Paragraph(IAnsiConsole console, string text, Style? style = null)
    {
        foreach (var line in Wrapped(text, console.Profile.Width)) WriteLine(console, line, style);
    }

    /// <summary>A paragraph behind a label, its further lines set in.</summary>
    public static void Entry(IAnsiConsole console, string label, string text, Style? style = null)
    {
        var first = $"  {Printable.Text(label)} ";
        var indent = new string(' ', first.Length);
        var lines = Wrapped(text, Math.Max(20, console.Profile.Width - first.Length)).ToArray();
        for (var i = 0; i < lines.Length; i++) WriteLine(console, (i == 0 ? first : indent) + lines[i], style);
    }

    private static void WriteLine(IAnsiConsole console, string line, Style? style)
    {
        console.Write(new Text(line, style));
        console.WriteLine();
    }

    private static IEnumerable<string> Wrapped(string text, int width)
    {
        var line = new StringBuilder();
        foreach (var word in text.Split(' ').Select(Printable.Text))
        {
            if (line.Length > 0 && line.Length + 1 + word.Length >= width)
            {
                yield return line.ToString();
                line.Clear();
            }

            if (line.Length > 0) line.Append(' ');
            line.Append(word);
        }

        yield return line.ToString();
    }
}
