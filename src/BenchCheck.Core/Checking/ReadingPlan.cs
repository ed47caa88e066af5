using System.Collections.Immutable;
using BenchCheck.Core.Metering;

namespace BenchCheck.Core.Checking;

/// <summary>Readings made ready for fitting: places, values, and the noise that is each reading's own.</summary>
/// <param name="Probes">where each reading was taken</param>
/// <param name="HasScaleError">which carry the meter's common scale error: all but those whose uncertainty was stated</param>
/// <param name="Measured">values in SI units</param>
/// <param name="Noise">variances: counts and repeats, or the stated uncertainty</param>
public sealed record ReadingPlan(ImmutableArray<Probe> Probes, ImmutableArray<bool> HasScaleError, double[] Measured, double[] Noise)
{
    /// <summary>Smallest noise taken, as a fraction of the range: a reading without any noise would have to be met exactly.</summary>
    private const double LeastNoise = 1e-7;

    public static ReadingPlan Of(Bench bench, ReadingSet readings)
    {
        ArgumentNullException.ThrowIfNull(readings);
        ImmutableArray<Probe> probes = [.. readings.Readings.Select(r => Probe.Of(bench, r))];
        var noise = new double[probes.Length];
        for (var i = 0; i < noise.Length; i++)
        {
            var reading = readings.Readings[i];
            var own = reading.StatedUncertainty ?? probes[i].OwnUncertainty;
            var least = LeastNoise * Math.Max(Math.Abs(reading.Value), Math.Abs(probes[i].Range) / 1000);
            noise[i] = Math.Max(own * own + reading.RepeatUncertainty * reading.RepeatUncertainty, least * least);
        }

        return new ReadingPlan(
            probes, [.. readings.Readings.Select(r => r.StatedUncertainty is null)], [.. readings.Readings.Select(r => r.Value)], noise);
    }

    /// <summary>Standard uncertainty of a reading as a whole: noise and scale error together (JCGM 100:2008, 5.1.2).</summary>
    public double StandardUncertainty(int i)
    {
        var scale = HasScaleError[i] ? Probes[i].ScaleUncertainty * Measured[i] : 0;
        return Math.Sqrt(Noise[i] + scale * scale);
    }
}
