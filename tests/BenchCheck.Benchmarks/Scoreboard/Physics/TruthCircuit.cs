namespace BenchCheck.Benchmarks.Scoreboard.Physics;

/// <summary>A netlist of resistors, sources with series resistance, exponential junctions and Ebers-Moll transistors, in one condition.</summary>
/// <remarks>
/// The program under test solves by states of linear branches; this is a different formulation on purpose, node voltages only, so that a
/// mistake in one does not hide in the other. Node −1 is the reference.
/// </remarks>
public sealed class TruthCircuit
{
    /// <summary>Leakage of a board's surface from each node to the reference: keeps lifted pins determined; far below what the meter loads.</summary>
    public const double LeakageSiemens = 1e-12;

    private readonly Dictionary<string, int> index = new(StringComparer.Ordinal);
    private readonly List<Branch> branches = [];
    private readonly List<Current> currents = [];
    private readonly List<Diode> diodes = [];
    private readonly List<Bipolar> bipolars = [];
    private readonly string reference;

    public TruthCircuit(string reference) => this.reference = reference;

    /// <summary>i = siemens · (v_A − v_B − volts), from A to B: a resistor, or a source behind its resistance.</summary>
    internal readonly record struct Branch(int A, int B, double Siemens, double Volts);

    /// <summary>A current that leaves the board at A and enters it again at B.</summary>
    internal readonly record struct Current(int A, int B, double Amperes);

    internal readonly record struct Diode(int Anode, int Cathode, Junction Law);

    /// <summary>i_T = (I_F − I_R)(1 − v_BC/V_A), base currents I_F/β_F and I_R/β_R (Ebers and Moll 1954, transport form; Early 1952).</summary>
    internal readonly record struct Bipolar(
        string Name, int Collector, int Base, int Emitter, bool IsNpn, Junction Law, double ForwardGain, double ReverseGain, double EarlyVolts);

    public int Size { get; private set; }

    internal IReadOnlyList<Branch> Branches => branches;

    internal IReadOnlyList<Current> Currents => currents;

    internal IReadOnlyList<Diode> Diodes => diodes;

    internal IReadOnlyList<Bipolar> Bipolars => bipolars;

    /// <summary>Number of a node, new when it was not named before.</summary>
    public int Node(string name)
    {
        if (name == reference) return -1;
        if (!index.TryGetValue(name, out var i)) index[name] = i = Size++;
        return i;
    }

    public int? Find(string name) => name == reference ? -1 : index.TryGetValue(name, out var i) ? i : null;

    public void AddResistor(int a, int b, double ohms) => AddSource(a, b, 0, ohms);

    public void AddSource(int plus, int minus, double volts, double ohms)
    {
        if (plus != minus) branches.Add(new Branch(plus, minus, 1 / ohms, volts));
    }

    public void AddCurrent(int from, int to, double amperes) => currents.Add(new Current(from, to, amperes));

    /// <summary>A junction behind its series resistance.</summary>
    public void AddDiode(int anode, int cathode, Junction law, double seriesOhms) =>
        diodes.Add(new Diode(Behind(anode, seriesOhms), cathode, law));

    /// <summary>A transistor behind the ohmic resistances of its three leads.</summary>
    public void AddBipolar(string name, (int Collector, int Base, int Emitter) pins, bool isNpn, Junction law, double forwardGain, double reverseGain,
        double earlyVolts, (double Collector, double Base, double Emitter) ohms) =>
        bipolars.Add(new Bipolar(
            name, Behind(pins.Collector, ohms.Collector), Behind(pins.Base, ohms.Base), Behind(pins.Emitter, ohms.Emitter), isNpn, law, forwardGain,
            reverseGain, earlyVolts));

    private int Behind(int node, double ohms)
    {
        var inner = Size++;
        AddResistor(node, inner, ohms);
        return inner;
    }
}
