using BenchCheck.Core.Quantities;

namespace BenchCheck.Core.Metering;

/// <summary>Where and how a reading is taken, without its value: all that a prediction needs.</summary>
/// <param name="At">a node; for a current a part or a pin</param>
/// <param name="Against">the other node; null for a current</param>
/// <param name="Range">full scale of the meter's range, in SI units</param>
public sealed record Probe(string Condition, ReadingQuantity Quantity, string At, string? Against, Meter Meter, double Range)
{
    /// <summary>The function of the meter in use; that of <see cref="Meter.Usual"/> when the meter's description lacks it.</summary>
    public MeterFunction Function => Of(Meter) ?? Of(Meter.Usual) ?? MeterFunction.Ratio;

    /// <summary>True for a reading of small signals: an AC voltage is then another function of the meter.</summary>
    public bool IsSmallSignal { get; init; }

    /// <summary>True when a ratio is compared without its sign: an AC meter shows none, so a sign counts only where the reading is negative.</summary>
    public bool IsMagnitude { get; init; }

    /// <summary>Same quantity, both at rest or both of small signals: values that compare in size.</summary>
    public bool IsLike(Probe other)
    {
        ArgumentNullException.ThrowIfNull(other);
        return Quantity == other.Quantity && IsSmallSignal == other.IsSmallSignal;
    }

    public static Probe Of(Bench bench, Reading reading)
    {
        ArgumentNullException.ThrowIfNull(bench);
        ArgumentNullException.ThrowIfNull(reading);
        var meter = bench.MeterOf(reading);
        var probe = new Probe(reading.Condition, reading.Quantity, reading.At, reading.Against, meter, 0)
        {
            IsSmallSignal = bench.Board.FindCondition(reading.Condition) is { IsSmallSignal: true },
            IsMagnitude = reading.Value >= 0,
        };
        return probe with { Range = probe.IsRatio ? Math.Abs(reading.Value) : reading.Range ?? probe.Function.RangeFor(reading.Value) };
    }

    /// <summary>A quantity that is worked out from two readings of a signal: its accuracy is its own, shared with no other reading.</summary>
    public bool IsRatio => Quantity is ReadingQuantity.Gain or ReadingQuantity.CurrentGain or ReadingQuantity.InputResistance or ReadingQuantity.OutputResistance;

    /// <summary>
    /// Standard uncertainty of what is each reading's own: the fixed part of the accuracy, rectangular of half-width counts · resolution
    /// (JCGM 100:2008, 4.3.7); for a ratio, whose <see cref="Range"/> is its value, the whole of it.
    /// </summary>
    public double OwnUncertainty => IsRatio
        ? Math.Max(StandardUncertainty.Rectangular(Function.ReadingFraction * Range), Quantity.Unit() == Unit.One ? LeastRatio : 0)
        : StandardUncertainty.Rectangular(Function.Counts * Range / Meter.FullScaleCounts);

    /// <summary>No ratio of two AC readings is known better than this; common practice, no source.</summary>
    private const double LeastRatio = 1e-3;

    /// <summary>
    /// Standard uncertainty of the scale error, as a fraction of the reading: rectangular. It is common to all readings of one meter,
    /// function and range (JCGM 100:2008, F.1.2).
    /// </summary>
    public double ScaleUncertainty => IsRatio ? 0 : StandardUncertainty.Rectangular(Function.ReadingFraction);

    /// <summary>Name of what shares the scale error.</summary>
    public string ScaleGroupName => $"{Meter.Name}, {Quantity.Name()}, {EngineeringNotation.Format(Range, Quantity.Unit(), 2)} range";

    /// <summary>What shares the scale error: "handheld, voltage, 6 V range".</summary>
    public (string Meter, ReadingQuantity Function, double Range) ScaleGroup => (Meter.Name, Quantity, Range);

    private MeterFunction? Of(Meter meter) => IsSmallSignal && Quantity == ReadingQuantity.Voltage ? meter.AlternatingVoltage : meter.FunctionFor(Quantity);
}
