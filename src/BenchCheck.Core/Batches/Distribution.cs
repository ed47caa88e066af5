using System.Collections.Immutable;
using MathNet.Numerics.Statistics;

namespace BenchCheck.Core.Batches;

/// <summary>How one number is distributed over a batch.</summary>
/// <param name="Mean">arithmetic mean</param>
/// <param name="Spread">sample standard deviation, n − 1; NaN for a single value</param>
/// <param name="Percentiles">5th, 25th, 50th, 75th and 95th, by the rule p(n + 1) of the NIST/SEMATECH handbook, 7.2.6.2</param>
/// <param name="Outliers">values beyond the outer fences, three interquartile ranges outside the quartiles (NIST/SEMATECH handbook, 7.1.6), farthest first</param>
/// <param name="IsSampled">percentiles and outliers come from a random sample of the values, for there were too many to keep</param>
public sealed record Distribution(
    long Count, double Mean, double Spread, double Least, double Greatest, ImmutableArray<double> Percentiles, ImmutableArray<BatchValue> Outliers, bool IsSampled)
{
    public double Median => Percentiles[2];
}

/// <summary>A value of one board.</summary>
public readonly record struct BatchValue(string? Serial, double Value);

/// <summary>Collects the values of one number over a batch; memory stays bounded.</summary>
public sealed class DistributionBuilder
{
    /// <summary>Values kept for percentiles; beyond it a sample in which every value is as likely as any other (reservoir, Vitter 1985).</summary>
    public const int MostKept = 200_000;

    private const int FewestForOutliers = 8;
    private const double OuterFence = 3;
    private static readonly double[] Levels = [0.05, 0.25, 0.5, 0.75, 0.95];

    private readonly RunningStatistics running = new();
    private readonly List<BatchValue> kept = [];
    private readonly Random draw = new(1);

    /// <summary>The values kept, in the order in which they came until there were too many.</summary>
    public IReadOnlyList<BatchValue> Kept => kept;

    /// <summary>Takes a value in; one that is not finite is left out.</summary>
    public void Add(string? serial, double value)
    {
        if (!double.IsFinite(value)) return;
        running.Push(value);
        if (kept.Count < MostKept)
        {
            kept.Add(new BatchValue(serial, value));
            return;
        }

        var place = draw.NextInt64(running.Count);
        if (place < MostKept) kept[(int)place] = new BatchValue(serial, value);
    }

    /// <summary>The distribution of what came so far; null when nothing did.</summary>
    public Distribution? Build()
    {
        if (kept.Count == 0) return null;
        double[] sorted = [.. kept.Select(k => k.Value).Order()];
        ImmutableArray<double> percentiles = [.. Levels.Select(p => SortedArrayStatistics.QuantileCustom(sorted, p, QuantileDefinition.R6))];
        var range = percentiles[3] - percentiles[1];
        var (low, high) = (percentiles[1] - OuterFence * range, percentiles[3] + OuterFence * range);
        return new Distribution(
            running.Count, running.Mean, running.StandardDeviation, running.Minimum, running.Maximum, percentiles,
            kept.Count < FewestForOutliers ? [] : [.. kept.Where(k => k.Value < low || k.Value > high).OrderByDescending(k => Math.Abs(k.Value - percentiles[2]))],
            running.Count > kept.Count);
    }
}
