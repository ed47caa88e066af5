using BenchCheck.Core.Quantities;

namespace BenchCheck.Files;

/// <summary>The values that a number of a bench board can have; anything else is a slip of the pen and refused.</summary>
/// <param name="Smallest">lower end, itself allowed</param>
/// <param name="Largest">upper end, itself allowed</param>
/// <param name="Unit">of both ends, for messages</param>
/// <param name="IsPositive">zero and below are refused even within the limits, for the tolerance's lower end as well</param>
/// <param name="Hint">what was probably meant</param>
internal sealed record Limits(double Smallest, double Largest, Unit Unit, bool IsPositive = false, string? Hint = null)
{
    public static readonly Limits Resistance = new(1e-6, 1e12, Unit.Ohm, true, "a zero-ohm link is kind = \"jumper\"");
    public static readonly Limits SeriesResistance = new(1e-6, 1e9, Unit.Ohm, true, "leave the key out where there is none");
    public static readonly Limits LinkResistance = new(0, 10, Unit.Ohm, false, "above 10 Ω it is a resistor");
    public static readonly Limits InputResistance = new(1e3, 1e15, Unit.Ohm);
    public static readonly Limits Volts = new(-10e3, 10e3, Unit.Volt, false, "M is mega, m is milli");
    public static readonly Limits PositiveVolts = new(1e-3, 10e3, Unit.Volt, true, "M is mega, m is milli");
    public static readonly Limits Drop = new(0.01, 20, Unit.Volt, true, "a drop is given as a positive voltage");
    public static readonly Limits Saturation = new(0, 5, Unit.Volt);
    public static readonly Limits OffsetVolts = new(-10, 10, Unit.Volt);
    public static readonly Limits Headroom = new(0, 100, Unit.Volt);
    public static readonly Limits Amperes = new(-1e3, 1e3, Unit.Ampere, false, "M is mega, m is milli");
    public static readonly Limits StatedAmperes = new(1e-9, 1e3, Unit.Ampere, true, "the current at which the data sheet states gain, drop or breakdown");
    public static readonly Limits Farads = new(1e-15, 1e3, Unit.Farad, true, "capacitances are written as 10 uF, 4n7");
    public static readonly Limits Henries = new(1e-12, 1e5, Unit.Henry, true);
    public static readonly Limits TransistorGain = new(0.01, 1e6, Unit.One, true);
    public static readonly Limits AmplifierGain = new(1, 1e12, Unit.One, true);
    public static readonly Limits ControlledGain = new(1e-12, 1e12, Unit.One, true, "for the other sign exchange the plus and minus pins");
    public static readonly Limits Position = new(0, 1, Unit.One, false, "0 with the wiper at the low end, 1 at the high end");
    public static readonly Limits Watts = new(1e-6, 1e5, Unit.Watt, true);
    public static readonly Limits Hertz = new(1e-6, 1e12, Unit.Hertz, true);
    public static readonly Limits Celsius = new(-100, 300, Unit.Celsius);

    /// <summary>What was expected instead, or null when value and tolerance are possible.</summary>
    public string? Check(double value, double low, double high)
    {
        if (value < Smallest || value > Largest || (IsPositive && value <= 0))
            return $"{EngineeringNotation.Format(Smallest, Unit, 1)} to {EngineeringNotation.Format(Largest, Unit, 1)}";
        if (IsPositive && low <= 0) return "a tolerance that leaves the value above zero";
        return high > 10 * Largest ? "a tolerance within what is possible" : null;
    }
}
