namespace BenchCheck.Core.Boards;

/// <summary>Op-amps whose output does not come back to the inverting input: they compare, or hold one of two states.</summary>
internal static class FeedbackStructure
{
    public static IEnumerable<StructureProblem> Problems(Board board)
    {
        var rails = new NodeGroups(board.Nodes);
        foreach (var supply in board.Parts.OfType<Supply>()) rails.TieAll(supply.Nodes);
        var touching = BoardStructure.PartsByNode(board.Parts);
        foreach (var amplifier in board.Parts.OfType<OpAmp>())
        {
            var (plus, minus, output) = (amplifier.Nodes[0], amplifier.Nodes[1], amplifier.Nodes[2]);
            if (plus == minus)
            {
                yield return Warning(amplifier, $"both inputs of {amplifier.Designator} are on node {plus}: its output stands at one of its supplies, as its offset has it");
                continue;
            }

            var reached = ReachedFrom(output, amplifier, rails, board.Reference, touching);
            if (reached.Contains(minus)) continue;
            yield return Warning(amplifier, reached.Contains(plus)
                ? $"{amplifier.Designator} has feedback to its plus input only: it holds either of two states, and where both are possible the high one is predicted"
                : $"{amplifier.Designator} has no feedback from its output to an input: it works as a comparator");
        }
    }

    private static StructureProblem Warning(OpAmp amplifier, string message) => new(amplifier.Designator, amplifier.Nodes[2], message, false);

    private static HashSet<string> ReachedFrom(string output, OpAmp amplifier, NodeGroups rails, string reference, ILookup<string, Part> touching)
    {
        var reached = new HashSet<string>(StringComparer.Ordinal) { output };
        var queue = new Queue<string>(reached);
        while (queue.TryDequeue(out var node))
        {
            // A signal ends at a rail, and does not come back out of the amplifier itself.
            if (rails.AreTied(node, reference)) continue;
            foreach (var next in touching[node].Where(p => !ReferenceEquals(p, amplifier)).SelectMany(p => p.Nodes).Where(reached.Add)) queue.Enqueue(next);
        }

        return reached;
    }
}
