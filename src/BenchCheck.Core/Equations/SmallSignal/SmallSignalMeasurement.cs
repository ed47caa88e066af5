namespace BenchCheck.Core.Equations.SmallSignal;

/// <summary>Two unknowns of a network, the second subtracted from the first: a pair of nodes, or a branch current alone; −1 stands for zero.</summary>
public readonly record struct Pair(int High, int Low)
{
    /// <summary>No pair: every transfer to or from it is zero.</summary>
    public static readonly Pair None = new(-1, -1);

    public bool IsNone => High < 0 && Low < 0;
}

/// <summary>A small-signal reading as a function of transfers T(c, d): what is seen at c for a unit current driven into d.</summary>
/// <remarks>
/// Transfer: y = Scale · T(Seen, Driven) / (T(Base, Driven) + Ohms), with the meter's conductance across Seen. A voltage ratio has the driven
/// nodes, or others, as Base; a voltage of a stated drive has Base = Driven, Scale = volts, Ohms = source resistance; a ratio to the driven
/// current has no Base and Ohms = 1. Impedance: y = T(Seen, Seen) with the nodes Driven closed through Ohms.
/// </remarks>
/// <param name="IsMagnitude">the meter shows no sign: the absolute value is taken</param>
public readonly record struct SmallSignalMeasurement(
    bool IsImpedance, Pair Seen, Pair Driven, Pair Base, double Scale, double Ohms, double LoadSiemens, bool IsMagnitude)
{
    /// <summary>Ratio of two unknowns' responses to one drive; the ratio to the driving current itself when <paramref name="over"/> is none.</summary>
    public static SmallSignalMeasurement Ratio(Pair seen, Pair over, Pair driven, double loadSiemens, bool isMagnitude) =>
        new(false, seen, driven, over, 1, over.IsNone ? 1 : 0, loadSiemens, isMagnitude);

    /// <summary>RMS voltage between two nodes for a generator of <paramref name="volts"/> behind <paramref name="sourceOhms"/>.</summary>
    public static SmallSignalMeasurement Voltage(Pair seen, Pair driven, double volts, double sourceOhms, double loadSiemens) =>
        new(false, seen, driven, driven, volts, sourceOhms, loadSiemens, true);

    /// <summary>Resistance looking in between two nodes; a generator at <paramref name="closed"/> is dead, its resistance stays.</summary>
    public static SmallSignalMeasurement Impedance(Pair seen, Pair closed, double sourceOhms) =>
        new(true, seen, closed, Pair.None, 1, sourceOhms, 0, true);
}
