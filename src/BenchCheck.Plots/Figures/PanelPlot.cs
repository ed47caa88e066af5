using BenchCheck.Plots.Typefaces;
using ScottPlot;

namespace BenchCheck.Plots.Figures;

/// <summary>Makes plots in the looks of this program.</summary>
internal static class PanelPlot
{
    public const float LetterSize = 12;

    static PanelPlot()
    {
        Fonts.FontResolvers.Insert(0, new FontResolver());
        Fonts.Default = CarriedFaces.Family;
    }

    /// <summary>A plot with nothing in it yet: no grid, axes at the left and at the bottom.</summary>
    public static Plot Empty()
    {
        var plot = new Plot();
        plot.FigureBackground.Color = Ink.Paper;
        plot.DataBackground.Color = Colors.Transparent;
        plot.HideGrid();
        plot.Axes.Right.IsVisible = false;
        plot.Axes.Top.IsVisible = false;
        foreach (var axis in new IAxis[] { plot.Axes.Bottom, plot.Axes.Left })
        {
            axis.FrameLineStyle.Color = Ink.Frame;
            axis.MajorTickStyle.Color = Ink.Frame;
            axis.MinorTickStyle.Length = 0;
            axis.TickLabelStyle.FontName = CarriedFaces.Family;
            axis.TickLabelStyle.FontSize = LetterSize;
            axis.TickLabelStyle.ForeColor = Ink.Text;
        }

        foreach (var label in new[] { plot.Axes.Bottom.Label, plot.Axes.Left.Label })
        {
            label.FontName = CarriedFaces.Family;
            label.FontSize = LetterSize;
            label.Bold = false;
            label.ForeColor = Ink.Quiet;
        }

        return plot;
    }
}
