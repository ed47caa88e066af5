using System.Collections.Immutable;

namespace BenchCheck.Core.Boards;

/// <summary>Controlled sources whose control leaves their own equation, or the board's, without one answer.</summary>
internal static class ControlStructure
{
    public static IEnumerable<StructureProblem> Problems(Board board)
    {
        foreach (var source in board.Parts.OfType<ControlledSource>())
        {
            var isVoltage = ReferenceEquals(source.Kind, ControlledSource.VoltageByVoltage);
            if (source.Control is Control.NodePair pair)
            {
                if (pair.Plus == pair.Minus)
                    yield return Warning(source, $"{source.Designator} is controlled by the voltage of node {pair.Plus} against itself, which is zero: it gives nothing");
                else if (isVoltage && source.Nodes.Contains(pair.Plus) && source.Nodes.Contains(pair.Minus))
                    yield return Error(source, $"{source.Designator} is controlled by the voltage between its own pins: only 0 V, or any voltage, satisfies that");
            }
            else if (source.Control is Control.PartCurrent control)
            {
                var sensed = board.Find(control.Designator);
                if (control.Designator == source.Designator && ReferenceEquals(source.Kind, ControlledSource.CurrentByCurrent))
                    yield return Error(source, $"{source.Designator} is controlled by its own current: only 0 A, or any current, satisfies that");
                else if (sensed is Capacitor or OpAmp)
                    yield return Warning(source, $"{source.Designator} is controlled by the current of {control.Designator}, which carries none at DC");
            }
        }

        foreach (var ring in Rings(board))
            yield return Error(ring[0], $"{string.Join(" and ", ring.Select(p => p.Designator))} are controlled by each other's current in a ring: only 0 A, or any current, satisfies that");
    }

    private static StructureProblem Error(Part part, string message) => new(part.Designator, part.Nodes[0], message, true);

    private static StructureProblem Warning(Part part, string message) => new(part.Designator, part.Nodes[0], message, false);

    /// <summary>Current sources each of which follows the next one's current, round to the first.</summary>
    private static IEnumerable<ImmutableArray<Part>> Rings(Board board)
    {
        var next = board.Parts.OfType<ControlledSource>()
            .Where(s => ReferenceEquals(s.Kind, ControlledSource.CurrentByCurrent) && s.Control is Control.PartCurrent)
            .ToDictionary(s => s.Designator, s => ((Control.PartCurrent)s.Control).Designator, StringComparer.Ordinal);
        var told = new HashSet<string>(StringComparer.Ordinal);
        foreach (var first in next.Keys)
        {
            var ring = new List<string> { first };
            while (next.TryGetValue(ring[^1], out var following) && !ring.Contains(following)) ring.Add(following);
            if (ring.Count < 2 || next.GetValueOrDefault(ring[^1]) != first || !ring.All(told.Add)) continue;
            yield return [.. ring.Select(name => board.Find(name)!)];
        }
    }
}
