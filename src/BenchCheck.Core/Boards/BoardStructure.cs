using System.Collections.Immutable;

namespace BenchCheck.Core.Boards;

/// <summary>Something about a board's connections that must, or should, be put right before it can be solved.</summary>
/// <param name="Part">the part concerned, when one is</param>
/// <param name="Node">the node concerned, when one is</param>
/// <param name="IsError">false for a warning: the board can be solved, but a connection is probably missing</param>
public sealed record StructureProblem(string? Part, string? Node, string Message, bool IsError);

/// <summary>Checks of a board's connections before any solving.</summary>
public static class BoardStructure
{
    /// <summary>All problems at once: loops of supplies, islands without a path to the reference, nodes with a single pin.</summary>
    public static ImmutableArray<StructureProblem> Problems(Board board)
    {
        ArgumentNullException.ThrowIfNull(board);
        return [.. board.Parts.SelectMany(p => p.Nodes.Select((node, pin) => (p, node, pin)))
            .GroupBy(x => x.node, StringComparer.Ordinal)
            .Where(g => g.Count() == 1 && g.Key != board.Reference)
            .Select(g => new StructureProblem(g.First().p.Designator, g.Key,
                $"node {g.Key} has a single pin, {g.First().p.JointName(g.First().pin)}: nothing else connects to it", false))];
    }
}
