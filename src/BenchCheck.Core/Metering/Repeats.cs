using MathNet.Numerics.Statistics;

namespace BenchCheck.Core.Metering;

/// <summary>Repeats of one reading, taken together (type A evaluation, JCGM 100:2008, 4.2).</summary>
/// <param name="Count">n, at least one</param>
/// <param name="Mean">arithmetic mean (4.2.1), in the unit of the readings</param>
/// <param name="Deviation">experimental standard deviation s of one reading (4.2.2); zero for a single one, which tells nothing of scatter</param>
public readonly record struct Repeats(int Count, double Mean, double Deviation)
{
    /// <summary>Experimental standard deviation of the mean, s/√n (4.2.3).</summary>
    public double Uncertainty => Deviation / Math.Sqrt(Count);

    /// <summary>ν = n − 1 (G.3.3).</summary>
    public int DegreesOfFreedom => Count - 1;

    /// <exception cref="ArgumentException">no values</exception>
    public static Repeats Of(double[] values)
    {
        ArgumentNullException.ThrowIfNull(values);
        if (values.Length == 0) throw new ArgumentException("no readings to take together", nameof(values));
        var (mean, deviation) = values.MeanStandardDeviation();
        return new Repeats(values.Length, mean, values.Length == 1 ? 0 : deviation);
    }

    /// <summary>Groups of repeats of the same reading as one: their squares within and between the groups add up.</summary>
    /// <exception cref="ArgumentException">no groups</exception>
    public static Repeats Pooled(IReadOnlyCollection<Repeats> groups)
    {
        ArgumentNullException.ThrowIfNull(groups);
        if (groups.Count == 0) throw new ArgumentException("no readings to take together", nameof(groups));
        var count = groups.Sum(g => g.Count);
        var first = groups.First().Mean;
        var mean = first + (groups.Sum(g => g.Count * (g.Mean - first)) / count);
        var squares = groups.Sum(g => ((g.Count - 1) * g.Deviation * g.Deviation) + (g.Count * (g.Mean - mean) * (g.Mean - mean)));
        return new Repeats(count, mean, count == 1 ? 0 : Math.Sqrt(squares / (count - 1)));
    }
}
