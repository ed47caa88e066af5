using BenchCheck.Core.Quantities;

namespace BenchCheck.Files;

/// <summary>Tolerances taken where a parts list states a value without one: common practice, no source. Each use is stated to the user.</summary>
internal static class UsualTolerance
{
    public static readonly Tolerance Resistor = Tolerance.Percent(5);
    public static readonly Tolerance Potentiometer = Tolerance.Percent(20);
    public static readonly Tolerance Position = Tolerance.Absolute(0.05);
    public static readonly Tolerance Jumper = Tolerance.Percent(50);
    public static readonly Tolerance Supply = Tolerance.Percent(2);
    public static readonly Tolerance SeriesResistance = Tolerance.Percent(20);
    public static readonly Tolerance CurrentSource = Tolerance.Percent(5);
    public static readonly Tolerance Drop = Tolerance.Absolute(0.12);
    public static readonly Tolerance LedDrop = Tolerance.Absolute(0.2);
    public static readonly Tolerance Breakdown = Tolerance.Percent(5);
    public static readonly Tolerance TransistorGain = Tolerance.Percent(50);
    public static readonly Tolerance Saturation = Tolerance.Absolute(0.1);
    public static readonly Tolerance AmplifierGain = Tolerance.Percent(50);
    public static readonly Tolerance ControlledGain = Tolerance.Percent(5);
    public static readonly Tolerance OnResistance = Tolerance.Percent(50);
    public static readonly Tolerance Threshold = Tolerance.Percent(30);
    public static readonly Tolerance Regulator = Tolerance.Percent(4);
    public static readonly Tolerance DropOut = Tolerance.Percent(30);
    public static readonly Tolerance IdleCurrent = Tolerance.Percent(50);
    public static readonly Tolerance OutputResistance = Tolerance.Percent(50);
    public static readonly Tolerance Capacitor = Tolerance.Percent(20);
    public static readonly Tolerance Inductor = Tolerance.Percent(20);

    /// <summary>No supply is steadier than this on a bench: half-width in volts that a supply set by a condition, or to 0 V, keeps at least.</summary>
    public const double SupplyFloor = 0.010;

    /// <summary>Winding resistance of a small inductor when none is stated.</summary>
    public static readonly Nominal Winding = Nominal.Between(0.05, 20);

    /// <summary>A potentiometer somewhere between its ends; the ends keep a thousandth of the track.</summary>
    public static readonly Nominal AnyPosition = Nominal.Between(0.001, 0.999);
}
