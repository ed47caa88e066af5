using System.Collections.Immutable;
using System.Globalization;
using BenchCheck.Core.Checking;
using BenchCheck.Core.Quantities;
using BenchCheck.Plots.Figures;
using BenchCheck.Plots.Typefaces;
using ScottPlot;

namespace BenchCheck.Plots;

/// <summary>What the parts really are against what the parts list says: a row a parameter, its tolerance scaled to ±1.</summary>
public static class EstimatePlot
{
    private const int Width = 1000;
    private const int NarrowWidth = 560;
    private const double Reach = 3;

    private static readonly ImmutableArray<KeyEntry> Signs =
    [
        new MarkKey(Mark.Determined, "determined by the readings"), new MarkKey(Mark.PartlyDetermined, "partly"), new MarkKey(Mark.Undetermined, "hardly or not"),
        new BarKey(Ink.Band, 11, "coverage interval"), new BarKey(Ink.Expected, 16, "tolerance of the parts list"),
    ];

    /// <summary>With the numbers at the right.</summary>
    public static Figure Of(CheckResult result)
    {
        ArgumentNullException.ThrowIfNull(result);
        return Drawn(result, Width, Heading.BoardAndSerial(result), Heading.Of(result), Columns(Rows(result)));
    }

    /// <summary>Narrow: for a page that gives the numbers in a table.</summary>
    public static Figure Narrow(CheckResult result)
    {
        ArgumentNullException.ThrowIfNull(result);
        return Drawn(result, NarrowWidth, "Estimates against tolerances", null, []);
    }

    private static Figure Drawn(CheckResult result, int width, string title, Heading? heading, RowColumn[] columns)
    {
        var rows = Rows(result);
        var figure = new RowFigure(width, rows.Select(e => FigureText.Clean(Words.Name(e))), columns);
        var panel = new RowPanel("Estimate in its tolerance", "distance from nominal; ±1 is the tolerance", Reach, 1, rows.Length, figure.PanelRoom(1));
        panel.Expect(-1, 1);
        panel.Guide(0, LinePattern.Solid, Ink.Frame);
        for (var row = 0; row < rows.Length; row++)
        {
            var e = rows[row];
            panel.Bar(row, Scaled(e, e.Low), Scaled(e, e.High));
            panel.Point(row, Scaled(e, e.Value), Mark.Of(e.Determined), "no tolerance to compare with");
        }

        return figure.Compose(title, heading, Describe(result), [panel], Signs, Note(result, rows));
    }

    /// <summary>Every parameter in its order; of too many, those that the readings determined best.</summary>
    private static ImmutableArray<Estimate> Rows(CheckResult result)
    {
        if (result.Parameters.Length <= RowFigure.MostRows) return result.Parameters;
        var kept = result.Parameters.OrderByDescending(e => e.Determined).Take(RowFigure.MostRows).ToHashSet();
        return [.. result.Parameters.Where(kept.Contains)];
    }

    private static string Note(CheckResult result, ImmutableArray<Estimate> rows) =>
        rows.IsEmpty ? "There are no estimates to draw."
        : rows.Length < result.Parameters.Length ? string.Create(CultureInfo.InvariantCulture, $"The {rows.Length} parameters that the readings determined best are drawn; {result.Parameters.Length - rows.Length} others are not.")
        : result.Verdict == BoardVerdict.Disagrees ? "Fitted as if the board had no fault, which its readings contradict."
        : "";

    /// <summary>
    /// Position on the axis: nominal 0, the ends of the tolerance −1 and 1, numbers on a ratio scale by their logarithms; NaN where the parts
    /// list sets no tolerance.
    /// </summary>
    private static double Scaled(Estimate e, double value) =>
        e.Kind.IsRatioScale ? Limits.Of(e).Logarithms.Position(Math.Log(value)) : Limits.Of(e).Position(value);

    private static RowColumn[] Columns(ImmutableArray<Estimate> rows) =>
    [
        new("parts list", [.. rows.Select(e => Limits.Of(e).Text(e.Kind.Unit))]),
        new("estimate", [.. rows.Select(e => EngineeringNotation.FormatWithUncertainty(e.Value, e.StandardUncertainty, e.Kind.Unit))]),
        new("determined", [.. rows.Select(e => Words.Of(e.Determined))]),
    ];

    private static string Describe(CheckResult result) => string.Create(
        CultureInfo.InvariantCulture,
        $"{result.Parameters.Length} estimates against the tolerances of the parts list: {result.Parameters.Count(e => e.Determined == Determination.Yes)} determined, {result.Parameters.Count(e => e.Determined == Determination.Partly)} partly.");
}
