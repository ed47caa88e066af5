using System.Collections.Immutable;
using BenchCheck.Core.Boards;

namespace BenchCheck.Core.Equations;

/// <summary>An ammeter in series with one pin of a part.</summary>
/// <param name="BurdenOhms">resistance of the meter; zero for none</param>
public sealed record Ammeter(string Part, int Pin, double BurdenOhms);

/// <summary>Compiles a board in a condition into a <see cref="Network"/>.</summary>
public sealed class NetworkCompiler
{
    private readonly Board board;
    private readonly ParameterTable table;
    private readonly Condition condition;
    private readonly Action<Part, PartElements, string?> describe;
    private readonly Dictionary<string, int> nodeIndex = new(StringComparer.Ordinal);
    private readonly List<Network.CompiledConductor> conductors = [];
    private readonly List<Network.CompiledVoltage> voltages = [];
    private readonly List<Network.CompiledCurrent> currents = [];
    private readonly List<Network.CompiledAmplifier> amplifiers = [];
    private readonly List<Network.CompiledPort> ports = [];
    private readonly List<Network.CompiledReactance> reactances = [];
    private readonly List<Network.CompiledTie> ties = [];
    private readonly List<Network.CompiledProp> props = [];
    private readonly double[] nominal;
    private readonly Dictionary<(string Part, int Pin), int> jointRow = [];
    private readonly Dictionary<(string Part, int Pin), string> insertedNode = [];
    private int branchCount;

    private NetworkCompiler(Board board, ParameterTable table, Condition condition, Action<Part, PartElements, string?> describe)
    {
        this.describe = describe;
        this.board = board;
        this.table = table;
        this.condition = condition;
        nominal = [.. table.Entries.Select(e => e.Nominal.Value)];
    }

    /// <param name="table">the parameter vector that coefficients refer to; made from the same board</param>
    /// <param name="ammeters">ammeters to insert; their currents, counted into the part, are read at <see cref="Network.RowOf"/></param>
    public static Network Compile(Board board, ParameterTable table, Condition condition, params ReadOnlySpan<Ammeter> ammeters)
    {
        ArgumentNullException.ThrowIfNull(board);
        ArgumentNullException.ThrowIfNull(condition);
        return new NetworkCompiler(board, table, condition, (part, elements, setting) => part.Describe(elements, setting)).Compile(ammeters);
    }

    /// <summary>The same for small changes around an operating state of <paramref name="condition"/>; its ports are those of the DC network.</summary>
    public static Network CompileSmallSignal(Board board, ParameterTable table, Condition condition, params ReadOnlySpan<Ammeter> ammeters)
    {
        ArgumentNullException.ThrowIfNull(board);
        ArgumentNullException.ThrowIfNull(condition);
        return new NetworkCompiler(board, table, condition, (part, elements, setting) => part.DescribeSmallSignal(elements, setting)).Compile(ammeters);
    }

    private Network Compile(ReadOnlySpan<Ammeter> ammeters)
    {
        nodeIndex[board.Reference] = -1;
        foreach (var node in board.Nodes) AddNode(node);
        foreach (var sensed in SensedParts()) Insert(sensed, 0);
        foreach (var ammeter in ammeters) Insert(ammeter.Part, ammeter.Pin);
        var described = board.Parts.Select(Describe).ToArray();
        var nodeCount = nodeIndex.Count - 1;

        foreach (var (designator, pin) in insertedNode.Keys)
        {
            var part = board.Find(designator)!;
            var row = jointRow[(designator, pin)] = nodeCount + branchCount++;
            var burden = 0.0;
            foreach (var ammeter in ammeters)
            {
                if (ammeter.Part == designator && ammeter.Pin == pin) burden = ammeter.BurdenOhms;
            }

            voltages.Add(new(
                nodeIndex[part.Nodes[pin]], nodeIndex[insertedNode[(designator, pin)]], row, default, Coefficient.Constant(burden),
                Network.ControlKind.None, -1, -1, default, -1));
        }

        for (var i = 0; i < board.Parts.Length; i++) AddPart(board.Parts[i], described[i], i, nodeCount);

        TieIslands(nodeCount);
        return new Network(condition)
        {
            Conductors = [.. conductors],
            Voltages = [.. voltages],
            Currents = [.. currents],
            Amplifiers = [.. amplifiers],
            Ports = [.. ports],
            Reactances = [.. reactances],
            Ties = [.. ties],
            Props = [.. props],
            NodeIndex = nodeIndex,
            NodeCount = nodeCount,
            Size = nodeCount + branchCount,
            JointRows = jointRow,
            Parts = board.Parts,
            ThermalVolts = JunctionCurve.ThermalVolts(board.Celsius),
        };
    }

    private void AddNode(string node) => nodeIndex.TryAdd(node, nodeIndex.Count - 1);

    private IEnumerable<string> SensedParts() =>
        board.Parts.OfType<ControlledSource>().Select(s => s.Control).OfType<Control.PartCurrent>().Select(c => c.Designator).Distinct(StringComparer.Ordinal);

    /// <summary>Splits a joint so that the current through it becomes an unknown.</summary>
    private void Insert(string designator, int pin)
    {
        if (insertedNode.ContainsKey((designator, pin))) return;
        // A space cannot occur in a node name that a file gives, so the new node has its own name.
        var node = $"{board.Find(designator)!.JointName(pin)} inserted";
        insertedNode[(designator, pin)] = node;
        AddNode(node);
    }

    /// <summary>The elements of a part; its inner nodes become nodes of the network.</summary>
    private PartElements Describe(Part part)
    {
        var elements = new PartElements();
        describe(part, elements, condition.Switches.GetValueOrDefault(part.Designator));
        for (var i = 0; i < elements.InnerNodes; i++) AddNode(InnerName(part, i));
        return elements;
    }

    /// <summary>A name that no file can give, because of its spaces.</summary>
    private static string InnerName(Part part, int i) => $"{part.Designator} inner {i}";

    private void AddPart(Part part, PartElements elements, int partIndex, int nodeCount)
    {
        var pins = new int[part.Nodes.Length + elements.InnerNodes];
        for (var pin = 0; pin < part.Nodes.Length; pin++)
            pins[pin] = nodeIndex[insertedNode.GetValueOrDefault((part.Designator, pin), part.Nodes[pin])];
        for (var i = 0; i < elements.InnerNodes; i++) pins[part.Nodes.Length + i] = nodeIndex[InnerName(part, i)];

        Coefficient Map(Coefficient c) => c with
        {
            First = c.First < 0 ? -1 : table.IndexOf(part, c.First, condition.Name),
            Second = c.Second < 0 ? -1 : table.IndexOf(part, c.Second, condition.Name),
        };
        int Pin(int pin) => pin < 0 ? -1 : pins[pin];

        foreach (var e in elements.Conductors) conductors.Add(new(Pin(e.From), Pin(e.To), Map(e.Ohms), partIndex));

        var drivenRow = -1;
        foreach (var e in elements.VoltageBranches)
        {
            if (e.IsSupply && condition.SuppliesRemoved) continue;
            drivenRow = nodeCount + branchCount++;
            var (kind, plus, minus) = Resolve(e.Control);
            voltages.Add(new(Pin(e.Plus), Pin(e.Minus), drivenRow, Map(e.Emf), Map(e.Ohms), kind, plus, minus, Map(e.Gain), partIndex));
        }

        foreach (var e in elements.Amplifiers)
        {
            drivenRow = nodeCount + branchCount++;
            amplifiers.Add(new(Pin(e.Plus), Pin(e.Minus), Pin(e.Output), drivenRow, Map(e.Offset), Map(e.Gain), partIndex));
            props.Add(Network.CompiledProp.Of(amplifiers[^1]));
        }

        foreach (var e in elements.CurrentBranches)
        {
            if (e.IsSupply && condition.SuppliesRemoved) continue;
            var (kind, plus, minus) = Resolve(e.Control);
            currents.Add(new(Pin(e.From), Pin(e.To), Map(e.Amperes), kind, plus, minus, Map(e.Gain), partIndex));
        }

        foreach (var e in elements.Reactances)
            reactances.Add(new(Pin(e.From), Pin(e.To), nodeCount + branchCount++, Map(e.Value), Map(e.Ohms), e.IsCapacitance, partIndex));

        foreach (var e in elements.Junctions)
        {
            var hasTransport = e.TransportFrom >= 0;
            ports.Add(new(
                Pin(e.Anode), Pin(e.Cathode), Map(e.Drop), Map(e.Excess), Map(e.Gain), hasTransport ? Pin(e.TransportFrom) : -1,
                hasTransport ? Pin(e.TransportTo) : -1, e.ReferenceAmperes, Map(e.Ideality), Map(e.SeriesOhms), e.Role, -1, 0, partIndex)
            {
                Siemens = Map(e.Siemens),
            });
        }

        foreach (var e in elements.Limits)
        {
            // z enters an amplifier's row as −z when it holds the output down, a voltage branch's row as +z.
            var sign = (elements.Amplifiers.Count > 0 ? -1 : 1) * (e.IsUpper ? 1 : -1);
            var (high, low) = e.IsUpper ? (e.Output, e.Pin) : (e.Pin, e.Output);
            ports.Add(new(Pin(high), Pin(low), Map(e.Margin) with { Factor = -e.Margin.Factor }, default, default, -1, -1, 1, default, default, null, drivenRow, sign, partIndex));
        }
    }

    private (Network.ControlKind Kind, int Plus, int Minus) Resolve(Control? control) => control switch
    {
        null => (Network.ControlKind.None, -1, -1),
        Control.NodePair pair => (Network.ControlKind.Pair, nodeIndex[pair.Plus], nodeIndex[pair.Minus]),
        Control.PartCurrent part => (Network.ControlKind.Current, jointRow[(part.Designator, 0)], -1),
        _ => throw new ArgumentOutOfRangeException(nameof(control)),
    };

    private bool IsWeak(Coefficient ohms) => ohms.Value(nominal) > Network.WeakOhms;

    /// <summary>Ties each group of nodes that no linear element joins to the reference, and props those ties that something else may join.</summary>
    private void TieIslands(int nodeCount)
    {
        // Node −1, the reference, is kept at position 0.
        var root = new int[nodeCount + 1];
        for (var i = 0; i < root.Length; i++) root[i] = i;
        int Find(int i)
        {
            while (root[i] != i) i = root[i] = root[root[i]];
            return i;
        }
        void Join(int a, int b)
        {
            var (ra, rb) = (Find(a + 1), Find(b + 1));
            // The smaller index wins, so the reference stays the root of its own group.
            if (ra < rb) root[rb] = ra;
            else root[ra] = rb;
        }
        void Tie(int from, int to, double leakage)
        {
            if (Find(from + 1) == Find(to + 1)) return;
            Join(from, to);
            ties.Add(new(from, to, Network.TieSiemens, leakage));
            props.Add(Network.CompiledProp.Of(ties[^1]));
        }
        foreach (var c in conductors.Where(c => !IsWeak(c.Ohms))) Join(c.From, c.To);
        foreach (var v in voltages) Join(v.Plus, v.Minus);
        foreach (var a in amplifiers) Join(a.Output, -1);
        foreach (var port in ports.Where(p => p.Row < 0)) Tie(port.High, port.Low, Network.LeakageSiemens);
        foreach (var c in conductors) Tie(c.From, c.To, 0);
        for (var i = 1; i <= nodeCount; i++)
        {
            if (Find(i) != i) continue;
            if (Enumerable.Range(1, nodeCount).Any(other => other != i && Find(other) == i)) Tie(i - 1, -1, Network.LeakageSiemens);
            else ties.Add(new(i - 1, -1, Network.LeakageSiemens, Network.LeakageSiemens));
        }
    }
}
