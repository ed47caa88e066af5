using System.Collections.Immutable;

namespace BenchCheck.Core.Metering;

/// <summary>One measured quantity, its repeats already combined.</summary>
/// <param name="Lines">lines of the readings file that it came from; one, or several for repeats; empty when typed in</param>
/// <param name="Condition">name of the condition it was taken in</param>
/// <param name="At">a node; for a current a part ("R3") or a pin ("Q1.base")</param>
/// <param name="Against">the other node; null for a current</param>
/// <param name="Value">mean of the repeats, in the SI unit of the quantity</param>
public sealed record Reading(
    ImmutableArray<int> Lines, string Condition, ReadingQuantity Quantity, string At, string? Against, double Value)
{
    /// <summary>Name of the meter used; null for the board's first.</summary>
    public string? Meter { get; init; }

    /// <summary>Full scale of the range used, in SI units, when the file tells; else the lowest range that shows the value is taken.</summary>
    public double? Range { get; init; }

    /// <summary>Standard uncertainty as stated with the reading, which then stands in place of the meter's accuracy.</summary>
    public double? StatedUncertainty { get; init; }

    /// <summary>How many repeats the value is the mean of.</summary>
    public int Repeats { get; init; } = 1;

    /// <summary>Experimental standard deviation of the mean (JCGM 100:2008, 4.2.3); zero for a single reading.</summary>
    public double RepeatUncertainty { get; init; }

    public DateTimeOffset? Time { get; init; }

    public string? Note { get; init; }

    /// <summary>Same place, quantity and condition: repeats of one reading.</summary>
    public bool IsRepeatOf(Reading other) =>
        Condition == other.Condition && Quantity == other.Quantity && At == other.At && Against == other.Against && Meter == other.Meter
        && Range == other.Range;
}
