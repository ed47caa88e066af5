using MathNet.Numerics.Statistics;

namespace BenchCheck.Plots.Figures;

/// <summary>The part of an axis that shows most of some values and the limits they are held against.</summary>
/// <param name="Low">lower end, below <paramref name="High"/></param>
internal readonly record struct ValueRange(double Low, double High)
{
    /// <summary>Values are left beyond the axis when they lie so many times the spread of the middle half outside it.</summary>
    private const double Reach = 4;

    private const double Air = 0.06;

    /// <param name="values">finite, at least one</param>
    public static ValueRange Of(IReadOnlyCollection<double> values, Limits limits)
    {
        double[] sorted = [.. values.Order()];
        var (q1, q3) = (SortedArrayStatistics.LowerQuartile(sorted), SortedArrayStatistics.UpperQuartile(sorted));
        var fence = Reach * Math.Max(q3 - q1, limits.AreKnown ? (limits.High - limits.Low) / Reach : 0);
        var inside = sorted.Where(v => v >= q1 - fence && v <= q3 + fence).Concat(limits.AreKnown ? [limits.Low, limits.High] : Array.Empty<double>()).ToArray();
        var (low, high) = (inside.Min(), inside.Max());
        var span = high - low;
        if (!(span > 0)) span = Math.Max(Math.Abs(high) * 0.02, double.Epsilon * 1e20);
        return new ValueRange(low - Air * span, high + Air * span);
    }

    public bool Contains(double value) => value >= Low && value <= High;
}
