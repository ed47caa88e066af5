namespace BenchCheck.Core.Metering;

/// <summary>A meter: its loading and the accuracy of each function.</summary>
/// <param name="Name">as readings refer to it</param>
/// <param name="InputOhms">input resistance as a voltmeter; positive infinity for a meter that does not load</param>
/// <param name="FullScaleCounts">counts at full scale: 6000 means that the 6 V range resolves 1 mV</param>
/// <param name="Voltage">null when the meter does not have the function, or its accuracy was not stated</param>
/// <param name="Current">as above</param>
/// <param name="Resistance">as above</param>
public sealed record Meter(
    string Name, double InputOhms, int FullScaleCounts, MeterFunction? Voltage, MeterFunction? Current = null, MeterFunction? Resistance = null)
{
    /// <summary>What is taken when a board file describes no meter; typical of a hand-held of 6000 counts, common practice, no single source.</summary>
    public static Meter Usual { get; } = new(
        "hand-held", 10e6, 6000,
        new MeterFunction(0.005, 2, [0.6, 6, 60, 600]),
        new MeterFunction(0.01, 3, [600e-6, 6e-3, 60e-3, 0.6, 6]),
        new MeterFunction(0.008, 2, [600, 6e3, 60e3, 600e3, 6e6, 60e6]))
    {
        AlternatingVoltage = new MeterFunction(0.01, 3, [6e-3, 60e-3, 0.6, 6, 60, 600]),
    };

    /// <summary>RMS voltage of a signal; null when not stated.</summary>
    public MeterFunction? AlternatingVoltage { get; init; }

    public MeterFunction? FunctionFor(ReadingQuantity quantity) => quantity switch
    {
        ReadingQuantity.Voltage => Voltage,
        ReadingQuantity.Current => Current,
        ReadingQuantity.Resistance => Resistance,
        _ => MeterFunction.Ratio,
    };
}
