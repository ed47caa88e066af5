using BenchCheck.Core.Boards;
using BenchCheck.Core.Diagnosis;

namespace BenchCheck.Benchmarks.Scoreboard.Faults;

/// <summary>Where a board can have a fault of each kind, without its number.</summary>
public static class FaultPlaces
{
    /// <summary>Swapped resistors nearer to each other than this are not a fault that a reading could show.</summary>
    private const double LeastRatio = 1.3;

    private static readonly (int First, int Second)[] TransistorPairs = [(0, 2), (1, 2), (0, 1)];

    public static TruthFault[] Of(Board board, string kind)
    {
        ArgumentNullException.ThrowIfNull(board);
        return [.. kind switch
        {
            FaultKind.Open => Open(board),
            FaultKind.Shorted => board.Parts.Where(p => p is Resistor or Diode or Capacitor or Inductor && CanJoin(board, p, 0, 1)).Select(p => TruthFault.At(kind, p.Designator)),
            FaultKind.WrongValue => board.Parts.Where(p => p is Resistor || p is Diode { Breakdown: not null }).Select(p => TruthFault.At(kind, p.Designator)),
            FaultKind.HighResistanceJoint => board.Parts.Where(p => p is Resistor or Diode or Transistor).SelectMany(p => Joints(p, kind)),
            FaultKind.Swapped => Swapped(board),
            FaultKind.Bridge => Bridges(board),
            FaultKind.Reversed => board.Parts.OfType<Diode>().Select(p => TruthFault.At(kind, p.Designator)),
            FaultKind.BaseEmitterShort => Transistors(board, kind).Where(f => CanJoin(board, board.Find(f.Parts[0])!, 1, 2)),
            FaultKind.CollectorEmitterShort => Transistors(board, kind).Where(f => CanJoin(board, board.Find(f.Parts[0])!, 0, 2)),
            FaultKind.CollectorBaseShort => Transistors(board, kind).Where(f => CanJoin(board, board.Find(f.Parts[0])!, 0, 1)),
            FaultKind.BaseEmitterOpen or FaultKind.WrongType or FaultKind.GainFarOff => Transistors(board, kind),
            FaultKind.PinsExchanged => board.Parts.OfType<Transistor>().SelectMany(q => TransistorPairs.Where(p => q.Nodes[p.First] != q.Nodes[p.Second]).Select(p =>
                TruthFault.At(kind, q.Designator) with { Pins = [q.JointName(p.First), q.JointName(p.Second)] })),
            FaultKind.Leaky => board.Parts.OfType<Capacitor>().Select(p => TruthFault.At(kind, p.Designator)),
            FaultKind.SupplyMissing => board.Parts.OfType<Supply>().Where(s => s.Volts.Value != 0 || IsSet(board, s)).Select(p => TruthFault.At(kind, p.Designator)),
            FaultKind.SupplyWrong => board.Parts.OfType<Supply>().Where(s => s.Volts.Value != 0).Select(p => TruthFault.At(kind, p.Designator)),
            FaultKind.SupplyReversed =>
                board.Parts.OfType<Supply>().Where(s => s.Volts.Value != 0 && CanReverse(board, s)).Select(p => TruthFault.At(kind, p.Designator)),
            FaultKind.SwitchPosition => board.Parts.OfType<Switch>().Select(p => TruthFault.At(kind, p.Designator)),
            FaultKind.ReadingError => [TruthFault.At(kind)],
            _ => Enumerable.Empty<TruthFault>(),
        }];
    }

    private static IEnumerable<TruthFault> Transistors(Board board, string kind) =>
        board.Parts.OfType<Transistor>().Select(q => TruthFault.At(kind, q.Designator));

    private static IEnumerable<TruthFault> Open(Board board) => board.Parts.SelectMany(p => p switch
    {
        Resistor or Diode or Inductor => [TruthFault.At(FaultKind.Open, p.Designator)],
        Transistor or Potentiometer => Joints(p, FaultKind.Open),
        _ => Enumerable.Empty<TruthFault>(),
    });

    private static IEnumerable<TruthFault> Joints(Part part, string kind) =>
        Enumerable.Range(0, part.Nodes.Length).Select(pin => TruthFault.At(kind, part.Designator) with { Pins = [part.JointName(pin)] });

    private static IEnumerable<TruthFault> Swapped(Board board)
    {
        var resistors = board.Parts.OfType<Resistor>().ToArray();
        return resistors.SelectMany((a, i) => resistors.Skip(i + 1)
            .Where(b => Math.Abs(Math.Log(a.Ohms.Value / b.Ohms.Value)) > Math.Log(LeastRatio))
            .Select(b => TruthFault.At(FaultKind.Swapped, a.Designator, b.Designator)));
    }

    /// <summary>Solder bridges form between neighbours: nodes that share a part.</summary>
    private static IEnumerable<TruthFault> Bridges(Board board) => board.Parts
        .SelectMany(p => p.Nodes.SelectMany((a, i) => p.Nodes.Skip(i + 1).Select(b => string.CompareOrdinal(a, b) < 0 ? (a, b) : (a: b, b: a))))
        .Where(x => x.a != x.b && CanJoin(board, x.a, x.b)).Distinct()
        .Select(x => new TruthFault(FaultKind.Bridge, [], [], [x.a, x.b], null));

    private static bool CanJoin(Board board, Part part, int pin, int other) =>
        part.Nodes[pin] != part.Nodes[other] && CanJoin(board, part.Nodes[pin], part.Nodes[other]);

    /// <summary>False where a join would lie across a supply or between two: that makes smoke, not readings.</summary>
    private static bool CanJoin(Board board, string a, string b) => !(IsStiff(board, a) && IsStiff(board, b));

    private static bool IsStiff(Board board, string node) => node == board.Reference || board.Parts.Any(p => p is Supply && p.Nodes.Contains(node));

    /// <summary>A reversed supply across junctions without a resistor makes smoke too.</summary>
    private static bool CanReverse(Board board, Supply supply) =>
        !board.Parts.Any(p => p is Diode or Transistor && p.Nodes.Contains(supply.Nodes[0]) && p.Nodes.Count(n => IsStiff(board, n)) > 1);

    private static bool IsSet(Board board, Supply supply) => board.Conditions.Any(c => c.Set.TryGetValue(supply.Designator, out var volts) && volts.Value != 0);
}
