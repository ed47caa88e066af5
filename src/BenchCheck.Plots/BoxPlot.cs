using System.Collections.Immutable;
using System.Globalization;
using BenchCheck.Core.Batches;
using BenchCheck.Core.Quantities;
using BenchCheck.Plots.Figures;
using BenchCheck.Plots.Typefaces;
using ScottPlot;

namespace BenchCheck.Plots;

/// <summary>One parameter of a batch.</summary>
/// <param name="Name">"R1 resistance"</param>
/// <param name="Limits">of the parts list, in the unit</param>
public sealed record BoxRow(string Name, Unit Unit, Distribution Values, Limits Limits);

/// <summary>How each parameter is spread over a batch: a box a parameter, its tolerance scaled to ±1.</summary>
public static class BoxPlot
{
    private const int Width = 1000;
    private const double Reach = 3;
    private const int LowerTail = 0;
    private const int LowerQuartile = 1;
    private const int UpperQuartile = 3;
    private const int UpperTail = 4;

    private static readonly ImmutableArray<KeyEntry> Signs =
    [
        new MarkKey(Mark.Middle, "median"), new BarKey(Ink.Band, 11, "middle half of the boards"), new BarKey(Ink.Text, 1.5f, "5 % to 95 %"),
        new MarkKey(Mark.Outlier, "outlier"), new BarKey(Ink.Expected, 16, "tolerance of the parts list"),
    ];

    /// <param name="title">the board or the batch</param>
    public static Figure Of(string title, IReadOnlyList<BoxRow> rows)
    {
        ArgumentNullException.ThrowIfNull(rows);
        BoxRow[] shown = [.. rows.Take(RowFigure.MostRows)];
        var figure = new RowFigure(Width, shown.Select(r => FigureText.Clean(r.Name)), shown.Length == 0 ? [] : Columns(shown));
        var panel = new RowPanel("Spread of the estimates", "distance from nominal; ±1 is the tolerance", Reach, 1, shown.Length, figure.PanelRoom(1));
        panel.Expect(-1, 1);
        panel.Guide(0, LinePattern.Solid, Ink.Frame);
        for (var row = 0; row < shown.Length; row++) Add(panel, row, shown[row]);

        var boards = rows.Select(r => r.Values.Count).DefaultIfEmpty(0).Max();
        var finding = string.Create(CultureInfo.InvariantCulture, $"{rows.Count} parameters of {boards} boards");
        var note = shown.Length == 0 ? "There are no estimates to draw."
            : shown.Length < rows.Count ? string.Create(CultureInfo.InvariantCulture, $"{rows.Count - shown.Length} further parameters are not drawn.") : "";
        var heading = new Heading(FigureText.Clean(title), finding, null);
        return figure.Compose(heading.Title, heading, finding, [panel], Signs, note);
    }

    private static void Add(RowPanel panel, int row, BoxRow box)
    {
        double[] at = [.. box.Values.Percentiles.Select(box.Limits.Position)];
        panel.Bar(row, at[LowerQuartile], at[UpperQuartile]);
        panel.Line(row, at[LowerTail], at[UpperTail]);
        double[] outliers = [.. box.Values.Outliers.Select(o => box.Limits.Position(o.Value))];
        foreach (var outlier in outliers.Where(o => Math.Abs(o) <= Reach)) panel.Point(row, outlier, Mark.Outlier, "");
        foreach (var side in new[] { -1, 1 })
        {
            if (outliers.Where(o => o * side > Reach).ToArray() is [_, ..] beyond) panel.Point(row, side * beyond.Max(Math.Abs), Mark.Outlier, "");
        }

        panel.Point(row, box.Limits.Position(box.Values.Median), Mark.Middle, "no tolerance to compare with");
    }

    private static RowColumn[] Columns(BoxRow[] rows) =>
    [
        new("parts list", [.. rows.Select(r => r.Limits.Text(r.Unit))]),
        new("median", [.. rows.Select(r => Words.Value(r.Values.Median, r.Unit))]),
        new("spread", [.. rows.Select(r => EngineeringNotation.Format(r.Values.Spread, r.Unit, 2))]),
        new("boards", [.. rows.Select(r => r.Values.Count.ToString(CultureInfo.InvariantCulture))]),
        new("outliers", [.. rows.Select(r => r.Values.Outliers.Length.ToString(CultureInfo.InvariantCulture))]),
    ];
}
