using BenchCheck.Plots.Typefaces;
using SkiaSharp;

namespace BenchCheck.Plots.Figures;

/// <summary>A figure in rows: a name, panels that share the rows, columns of numbers; heading above, key below.</summary>
internal sealed class RowFigure
{
    /// <summary>Most rows that are drawn; a figure of more could no longer be looked at.</summary>
    public const int MostRows = 200;

    private const float Margin = 20;
    private const float Gap = 22;
    private const float PanelGap = 34;
    private const float NameSize = 13;
    private const float WidestName = 250;

    /// <summary>Most of the width that names may take.</summary>
    private const float NameShare = 0.34f;

    private const float HeaderHeight = 26;
    private const float RowHeight = 25;

    private readonly int width;
    private readonly IReadOnlyList<string> names;
    private readonly IReadOnlyList<RowColumn> columns;
    private readonly float nameWidth;

    /// <param name="names">one a row, clean; shortened when too wide</param>
    public RowFigure(int width, IEnumerable<string> names, IReadOnlyList<RowColumn> columns)
    {
        this.width = width;
        this.columns = columns;
        this.names = [.. names.Select(n => FigureText.Fitted(n, Math.Min(WidestName, NameShare * width), NameSize, FigureText.Regular))];
        nameWidth = this.names.Select(n => FigureText.Width(n, NameSize, FigureText.Regular)).DefaultIfEmpty(0).Max();
    }

    public int Rows => names.Count;

    /// <summary>Width that is left for the panels, less the gaps between them.</summary>
    public float PanelRoom(int panels) => width - 2 * Margin - nameWidth - columns.Sum(c => c.Width + Gap) - panels * PanelGap;

    /// <param name="title">what the picture is of, for those who cannot see it</param>
    /// <param name="heading">null where the page around the picture says it</param>
    /// <param name="note">a sentence below the key; empty for none</param>
    public Figure Compose(string title, Heading? heading, string description, IReadOnlyList<RowPanel> panels, IReadOnlyList<KeyEntry> key, string note)
    {
        var items = new List<FigureItem>();
        var y = heading is null ? Margin / 2 : heading.Place(items, Margin, Margin, width - 2 * Margin) + 8;
        if (Rows > 0) y = PlaceRows(items, panels, y);
        y = Key.Place(items, Rows > 0 ? key : [], Margin, y + 6, width - Margin);
        foreach (var line in FigureText.Lines(note, width - 2 * Margin, RowColumn.Size, FigureText.Regular, 3))
        {
            items.Add(new TextItem(line, Margin, y + 11, RowColumn.Size, Ink.Quiet));
            y += 20;
        }

        return new Figure(width, (int)MathF.Ceiling(y + Margin / 2), title, description, [.. items]);
    }

    private float PlaceRows(List<FigureItem> items, IReadOnlyList<RowPanel> panels, float top)
    {
        var rowsTop = top + HeaderHeight;
        var height = RowHeight * Rows;
        var x = Margin + nameWidth + Gap;
        foreach (var panel in panels)
        {
            items.Add(new TextItem(panel.Title, x + panel.Width / 2, top + HeaderHeight / 2, NameSize, Ink.Text, SKTextAlign.Center, FigureText.Bold));
            items.Add(panel.At(x, rowsTop, height));
            x += panel.Width + PanelGap;
        }

        for (var row = 0; row < Rows; row++)
        {
            var middle = rowsTop + (row + 0.5f) * RowHeight;
            items.Add(new RectItem(Margin, middle + RowHeight / 2 - 0.5f, width - 2 * Margin, 1, Ink.Grid));
            items.Add(new TextItem(names[row], Margin, middle, NameSize, Ink.Text));
        }

        foreach (var column in columns)
        {
            x += column.Width;
            items.Add(new TextItem(column.Header, x, top + HeaderHeight / 2, RowColumn.Size, Ink.Quiet, SKTextAlign.Right));
            for (var row = 0; row < Rows; row++)
                items.Add(new TextItem(column.Texts[row], x, rowsTop + (row + 0.5f) * RowHeight, RowColumn.Size, Ink.Text, SKTextAlign.Right));
            x += Gap;
        }

        return rowsTop + height + RowPanel.AxisRoom;
    }
}
