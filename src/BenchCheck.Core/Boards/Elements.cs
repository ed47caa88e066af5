namespace BenchCheck.Core.Boards;

/// <summary>What a dependent branch follows: the voltage between two nodes, or the current into the first pin of a named part.</summary>
public abstract record Control
{
    private Control()
    {
    }

    public sealed record NodePair(string Plus, string Minus) : Control;

    public sealed record PartCurrent(string Designator) : Control;
}

/// <summary>v = ohms · i between two pins.</summary>
public sealed record Conductor(int From, int To, Coefficient Ohms);

/// <summary>v(plus) − v(minus) = emf + gain · control + ohms · i, with i counted into the plus pin.</summary>
/// <param name="IsSupply">true when "supplies removed" lifts it off the board and a small-signal condition makes it AC ground</param>
public sealed record VoltageBranch(int Plus, int Minus, Coefficient Emf, Coefficient Ohms, Control? Control = null, Coefficient Gain = default, bool IsSupply = false);

/// <summary>A current amperes + gain · control that flows out of <paramref name="To"/> into the board and returns at <paramref name="From"/>.</summary>
public sealed record CurrentBranch(int From, int To, Coefficient Amperes, Control? Control = null, Coefficient Gain = default, bool IsSupply = false);

/// <summary>
/// A junction, or another one-way branch of that kind, with the current that it controls. With z ≥ 0 the controlling current, v the voltage from anode to cathode:
/// constant-drop law v = drop while z &gt; 0; junction law v = drop + n·V_T·ln(z / reference) (Shockley); either with a resistance in series.
/// z / gain flows from anode to cathode (z itself when <paramref name="Gain"/> is the constant one), and z flows from
/// <paramref name="TransportFrom"/> to <paramref name="TransportTo"/> when these are pins.
/// </summary>
/// <param name="Drop">voltage at the reference current</param>
/// <param name="Excess">a second voltage added to the drop (what a saturation voltage holds beyond its junctions); constant zero for none</param>
/// <param name="Gain">z over the current through the junction itself</param>
/// <param name="ReferenceAmperes">the current z at which the drop is stated</param>
/// <param name="Ideality">emission coefficient n, constant zero for a branch that keeps its drop at any current; for a breakdown the softness of its knee, likewise in thermal voltages a factor e</param>
/// <param name="SeriesOhms">resistance that z drops its own voltage across, beside the law</param>
/// <param name="Role">what its conduction means for the state of the part</param>
public sealed record Junction(
    int Anode, int Cathode, Coefficient Drop, Coefficient Excess, Coefficient Gain, int TransportFrom, int TransportTo,
    double ReferenceAmperes, Coefficient Ideality, Coefficient SeriesOhms, JunctionRole Role)
{
    /// <summary>Slope dz/dv to small signals while it conducts, where it is stated; constant zero for that of the law.</summary>
    public Coefficient Siemens { get; init; }
}

/// <summary>What a conducting junction is to its part.</summary>
public enum JunctionRole
{
    /// <summary>a diode's forward conduction</summary>
    Forward,

    /// <summary>a zener's reverse conduction</summary>
    Breakdown,

    /// <summary>a transistor's base-emitter junction</summary>
    BaseEmitter,

    /// <summary>a transistor's base-collector junction: conducting together with the other one it means saturation</summary>
    BaseCollector,

    /// <summary>a MOSFET's channel, opened by the gate against the source</summary>
    Channel,

    /// <summary>the same against the drain: together with the other one the switch is closed</summary>
    ReverseChannel,

    /// <summary>a regulator held at its stated voltage</summary>
    Reference,

    /// <summary>a regulator held below its input</summary>
    DropOut,

    /// <summary>a regulator's output stage</summary>
    Delivery,
}

/// <summary>
/// Drives <paramref name="Output"/> so that v(plus) − v(minus) + offset = v(output) / gain; a constant-zero gain stands for an ideal
/// amplifier, whose input difference is −offset.
/// </summary>
public sealed record AmplifierBranch(int Plus, int Minus, int Output, Coefficient Offset, Coefficient Gain);

/// <summary>
/// Keeps the output pin of the part's one driven branch (amplifier or voltage) below, or above, another pin by a margin; while the limit
/// acts, the branch gives up its own equation. This is an op-amp at its supply, a regulator in drop-out.
/// </summary>
/// <param name="Output">the pin that the branch drives</param>
/// <param name="Pin">the pin that sets the limit</param>
/// <param name="Margin">volts kept from that pin</param>
/// <param name="IsUpper">true: the output stays below pin − margin; false: above pin + margin</param>
public sealed record Limit(int Output, int Pin, Coefficient Margin, bool IsUpper);

/// <summary>A capacitance, or an inductance with its winding in series: what small signals meet beside the parts known at DC.</summary>
/// <param name="Value">farads or henries</param>
/// <param name="Ohms">resistance in series</param>
public sealed record Reactance(int From, int To, Coefficient Value, Coefficient Ohms, bool IsCapacitance);
