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
}
