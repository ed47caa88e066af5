using BenchCheck.Core.Metering;

namespace BenchCheck.Benchmarks.Scoreboard.Physics;

/// <summary>One real meter: each function and range has its own scale error within the specification.</summary>
public sealed class TruthMeter
{
    private readonly Meter meter;
    private readonly Draw draw;
    private readonly Dictionary<(ReadingQuantity, double), double> scale = [];

    public TruthMeter(Meter meter, Draw draw)
    {
        this.meter = meter;
        this.draw = draw;
        foreach (var quantity in new[] { ReadingQuantity.Voltage, ReadingQuantity.Resistance })
        {
            if (meter.FunctionFor(quantity) is not { } function) continue;
            foreach (var range in function.Ranges) scale[(quantity, range)] = draw.Uniform(-function.ReadingFraction, function.ReadingFraction);
        }
    }

    /// <summary>What the meter shows of a value, on the lowest range that shows it: scale error, counts error, rounding.</summary>
    public double Shown(ReadingQuantity quantity, double value)
    {
        var function = meter.FunctionFor(quantity)!;
        var range = function.RangeFor(value);
        var resolution = range / meter.FullScaleCounts;
        var off = value * (1 + scale.GetValueOrDefault((quantity, range))) + draw.Uniform(-function.Counts, function.Counts) * resolution;
        var counts = Math.Round(off / resolution);

        // From the counts as a decimal number, as the display has it: 0.652, not 0.65200000000000002.
        return counts == 0 ? 0 : double.Parse((counts * resolution).ToString("G12", System.Globalization.CultureInfo.InvariantCulture), System.Globalization.CultureInfo.InvariantCulture);
    }
}
