using System.Globalization;
using BenchCheck.Plots.Typefaces;
using ScottPlot;

namespace BenchCheck.Plots.Figures;

/// <summary>One panel of a figure in rows: row i stands at height i, the first on top; what lies beyond the axis is drawn at its edge with an arrow and its value.</summary>
internal sealed class RowPanel
{
    public const float AxisRoom = 46;

    /// <summary>Room at the sides for half a number of the axis.</summary>
    private const float Side = 14;

    /// <summary>Room of one number of the axis.</summary>
    private const float NumberRoom = 22;

    private const float ClampedSize = 11;
    private const float MarkSize = 11;
    private const double BarHalfHeight = 0.24;

    private readonly Plot plot;
    private readonly double reach;
    private readonly double perPixel;

    /// <param name="title">stands over the panel</param>
    /// <param name="reach">the axis goes from −reach to reach</param>
    /// <param name="step">between the numbers of the axis</param>
    /// <param name="width">in pixels, to size what is drawn at the edges</param>
    public RowPanel(string title, string axisTitle, double reach, double step, int rows, float width)
    {
        (Title, this.reach, perPixel, Width) = (title, reach, 2 * reach / width, width);
        plot = PanelPlot.Empty();
        plot.Layout.Fixed(new PixelPadding(Side, Side, AxisRoom, 0));
        plot.Axes.SetLimits(-reach, reach, rows - 0.5, -0.5);
        plot.Axes.Left.TickGenerator = new ScottPlot.TickGenerators.EmptyTickGenerator();
        var ticks = new ScottPlot.TickGenerators.NumericManual();
        var labelled = (int)Math.Ceiling(NumberRoom * perPixel / step);
        for (var i = -(int)(reach / step); i * step <= reach; i++)
            ticks.AddMajor(i * step, i % labelled == 0 ? (i * step).ToString("+0.#;-0.#;0", CultureInfo.InvariantCulture) : "");
        plot.Axes.Bottom.TickGenerator = ticks;
        plot.Axes.Bottom.Label.Text = FigureText.Fitted(axisTitle, width + 2 * Side, PanelPlot.LetterSize, FigureText.Regular);
    }

    public string Title { get; }

    public float Width { get; }

    public PlotItem At(float left, float top, float height) =>
        new(plot, new PixelRect(left - Side, left + Width + Side, top + height + AxisRoom, top));

    /// <summary>Shades where values are expected, from one number of the axis to another.</summary>
    public void Expect(double low, double high) => PanelPlot.Expect(plot.Add.HorizontalSpan(low, high));

    public void Guide(double at, LinePattern pattern, Color color)
    {
        var line = plot.Add.VerticalLine(at, 1, color, pattern);
        line.EnableAutoscale = false;
    }

    /// <summary>A thick bar in a row; an end beyond the axis stops at its edge.</summary>
    public void Bar(int row, double low, double high)
    {
        if (double.IsNaN(low) || double.IsNaN(high)) return;
        var bar = plot.Add.Rectangle(Clamped(low), Clamped(high), row - BarHalfHeight, row + BarHalfHeight);
        bar.FillColor = Ink.Band;
        bar.LineStyle.IsVisible = false;
    }

    /// <summary>A thin line in a row.</summary>
    public void Line(int row, double low, double high)
    {
        if (double.IsNaN(low) || double.IsNaN(high)) return;
        plot.Add.Line(Clamped(low), row, Clamped(high), row).LineStyle = new LineStyle { Color = Ink.Text, Width = 1.5f };
    }

    /// <summary>A value; where there is none, the words that stand in its place.</summary>
    public void Point(int row, double value, Mark mark, string none)
    {
        if (double.IsNaN(value))
        {
            Words(row, 0, none, Alignment.MiddleCenter, Ink.Quiet);
        }
        else if (Math.Abs(value) <= reach)
        {
            Add(row, value, mark, MarkSize);
        }
        else
        {
            var inward = -Math.Sign(value) * perPixel;
            var edge = Math.Sign(value) * reach;
            Add(row, edge + 5 * inward, value > 0 ? Mark.BeyondRight : Mark.BeyondLeft, 8);
            Add(row, edge + 17 * inward, mark, MarkSize);
            Words(row, edge + 27 * inward, Plots.Words.Ratio(value), value > 0 ? Alignment.MiddleRight : Alignment.MiddleLeft, Ink.Text);
        }
    }

    private double Clamped(double value) => Math.Clamp(value, -reach, reach);

    private void Add(int row, double value, Mark mark, float size)
    {
        var marker = plot.Add.Marker(value, row);
        marker.MarkerStyle = new MarkerStyle { CustomRenderer = mark, Size = size };
    }

    private void Words(int row, double at, string text, Alignment alignment, Color color)
    {
        var label = plot.Add.Text(text, at, row);
        label.LabelFontName = CarriedFaces.Family;
        label.LabelFontSize = ClampedSize;
        label.LabelFontColor = color;
        label.LabelAlignment = alignment;
        label.OffsetY = 1;
        label.LabelPixelPadding = new PixelPadding(2, 2, 0, 0);
        label.LabelBackgroundColor = Ink.Paper.WithAlpha(0.85);
    }
}
