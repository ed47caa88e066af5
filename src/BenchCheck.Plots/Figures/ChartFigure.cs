using BenchCheck.Plots.Typefaces;
using ScottPlot;

namespace BenchCheck.Plots.Figures;

/// <summary>A figure of one plot with its axes: heading above, key and a note below.</summary>
internal static class ChartFigure
{
    /// <summary>Width of the figure, in pixels.</summary>
    public const int Width = 1000;

    private const float Margin = 20;
    private const float PlotHeight = 360;
    private const float NoteSize = 12.5f;

    /// <param name="plot">null when there is nothing to draw; the note then says so</param>
    /// <param name="note">a sentence; empty for none</param>
    public static Figure Compose(Heading heading, Plot? plot, IReadOnlyList<KeyEntry> key, string note)
    {
        var items = new List<FigureItem>();
        var y = heading.Place(items, Margin, Margin, Width - 2 * Margin) + 10;
        if (plot is not null)
        {
            items.Add(new PlotItem(plot, new PixelRect(Margin / 2, Width - Margin / 2, y + PlotHeight, y)));
            y = Key.Place(items, key, Margin, y + PlotHeight + 6, Width - Margin);
        }

        foreach (var line in FigureText.Lines(note, Width - 2 * Margin, NoteSize, FigureText.Regular, 3))
        {
            items.Add(new TextItem(line, Margin, y + 11, NoteSize, Ink.Quiet));
            y += 20;
        }

        return new Figure(Width, (int)MathF.Ceiling(y + Margin / 2), heading.Title, heading.Finding, [.. items]);
    }
}
