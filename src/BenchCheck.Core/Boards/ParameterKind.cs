using BenchCheck.Core.Quantities;

namespace BenchCheck.Core.Boards;

/// <summary>What a number of a part is; the names are those of the result files.</summary>
/// <param name="Name">trade name, as printed and as written in JSON</param>
/// <param name="Unit">unit of the number</param>
/// <param name="IsRatioScale">
/// true when the number is positive and its uncertainty is a matter of proportion (a resistance, a gain): the fit then moves its logarithm
/// </param>
/// <param name="IsReported">
/// false for a nuisance number that the fit must allow for but that no reading of this kind of board is taken to find (a reverse gain)
/// </param>
public sealed record ParameterKind(string Name, Unit Unit, bool IsRatioScale, bool IsReported = true)
{
    public static readonly ParameterKind Resistance = new("resistance", Unit.Ohm, true);
    public static readonly ParameterKind Gain = new("gain", Unit.One, true);
    public static readonly ParameterKind Drop = new("drop", Unit.Volt, false);
    public static readonly ParameterKind Breakdown = new("breakdown", Unit.Volt, false);
    public static readonly ParameterKind Voltage = new("voltage", Unit.Volt, false);
    public static readonly ParameterKind Current = new("current", Unit.Ampere, false);
    public static readonly ParameterKind Position = new("position", Unit.One, false);
    public static readonly ParameterKind Transconductance = new("transconductance", Unit.Siemens, true);
    public static readonly ParameterKind Capacitance = new("capacitance", Unit.Farad, true);
    public static readonly ParameterKind Inductance = new("inductance", Unit.Henry, true);

    /// <summary>Resistance between collector and emitter, or drain and source, that small changes meet.</summary>
    public static readonly ParameterKind OutputResistance = new("output resistance", Unit.Ohm, true);

    public static readonly ParameterKind ScaleError = new("scale error", Unit.One, false);

    /// <summary>Gain of a transistor with collector and emitter exchanged; seen only through its saturation voltage.</summary>
    public static readonly ParameterKind ReverseGain = new("reverse gain", Unit.One, true, false);

    /// <summary>Logarithm of how much a gain differs in one condition from its mean over all.</summary>
    public static readonly ParameterKind GainDrift = new("gain drift", Unit.One, false, false);

    /// <summary>Emission coefficient of a junction: how many thermal voltages its drop rises for a current e times as large.</summary>
    public static readonly ParameterKind Ideality = new("ideality", Unit.One, true, false);

    /// <summary>Resistance in series with a junction: leads, bulk, and a transistor's base as seen from its collector current.</summary>
    public static readonly ParameterKind SeriesResistance = new("series resistance", Unit.Ohm, true, false);

    /// <summary>Offset voltage of an op-amp's input; what remains of a saturation voltage beyond its junctions.</summary>
    public static readonly ParameterKind Offset = new("offset", Unit.Volt, false, false);

    /// <summary>Gate-source voltage at which a MOSFET begins to conduct.</summary>
    public static readonly ParameterKind Threshold = new("threshold", Unit.Volt, false);

    /// <summary>Least voltage that a regulator keeps between its input and its output.</summary>
    public static readonly ParameterKind DropOut = new("drop-out", Unit.Volt, true, false);

    /// <summary>Current that a regulator draws for itself.</summary>
    public static readonly ParameterKind IdleCurrent = new("idle current", Unit.Ampere, true, false);

    /// <summary>True for a number that only readings at a stated frequency can tell.</summary>
    public bool IsReactive => ReferenceEquals(this, Capacitance) || ReferenceEquals(this, Inductance);

    /// <summary>True for a number that only small-signal readings can tell.</summary>
    public bool IsSmallSignal => IsReactive || ReferenceEquals(this, OutputResistance);

    public override string ToString() => Name;
}
