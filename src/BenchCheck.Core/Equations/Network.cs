using System.Collections.Immutable;
using BenchCheck.Core.Boards;

namespace BenchCheck.Core.Equations;

/// <summary>The equations of a board in one condition, compiled: which coefficient stands where, for any parameter vector θ.</summary>
/// <remarks>
/// Modified nodal analysis (Ho, Ruehli and Brennan, IEEE Trans. CAS-22 (1975)) with the junctions and limits drawn out as ports:
/// <code>
///   A(θ) x + C(θ) z = b(θ)        x: node voltages, then currents of voltage-defined branches
///   v = D x,  v ≤ law(z), z ≥ 0   one row of D and one column of C a port
/// </code>
/// A row of a node sums the currents that leave it. The reference node is no unknown; its index is −1. So that A is regular and well scaled
/// whatever the ports do, some of its elements are propped, and a straight-line port takes each prop away again: an island of nodes that only
/// junctions or very high resistances join to the rest is tied to it by a conductance, all of which is taken away but a leakage; an amplifier has
/// a gain below one, what it lacks of its own being added.
/// </remarks>
public sealed class Network
{
    internal const double LeakageSiemens = 1e-12;
    internal const double TieSiemens = 1e-4;

    /// <summary>Resistance above which a part ties nothing: an island that only such parts join gets a tie, too.</summary>
    internal const double WeakOhms = 1e6;

    /// <summary>Input over output of a propped amplifier.</summary>
    internal const double PropInverseGain = 10;

    /// <summary>Open-loop gain of an amplifier that states none: ideal to one part in ten million of its input.</summary>
    internal const double IdealGain = 1e7;

    internal readonly record struct CompiledConductor(int From, int To, Coefficient Ohms, int Part);

    internal enum ControlKind : byte
    {
        None,

        /// <summary>difference of two unknowns</summary>
        Pair,

        /// <summary>one unknown, a branch current</summary>
        Current,
    }

    internal readonly record struct CompiledVoltage(
        int Plus, int Minus, int Row, Coefficient Emf, Coefficient Ohms, ControlKind Control, int ControlPlus, int ControlMinus, Coefficient Gain, int Part);

    internal readonly record struct CompiledCurrent(
        int From, int To, Coefficient Amperes, ControlKind Control, int ControlPlus, int ControlMinus, Coefficient Gain, int Part);

    internal readonly record struct CompiledAmplifier(int Plus, int Minus, int Output, int Row, Coefficient Offset, Coefficient Gain, int Part);

    /// <summary>A junction (Row −1) or a limit (Row: the branch row that z overrides, with sign RowSign).</summary>
    internal readonly record struct CompiledPort(
        int High, int Low, Coefficient Drop, Coefficient Excess, Coefficient Gain, int TransportFrom, int TransportTo,
        double ReferenceAmperes, Coefficient Ideality, Coefficient SeriesOhms, JunctionRole? Role, int Row, double RowSign, int Part)
    {
        /// <summary>Slope to small signals, where one is stated.</summary>
        public Coefficient Siemens { get; init; }

        /// <summary>True for a branch that keeps its drop at any current, whatever the law of the junctions.</summary>
        public bool IsStraight => Ideality.IsConstantZero;

        /// <summary>True when z drops a voltage of its own across the resistance in series; the constant-drop law of a junction leaves that out.</summary>
        public bool HasSeries(PortLaw law) => law == PortLaw.Junction || IsStraight;
    }

    /// <summary>An impedance with its own branch current at Row; only in networks for small signals.</summary>
    internal readonly record struct CompiledReactance(int From, int To, int Row, Coefficient Value, Coefficient Ohms, bool IsCapacitance, int Part);

    /// <summary>A conductance across an island's edge that is no part's.</summary>
    /// <param name="Siemens">as stamped</param>
    /// <param name="Leakage">what is left of it when its prop is taken away</param>
    internal readonly record struct CompiledTie(int From, int To, double Siemens, double Leakage);

    /// <summary>
    /// A port that takes a prop away, v = Slope · z with z of either sign: across a tie (Row −1), or in the row of an amplifier's branch.
    /// </summary>
    internal readonly record struct CompiledProp(int High, int Low, int Row, double Slope)
    {
        public static CompiledProp Of(in CompiledTie tie) => new(tie.From, tie.To, -1, -1 / (tie.Siemens - tie.Leakage));

        public static CompiledProp Of(in CompiledAmplifier amplifier) => new(amplifier.Output, -1, amplifier.Row, 1 / PropInverseGain);
    }

    internal CompiledConductor[] Conductors = [];
    internal CompiledVoltage[] Voltages = [];
    internal CompiledCurrent[] Currents = [];
    internal CompiledAmplifier[] Amplifiers = [];
    internal CompiledPort[] Ports = [];
    internal CompiledReactance[] Reactances = [];
    internal Dictionary<(string Part, int Pin), int> JointRows = [];
    internal CompiledTie[] Ties = [];
    internal CompiledProp[] Props = [];
    internal double ThermalVolts;
    internal Dictionary<string, int> NodeIndex = [];
    internal ImmutableArray<Part> Parts = [];

    internal Network(Condition condition)
    {
        Condition = condition;
    }

    public Condition Condition { get; }

    /// <summary>Number of unknowns in x.</summary>
    public int Size { get; internal set; }

    /// <summary>How many of them are node voltages; they come first.</summary>
    public int NodeCount { get; internal set; }

    /// <summary>Number of ports: those of the devices, then those that take props away.</summary>
    public int PortCount => Ports.Length + Props.Length;

    /// <summary>Row of x that holds the current into a part's pin, where an ammeter was inserted.</summary>
    /// <exception cref="KeyNotFoundException">no ammeter there</exception>
    public int RowOf(Ammeter ammeter)
    {
        ArgumentNullException.ThrowIfNull(ammeter);
        return JointRows[(ammeter.Part, ammeter.Pin)];
    }

    /// <summary>Position of a node's voltage in x; −1 for the reference.</summary>
    /// <exception cref="KeyNotFoundException">no such node</exception>
    public int IndexOf(string node) => NodeIndex[node];
}
