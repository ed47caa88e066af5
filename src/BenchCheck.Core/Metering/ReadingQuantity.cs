using BenchCheck.Core.Quantities;

namespace BenchCheck.Core.Metering;

/// <summary>What a reading measures; the names are those of the readings file.</summary>
public enum ReadingQuantity
{
    Voltage,
    Current,
    Resistance,
    Gain,
    CurrentGain,
    InputResistance,
    OutputResistance,
}

public static class ReadingQuantities
{
    public static string Name(this ReadingQuantity quantity) => quantity switch
    {
        ReadingQuantity.Voltage => "voltage",
        ReadingQuantity.Current => "current",
        ReadingQuantity.Resistance => "resistance",
        ReadingQuantity.Gain => "gain",
        ReadingQuantity.CurrentGain => "current gain",
        ReadingQuantity.InputResistance => "input resistance",
        ReadingQuantity.OutputResistance => "output resistance",
        _ => throw new ArgumentOutOfRangeException(nameof(quantity)),
    };

    public static Unit Unit(this ReadingQuantity quantity) => quantity switch
    {
        ReadingQuantity.Voltage => Quantities.Unit.Volt,
        ReadingQuantity.Current => Quantities.Unit.Ampere,
        ReadingQuantity.Gain or ReadingQuantity.CurrentGain => Quantities.Unit.One,
        _ => Quantities.Unit.Ohm,
    };
}
