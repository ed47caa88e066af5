using System.Collections.Immutable;
using System.Globalization;
using BenchCheck.Core.Checking;
using BenchCheck.Core.Metering;
using BenchCheck.Plots.Figures;
using BenchCheck.Plots.Typefaces;
using ScottPlot;

namespace BenchCheck.Plots;

/// <summary>Predicted band against measured, and what is left after the fit: a row a reading.</summary>
/// <remarks>
/// Readings of volts, amperes and ohms share one axis because each difference is divided by its own expanded uncertainty, which makes it the
/// normalised error En of ISO 13528: within ±1 the reading agrees with the design. The predicted band is drawn on the same scale.
/// </remarks>
public static class ReadingPlot
{
    private const int Width = 1000;
    private const int NarrowWidth = 560;
    private const double BandReach = 3;
    private const double ResidualReach = 5;

    /// <summary>Standard uncertainties to each side of a measured value that its whisker shows.</summary>
    private const double Whisker = 2;

    /// <summary>Share of the panels' room that the band takes beside the residuals.</summary>
    private const float BandShare = 0.54f;

    private static readonly ImmutableArray<KeyEntry> Verdicts = [new MarkKey(Mark.In, "in"), new MarkKey(Mark.Doubtful, "doubtful"), new MarkKey(Mark.Out, "out of tolerance")];

    private static readonly ImmutableArray<KeyEntry> BandKey =
    [
        new BarKey(Ink.Band, 11, "predicted band (part tolerances)"), new BarKey(Ink.Text, 1.5f, "reading ± 2 standard uncertainties"),
        new BarKey(Ink.Expected, 16, "|En| ≤ 1: difference within its expanded uncertainty"),
    ];

    private static readonly ImmutableArray<KeyEntry> ResidualKey = [new UprightKey(Ink.Limit, 1, "residual guides at ±2 (dashed) and ±3")];

    /// <summary>Both panels side by side with the numbers at the right.</summary>
    public static Figure Of(CheckResult result)
    {
        ArgumentNullException.ThrowIfNull(result);
        var rows = Rows(result);
        var figure = new RowFigure(Width, Names(result, rows), Columns(rows));
        var room = figure.PanelRoom(2);
        return figure.Compose(
            Heading.BoardAndSerial(result), Heading.Of(result), Describe(result),
            [Bands(rows, room * BandShare), Residuals(rows, room * (1 - BandShare))],
            [.. Verdicts, .. BandKey, .. ResidualKey], Note(result, rows));
    }

    /// <summary>Only the predicted band against measured, narrow: for a page that gives the numbers in a table.</summary>
    public static Figure Bands(CheckResult result)
    {
        ArgumentNullException.ThrowIfNull(result);
        var rows = Rows(result);
        var figure = new RowFigure(NarrowWidth, Names(result, rows), []);
        return figure.Compose("Predicted band and measured value", null, Describe(result), [Bands(rows, figure.PanelRoom(1))], [.. Verdicts, .. BandKey], Note(result, rows));
    }

    /// <summary>Only the normalised residuals after the fit, narrow.</summary>
    public static Figure Residuals(CheckResult result)
    {
        ArgumentNullException.ThrowIfNull(result);
        var rows = Rows(result);
        var figure = new RowFigure(NarrowWidth, Names(result, rows), []);
        return figure.Compose("Residuals after the fit", null, DescribeResiduals(result), [Residuals(rows, figure.PanelRoom(1))], [.. Verdicts, .. ResidualKey], Note(result, rows));
    }

    /// <summary>All readings in their order; of too many, those that differ most.</summary>
    private static ImmutableArray<ReadingResult> Rows(CheckResult result)
    {
        if (result.Readings.Length <= RowFigure.MostRows) return result.Readings;
        var kept = result.Readings.OrderByDescending(r => double.IsNaN(r.En) ? double.PositiveInfinity : Math.Abs(r.En)).Take(RowFigure.MostRows).ToHashSet();
        return [.. result.Readings.Where(kept.Contains)];
    }

    private static string Note(CheckResult result, ImmutableArray<ReadingResult> rows) =>
        rows.IsEmpty ? "There are no readings to draw."
        : rows.Length < result.Readings.Length ? string.Create(CultureInfo.InvariantCulture, $"The {rows.Length} readings that differ most are drawn; {result.Readings.Length - rows.Length} nearer to their prediction are not.")
        : "";

    private static IEnumerable<string> Names(CheckResult result, ImmutableArray<ReadingResult> rows)
    {
        var hasConditions = result.Readings.Select(r => r.Reading.Condition).Distinct().Skip(1).Any();
        return rows.Select(r => FigureText.Clean(r.Reading.Words(result.Reference) + (hasConditions ? $", {r.Reading.Condition}" : "")));
    }

    private static RowColumn[] Columns(ImmutableArray<ReadingResult> rows) =>
    [
        new("measured", [.. rows.Select(r => Words.Value(r.Reading.Value, r.Reading.Quantity.Unit()))]),
        new("predicted", [.. rows.Select(r => Words.Value(r.Predicted, r.Reading.Quantity.Unit()))]),
        new("En", [.. rows.Select(r => Words.Ratio(r.En))]),
        new("verdict", [.. rows.Select(r => Words.Of(r.Verdict))]),
    ];

    private static RowPanel Bands(ImmutableArray<ReadingResult> rows, float width)
    {
        var panel = new RowPanel("Measured against predicted", "normalised error En", BandReach, 1, rows.Length, width);
        panel.Expect(-1, 1);
        panel.Guide(0, LinePattern.Solid, Ink.Frame);
        for (var row = 0; row < rows.Length; row++)
        {
            var r = rows[row];
            var scale = r.ExpandedUncertainty;
            if (scale > 0 && double.IsFinite(scale))
            {
                panel.Bar(row, (r.BandLow - r.Predicted) / scale, (r.BandHigh - r.Predicted) / scale);
                panel.Line(row, r.En - Whisker * r.StandardUncertainty / scale, r.En + Whisker * r.StandardUncertainty / scale);
            }

            panel.Point(row, r.En, Mark.Of(r.Verdict), "no prediction");
        }

        return panel;
    }

    private static RowPanel Residuals(ImmutableArray<ReadingResult> rows, float width)
    {
        var panel = new RowPanel("Left after the fit", "normalised residual", ResidualReach, 1, rows.Length, width);
        panel.Guide(0, LinePattern.Solid, Ink.Frame);
        foreach (var side in new[] { -1, 1 })
        {
            panel.Guide(2 * side, LinePattern.Dashed, Ink.Limit);
            panel.Guide(3 * side, LinePattern.Solid, Ink.Limit);
        }

        for (var row = 0; row < rows.Length; row++) panel.Point(row, rows[row].NormalisedResidual, Mark.Of(rows[row].Verdict), "fitted exactly");
        return panel;
    }

    private static string Describe(CheckResult result)
    {
        var outside = result.Readings.Count(r => r.Verdict == ReadingVerdict.Out);
        var doubtful = result.Readings.Count(r => r.Verdict == ReadingVerdict.Doubtful);
        return string.Create(
            CultureInfo.InvariantCulture,
            $"{result.Readings.Length} readings against their predicted bands: {result.Readings.Length - outside - doubtful} in, {doubtful} doubtful, {outside} out of tolerance.");
    }

    private static string DescribeResiduals(CheckResult result)
    {
        var beyond = result.Readings.Count(r => Math.Abs(r.NormalisedResidual) > 3);
        return string.Create(CultureInfo.InvariantCulture, $"Normalised residuals of {result.Readings.Length} readings after the fit; {beyond} beyond ±3.");
    }
}
