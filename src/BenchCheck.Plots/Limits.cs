using BenchCheck.Core.Checking;
using BenchCheck.Core.Quantities;

namespace BenchCheck.Plots;

/// <summary>What the parts list says of a number, in its unit: nominal value and both ends of the tolerance; NaN for what it does not say.</summary>
public readonly record struct Limits(double Low, double Nominal, double High)
{
    /// <summary>The parts list says nothing.</summary>
    public static Limits None { get; } = new(double.NaN, double.NaN, double.NaN);

    public static Limits Of(Estimate estimate)
    {
        ArgumentNullException.ThrowIfNull(estimate);
        return double.IsNaN(estimate.Nominal) ? None : new Limits(estimate.NominalLow, estimate.Nominal, estimate.NominalHigh);
    }

    public bool AreKnown => double.IsFinite(Low) && double.IsFinite(High);

    /// <summary>Beyond either end; never where no limits are known.</summary>
    public bool Exclude(double value) => AreKnown && (value < Low || value > High);

    /// <summary>Position with nominal at 0 and the ends at −1 and 1; NaN where there is no tolerance to measure by.</summary>
    internal double Position(double value)
    {
        var room = value < Nominal ? Nominal - Low : High - Nominal;
        return room > 0 && double.IsFinite(room) ? (value - Nominal) / room : double.NaN;
    }

    /// <summary>The same on a logarithmic scale, for numbers whose error is a matter of proportion.</summary>
    internal Limits Logarithms => new(Math.Log(Low), Math.Log(Nominal), Math.Log(High));

    /// <summary>"4.465..4.935 kΩ"; "?" where nothing is known, the value alone where it has no tolerance.</summary>
    internal string Text(Unit unit) =>
        !AreKnown ? "?" : Low == High ? EngineeringNotation.Format(Low, unit) : EngineeringNotation.Range(Low, High, unit, 4);
}
