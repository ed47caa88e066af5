using System.Collections.Immutable;

namespace BenchCheck.Core.Metering;

/// <summary>One function of a meter: its accuracy "fraction of reading + counts" and its ranges.</summary>
/// <param name="ReadingFraction">the of-reading part of the accuracy, 0.005 for 0.5 %</param>
/// <param name="Counts">the fixed part of the accuracy, in counts of the least digit</param>
/// <param name="Ranges">full scales in the SI unit of the function, ascending; empty when the meter has one range only that was not stated</param>
/// <param name="BurdenVolts">for current: voltage across the meter at full scale; zero for none</param>
/// <param name="TestVolts">for resistance: voltage across the leads at full scale</param>
public sealed record MeterFunction(double ReadingFraction, double Counts, ImmutableArray<double> Ranges, double BurdenVolts = 0, double TestVolts = 0.25)
{
    /// <summary>A ratio of two AC readings, or a resistance found from two: 2 %, that is twice the 1 % usual for AC; common practice, no source.</summary>
    public static MeterFunction Ratio { get; } = new(0.02, 0, []);

    /// <summary>The lowest range that shows <paramref name="value"/>; the highest when none does.</summary>
    public double RangeFor(double value)
    {
        foreach (var range in Ranges)
        {
            if (Math.Abs(value) <= range) return range;
        }

        return Ranges.IsEmpty ? Math.Abs(value) : Ranges[^1];
    }
}
