using System.Collections.Immutable;
using BenchCheck.Core.Quantities;

namespace BenchCheck.Core.Boards;

/// <summary>Something about a board's connections that must, or should, be put right before it can be solved.</summary>
/// <param name="Part">the part concerned, when one is</param>
/// <param name="Node">the node concerned, when one is</param>
/// <param name="IsError">false for a warning: the board can be solved, but a connection is probably missing</param>
public sealed record StructureProblem(string? Part, string? Node, string Message, bool IsError);

/// <summary>Checks of a board's connections before any solving.</summary>
/// <remarks>
/// The cases are those in which the nodal equations have no, or no single, solution: a loop of voltage-defined branches, a cut-set of current
/// sources, a group of nodes without a path to the reference; and those that can be solved but are rarely meant.
/// </remarks>
public static class BoardStructure
{
    /// <summary>All problems at once, errors and warnings.</summary>
    public static ImmutableArray<StructureProblem> Problems(Board board)
    {
        ArgumentNullException.ThrowIfNull(board);
        return
        [
            .. UntouchedReference(board), .. PartsOnOneNode(board), .. SupplyLoops(board), .. UntiedNodes(board), .. SinglePins(board),
            .. ControlStructure.Problems(board), .. FeedbackStructure.Problems(board), .. ShortedGenerators(board),
        ];
    }

    /// <summary>True when supplies without resistance alone tie two nodes together: no signal can stand between them.</summary>
    public static bool AreStill(Board board, string a, string b)
    {
        ArgumentNullException.ThrowIfNull(board);
        var groups = new NodeGroups(board.Nodes);
        foreach (var supply in board.Parts.Where(p => p is Supply { SourceOhms: null })) groups.Tie(supply.Nodes[0], supply.Nodes[1]);
        return groups.AreTied(a, b);
    }

    private static IEnumerable<StructureProblem> ShortedGenerators(Board board) =>
        board.Conditions.Where(c => c.Drive is { } d && AreStill(board, d.At, d.Against)).Select(c => new StructureProblem(
            null, c.Drive!.At, $"the generator of condition {c.Name} is shorted: supplies hold {c.Drive.At} and {c.Drive.Against} still to small signals", true));

    private static IEnumerable<StructureProblem> UntouchedReference(Board board)
    {
        if (!board.Parts.Any(p => p.Nodes.Contains(board.Reference)))
            yield return new StructureProblem(null, board.Reference, $"no part touches the reference node {board.Reference}", true);
    }

    /// <summary>Nodes that a generator touches: its lead is a connection too.</summary>
    private static IEnumerable<string> Driven(Board board) => board.Conditions.Select(c => c.Drive).OfType<Drive>().SelectMany(d => new[] { d.At, d.Against });

    private static IEnumerable<StructureProblem> SinglePins(Board board) =>
        board.Parts.SelectMany(p => p.Nodes.Select((node, pin) => (Part: p, Node: node, Pin: pin)))
            .GroupBy(x => x.Node, StringComparer.Ordinal)
            .Where(g => g.Count() == 1 && g.Key != board.Reference && !Driven(board).Contains(g.Key))
            .Select(g => new StructureProblem(g.First().Part.Designator, g.Key,
                $"node {g.Key} has a single pin, {g.First().Part.JointName(g.First().Pin)}: nothing else connects to it", false));

    private static IEnumerable<StructureProblem> PartsOnOneNode(Board board) =>
        board.Parts.Where(p => p.Nodes.Distinct(StringComparer.Ordinal).Count() == 1).Select(p => IsFixedVoltage(p)
            ? new StructureProblem(p.Designator, p.Nodes[0], $"{p.Designator} is shorted: both of its pins are on node {p.Nodes[0]}", true)
            : new StructureProblem(p.Designator, p.Nodes[0], $"{p.Designator} has all its pins on node {p.Nodes[0]}: no reading can tell anything of it", false));

    /// <summary>A supply or controlled voltage source without resistance of its own.</summary>
    private static bool IsFixedVoltage(Part part) =>
        part is Supply { SourceOhms: null }
        || ReferenceEquals(part.Kind, ControlledSource.VoltageByVoltage) || ReferenceEquals(part.Kind, ControlledSource.VoltageByCurrent);

    /// <summary>Loops of voltage-defined branches; links count as wires, so that a supply behind one is shorted too.</summary>
    private static IEnumerable<StructureProblem> SupplyLoops(Board board)
    {
        var groups = new NodeGroups(board.Nodes);
        var links = board.Parts.OfType<Jumper>().ToList();
        foreach (var link in links) groups.Tie(link.Nodes[0], link.Nodes[1]);
        var before = new List<Part>();
        foreach (var part in board.Parts.Where(p => IsFixedVoltage(p) && p.Nodes[0] != p.Nodes[1]))
        {
            var (plus, minus) = (part.Nodes[0], part.Nodes[1]);
            var volts = part is Supply supply ? supply.Volts.Value : double.NaN;
            if (!groups.AreTied(plus, minus))
            {
                groups.Tie(plus, minus, volts);
                before.Add(part);
                continue;
            }

            var others = Between(plus, minus, [.. before, .. links]);
            yield return new StructureProblem(part.Designator, plus, LoopMessage(part, others, volts, groups.VoltsBetween(plus, minus)), true);
        }
    }

    private static string LoopMessage(Part part, IReadOnlyList<Part> others, double volts, double there)
    {
        var names = string.Join(", ", others.Select(p => p.Designator));
        if (others.All(p => p is Jumper)) return $"{part.Designator} is shorted by {names}";
        if (double.IsNaN(volts) || double.IsNaN(there)) return $"{part.Designator} and {names} make a loop without any resistance: state a source resistance";
        var (own, theirs) = (EngineeringNotation.Format(volts, Unit.Volt, 3), EngineeringNotation.Format(there, Unit.Volt, 3));
        return Math.Abs(volts - there) <= 1e-9 * (Math.Abs(volts) + Math.Abs(there))
            ? $"{part.Designator} and {names} are in parallel without any resistance, so their shares of the current are open: state a source resistance"
            : $"{part.Designator} contradicts {names}: {own} against {theirs} between the nodes {part.Nodes[0]} and {part.Nodes[1]}";
    }

    /// <summary>The parts of a path from one node to another; empty when there is none.</summary>
    private static List<Part> Between(string from, string to, IReadOnlyList<Part> parts)
    {
        var reachedBy = new Dictionary<string, (string Node, Part Part)?>(StringComparer.Ordinal) { [from] = null };
        var touching = PartsByNode(parts);
        var queue = new Queue<string>([from]);
        while (queue.TryDequeue(out var node) && node != to)
        {
            foreach (var part in touching[node])
            {
                foreach (var next in part.Nodes.Where(n => reachedBy.TryAdd(n, (node, part)))) queue.Enqueue(next);
            }
        }

        var path = new List<Part>();
        for (var step = reachedBy.GetValueOrDefault(to); step is { } back; step = reachedBy[back.Node]) path.Add(back.Part);
        return path;
    }

    /// <summary>A source of current whose voltage something else must fix; one that follows the voltage at its own pins fixes that itself.</summary>
    private static bool GivesCurrent(Part part, string reference) =>
        part is CurrentSource || (part is ControlledSource c && !IsFixedVoltage(part)
            && !(c.Control is Control.NodePair pair && part.Nodes.Any(n => n != reference && (n == pair.Plus || n == pair.Minus))));

    internal static ILookup<string, Part> PartsByNode(IEnumerable<Part> parts) =>
        parts.SelectMany(p => p.Nodes.Distinct(StringComparer.Ordinal).Select(n => (Node: n, Part: p))).ToLookup(x => x.Node, x => x.Part, StringComparer.Ordinal);

    /// <summary>Groups of nodes without a path to the reference: at all, at DC, or but for current sources.</summary>
    private static IEnumerable<StructureProblem> UntiedNodes(Board board)
    {
        var (any, direct, stiff) = (new NodeGroups(board.Nodes), new NodeGroups(board.Nodes), new NodeGroups(board.Nodes));
        foreach (var part in board.Parts)
        {
            any.TieAll(part.Nodes);
            if (part is Capacitor) continue;

            // The inputs of an op-amp and a gate draw no current, so they tie their nodes to nothing.
            var carrying = part is OpAmp ? part.Nodes.RemoveRange(0, 2) : part is Mosfet ? part.Nodes.RemoveAt(Mosfet.Gate) : part.Nodes;
            direct.TieAll(carrying);
            if (!GivesCurrent(part, board.Reference)) stiff.TieAll(carrying);
        }

        var reference = board.Reference;
        foreach (var (nodes, parts) in Untied(board, any, reference))
        {
            yield return new StructureProblem(parts[0].Designator, nodes[0],
                $"nothing connects {Names("node", nodes)} ({string.Join(", ", parts.Select(p => p.Designator))}) with the reference {reference}", true);
        }

        foreach (var (nodes, parts) in Untied(board, direct, reference).Where(g => any.AreTied(g.Nodes[0], reference) && !g.Nodes.Intersect(Driven(board)).Any()))
        {
            yield return new StructureProblem(parts[0].Designator, nodes[0],
                $"no direct current can reach {Names("node", nodes)}: only capacitors or inputs connect there, so the voltage at DC is open", false);
        }

        foreach (var (nodes, parts) in Untied(board, stiff, reference).Where(g => direct.AreTied(g.Nodes[0], reference)))
        {
            var sources = parts.Where(p => GivesCurrent(p, reference) && p.Nodes.Any(n => !nodes.Contains(n))).Select(p => p.Designator).ToList();
            yield return new StructureProblem(sources[0], nodes[0],
                $"only current sources ({string.Join(", ", sources)}) connect {Names("node", nodes)} with the rest of the board: their currents have no way back", true);
        }
    }

    private static IEnumerable<(List<string> Nodes, List<Part> Parts)> Untied(Board board, NodeGroups groups, string reference)
    {
        var left = board.Nodes.Where(n => !groups.AreTied(n, reference)).ToList();
        while (left.Count > 0)
        {
            var nodes = left.Where(n => groups.AreTied(n, left[0])).ToList();
            yield return (nodes, [.. board.Parts.Where(p => p.Nodes.Any(nodes.Contains))]);
            left.RemoveAll(nodes.Contains);
        }
    }

    private static string Names(string word, List<string> names) => names.Count == 1 ? $"{word} {names[0]}" : $"{word}s {string.Join(", ", names)}";
}
