using BenchCheck.Core.Boards;

namespace BenchCheck.Core.Diagnosis.Faults;

/// <summary>A condition that was not set up: the board was left as another condition has it.</summary>
internal static class ConditionFaults
{
    public static IEnumerable<FaultHypothesis> Of(Board board)
    {
        var powered = board.Conditions.Where(c => c is { SuppliesRemoved: false, IsSmallSignal: false }).ToArray();
        foreach (var meant in powered)
        {
            foreach (var left in powered.Where(c => c.Name != meant.Name))
            {
                string[] parts = [.. Differing(meant, left)];
                if (parts.Length == 0) continue;
                var conditions = board.Conditions.Select(c => c.Name == meant.Name ? c with { Set = left.Set, Switches = left.Switches } : c);
                yield return new FaultHypothesis(
                    new FaultName(FaultKind.SwitchPosition, $"{meant.Name} not set up, the board was still in {left.Name}") { Parts = [.. parts] }, board.In([.. conditions]));
            }
        }
    }

    /// <summary>Supplies and switches that the two conditions set differently.</summary>
    private static IEnumerable<string> Differing(Condition a, Condition b) =>
        a.Set.Keys.Union(b.Set.Keys).Where(k => a.Set.GetValueOrDefault(k) != b.Set.GetValueOrDefault(k))
            .Concat(a.Switches.Keys.Union(b.Switches.Keys).Where(k => a.Switches.GetValueOrDefault(k) != b.Switches.GetValueOrDefault(k)))
            .Order(StringComparer.Ordinal);
}
