using System.Collections.Immutable;
using BenchCheck.Core.Boards;

namespace BenchCheck.Core.Diagnosis.Faults;

/// <summary>Two nodes joined that should not be: a part shorted, a transistor's junction shorted, a solder bridge. One hypothesis a pair of nodes.</summary>
internal static class ShortFaults
{
    /// <summary>Boards of at most this many nodes are searched for a bridge between any two; larger ones between nodes that share a part.</summary>
    private const int SmallBoard = 12;

    public static IEnumerable<FaultHypothesis> Of(Board board)
    {
        var names = new Dictionary<(string, string), List<FaultName>>();
        foreach (var part in board.Parts)
        {
            foreach (var (pin, other, kind) in Pairs(part))
            {
                if (part.Nodes[pin] == part.Nodes[other]) continue;
                Of(names, part.Nodes[pin], part.Nodes[other]).Add(new FaultName(kind, Words(part, kind)) { Parts = [part.Designator] });
            }
        }

        foreach (var (a, b) in BridgePairs(board))
        {
            Of(names, a, b).Add(new FaultName(FaultKind.Bridge, $"bridge between {a} and {b}") { Nodes = [a, b] });
        }

        // A short across a stiff supply makes smoke, not readings: as a reading it is that of a missing supply.
        var stiff = board.Parts.OfType<Supply>().Where(s => s.SourceOhms is null).Select(s => Key(s.Nodes[0], s.Nodes[1])).ToHashSet();
        foreach (var (pair, list) in names)
        {
            if (!stiff.Contains(pair)) yield return new FaultHypothesis([.. list], Alteration.ShortNodes(board, pair.Item1, pair.Item2));
        }
    }

    private static IEnumerable<(int Pin, int Other, string Kind)> Pairs(Part part) => part switch
    {
        Transistor =>
        [
            (Transistor.Base, Transistor.Emitter, FaultKind.BaseEmitterShort),
            (Transistor.Collector, Transistor.Emitter, FaultKind.CollectorEmitterShort),
            (Transistor.Collector, Transistor.Base, FaultKind.CollectorBaseShort),
        ],
        Mosfet => [(Mosfet.Drain, Mosfet.Source, FaultKind.Shorted), (Mosfet.Gate, Mosfet.Source, FaultKind.Shorted), (Mosfet.Gate, Mosfet.Drain, FaultKind.Shorted)],
        Regulator => [(Regulator.Input, Regulator.Output, FaultKind.Shorted), (Regulator.Output, Regulator.Common, FaultKind.Shorted)],
        Potentiometer => [(0, 1, FaultKind.Shorted), (1, 2, FaultKind.Shorted), (0, 2, FaultKind.Shorted)],
        Resistor or Diode or Inductor or Capacitor => [(0, 1, FaultKind.Shorted)],
        _ => [],
    };

    private static string Words(Part part, string kind) =>
        kind == FaultKind.Shorted ? $"{part.Designator} shorted" : $"{part.Designator} {kind}";

    private static IEnumerable<(string, string)> BridgePairs(Board board)
    {
        if (!board.Adjacent.IsEmpty) return board.Adjacent.SelectMany(group => AllPairs(group)).Distinct();
        return board.Nodes.Length <= SmallBoard
            ? AllPairs(board.Nodes)
            : board.Parts.SelectMany(p => AllPairs([.. p.Nodes.Distinct(StringComparer.Ordinal)])).Distinct();
    }

    private static IEnumerable<(string, string)> AllPairs(ImmutableArray<string> nodes)
    {
        for (var i = 0; i < nodes.Length; i++)
        {
            for (var j = i + 1; j < nodes.Length; j++) yield return Key(nodes[i], nodes[j]);
        }
    }

    private static List<FaultName> Of(Dictionary<(string, string), List<FaultName>> names, string a, string b)
    {
        var key = Key(a, b);
        if (!names.TryGetValue(key, out var list)) names[key] = list = [];
        return list;
    }

    private static (string, string) Key(string a, string b) => string.CompareOrdinal(a, b) < 0 ? (a, b) : (b, a);
}
