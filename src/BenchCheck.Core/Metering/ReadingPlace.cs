namespace BenchCheck.Core.Metering;

/// <summary>Where a reading is taken, in words, the condition left out.</summary>
public static class ReadingPlace
{
    /// <summary>"C1", "C1 to E1", "R3 current", "IN input resistance", "OUT over IN gain".</summary>
    /// <param name="reference">the board's reference node, which goes without saying</param>
    public static string Words(ReadingQuantity quantity, string at, string? against, string reference)
    {
        var isRatio = quantity is ReadingQuantity.Gain or ReadingQuantity.CurrentGain;
        var where = against is null || against == reference ? at : isRatio ? $"{at} over {against}" : $"{at} to {against}";

        // The unit and the condition tell a voltage from a resistance.
        return quantity is ReadingQuantity.Voltage or ReadingQuantity.Resistance ? where : $"{where} {quantity.Name()}";
    }

    public static string Words(this Reading reading, string reference)
    {
        ArgumentNullException.ThrowIfNull(reading);
        return Words(reading.Quantity, reading.At, reading.Against, reference);
    }

    public static string Words(this Probe probe, string reference)
    {
        ArgumentNullException.ThrowIfNull(probe);
        return Words(probe.Quantity, probe.At, probe.Against, reference);
    }
}
