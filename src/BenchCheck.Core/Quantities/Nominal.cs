namespace BenchCheck.Core.Quantities;

/// <summary>
/// What a parts list says of one number: a value with its tolerance ("47k 5%"), a range ("80..320"), or that it is unknown ("?").
/// </summary>
/// <remarks>
/// Invariant: unless unknown, <see cref="Low"/> ≤ <see cref="Value"/> ≤ <see cref="High"/>, all finite. An unknown has
/// <see cref="Value"/> NaN and the whole axis as its interval.
/// </remarks>
public sealed record Nominal
{
    private Nominal(double value, double low, double high, bool assumed)
    {
        Value = value;
        Low = low;
        High = high;
        ToleranceAssumed = assumed;
    }

    /// <summary>The number the list names; the geometric middle of a positive range, else its arithmetic middle; NaN when unknown.</summary>
    public double Value { get; }

    public double Low { get; }

    public double High { get; }

    /// <summary>True when the list stated no tolerance and the default of the part's kind was taken.</summary>
    public bool ToleranceAssumed { get; }

    public bool IsUnknown => double.IsNaN(Value);

    public static Nominal Unknown { get; } = new(double.NaN, double.NegativeInfinity, double.PositiveInfinity, false);

    public static Nominal Within(double value, Tolerance tolerance, bool assumed = false)
    {
        if (!double.IsFinite(value)) throw new ArgumentOutOfRangeException(nameof(value), value, "a nominal value is finite");
        var half = tolerance.Around(value);
        return new Nominal(value, value - half, value + half, assumed);
    }

    public static Nominal Exactly(double value) => Within(value, Tolerance.Absolute(0));

    public static Nominal Between(double low, double high)
    {
        if (!double.IsFinite(low) || !double.IsFinite(high) || low > high)
            throw new ArgumentOutOfRangeException(nameof(low), low, "a range runs from its lower to its higher end");
        return new Nominal(low > 0 ? Math.Sqrt(low * high) : (low + high) / 2, low, high, false);
    }
}
