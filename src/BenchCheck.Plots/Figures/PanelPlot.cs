using BenchCheck.Plots.Typefaces;
using ScottPlot;
using ScottPlot.Plottables;

namespace BenchCheck.Plots.Figures;

/// <summary>Makes plots in the looks of this program.</summary>
internal static class PanelPlot
{
    public const float LetterSize = 12;

    /// <summary>Room for half a number where an axis ends.</summary>
    private const float SideRoom = 28;
    private const float TopRoom = 9;

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
        foreach (var (edge, room) in new[] { ((IAxis)plot.Axes.Right, SideRoom), (plot.Axes.Top, TopRoom) })
        {
            edge.FrameLineStyle.IsVisible = false;
            edge.TickGenerator = new ScottPlot.TickGenerators.EmptyTickGenerator();
            edge.MinimumSize = room;
            edge.MaximumSize = room;
        }

        foreach (var axis in new IAxis[] { plot.Axes.Bottom, plot.Axes.Left })
        {
            axis.FrameLineStyle.Color = Ink.Frame;
            axis.MajorTickStyle.Color = Ink.Frame;
            axis.MinorTickStyle.Length = 0;
            axis.TickLabelStyle.FontName = CarriedFaces.Family;
            axis.TickLabelStyle.FontSize = LetterSize;
            axis.TickLabelStyle.ForeColor = Ink.Text;
        }

        ((ScottPlot.AxisPanels.AxisBase)plot.Axes.Left).PaddingBetweenTickAndAxisLabels = new PixelPadding(8, 8, 0, 0);
        foreach (var label in new[] { plot.Axes.Bottom.Label, plot.Axes.Left.Label })
        {
            label.FontName = CarriedFaces.Family;
            label.FontSize = LetterSize;
            label.Bold = false;
            label.ForeColor = Ink.Quiet;
        }

        return plot;
    }

    /// <summary>Makes of a span the shade in which values are expected.</summary>
    public static void Expect(AxisSpan span)
    {
        span.FillStyle.Color = Ink.Expected;
        span.LineStyle.IsVisible = false;
    }

    /// <summary>Key entries for limits drawn as a shade between solid lines, with a dashed line at the nominal value.</summary>
    public static IEnumerable<KeyEntry> LimitKey(Limits limits)
    {
        if (limits.AreKnown) yield return new BarKey(Ink.Expected, 16, "range of the parts list");
        if (double.IsFinite(limits.Nominal)) yield return new BarKey(Ink.Limit, 1.5f, "nominal (dashed)");
    }
}
