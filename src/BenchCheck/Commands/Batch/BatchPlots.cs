using System.Collections.Immutable;
using System.Globalization;
using BenchCheck.Core.Batches;
using BenchCheck.Core.Boards;
using BenchCheck.Plots;
using BenchCheck.Plots.Figures;

namespace BenchCheck.Commands.Batch;

/// <summary>The pictures of a batch: one of all estimates, and of each estimate its histogram and its trend in the order of the boards.</summary>
internal static class BatchPlots
{
    /// <summary>Writes the pictures; those of an earlier run are replaced.</summary>
    /// <returns>false when one could not be written, which is then said</returns>
    public static bool Write(string folder, Board board, BatchSummary summary, Terminal terminal)
    {
        Directory.CreateDirectory(folder);
        var limits = BatchParameter.Of(board).ToDictionary(p => p.Name, p => LimitsOf(p), StringComparer.Ordinal);
        Limits Known(string name) => limits.GetValueOrDefault(name, Limits.None);
        var estimates = summary.Estimates;
        var isWhole = Save("estimates", BoxPlot.Of(board.Title, [.. estimates.Select(e => new BoxRow(e.Name, e.Unit, e.Distribution, Known(e.Name)))]));
        foreach (var (name, unit, distribution) in estimates)
        {
            var points = summary.PointsOf(name);
            isWhole &= Save($"{name} histogram", HistogramPlot.Of(board.Title, name, unit, [.. points.Select(p => p.Value)], Known(name)));
            // A sample has lost its order.
            if (distribution.IsSampled) continue;
            ImmutableArray<TrendPoint> trend = [.. points.Select(p => new TrendPoint(p.Serial ?? "", null, p.Value, double.NaN, double.NaN))];
            isWhole &= Save($"{name} trend", TrendPlot.InOrder(new Trend(board.Title, name, unit, trend, Known(name))));
        }

        if (isWhole) terminal.Error.WriteLine($"pictures are in {Printable.Text(folder)}");
        return isWhole;

        bool Save(string name, Figure figure)
        {
            var fault = figure.Save(Path.Combine(folder, FileName(name) + ".png"));
            if (fault is not null) terminal.Error.WriteLine(Printable.Text(fault.ToString()));
            return fault is null;
        }
    }

    private static Limits LimitsOf(BatchParameter parameter) =>
        parameter.Nominal.IsUnknown ? Limits.None : new Limits(parameter.Nominal.Low, parameter.Nominal.Value, parameter.Nominal.High);

    /// <summary>"Q1-gain-trend": letters and digits of ASCII, every other character as its number, so that two names never share a file.</summary>
    private static string FileName(string name) => string.Concat(name.Select(c =>
        char.IsAsciiLetterOrDigit(c) ? c.ToString() : c == ' ' ? "-" : c is '(' or ')' ? "" : string.Create(CultureInfo.InvariantCulture, $"_{(int)c:X}")));
}
