using BenchCheck.Benchmarks.Scoreboard.Physics;
using BenchCheck.Core.Boards;
using BenchCheck.Core.Metering;

namespace BenchCheck.Benchmarks.Scoreboard.Cases;

/// <summary>Which places a person happened to read: all of them on half of the boards, else some conditions and some nodes.</summary>
public static class ReadingChoice
{
    private const int FewestReadings = 2;

    public static Place[] From(Board board, Random random)
    {
        ArgumentNullException.ThrowIfNull(board);
        ArgumentNullException.ThrowIfNull(random);
        var all = TruthBench.Places(board).Where(p => p.Quantity == ReadingQuantity.Voltage).ToArray();
        var chosen = random.Next(2) == 0 ? all : Some(all, random);
        var resistances = TruthBench.Places(board).Where(p => p.Quantity == ReadingQuantity.Resistance && random.Next(4) == 0).ToArray();
        return [.. chosen, .. Across(board, chosen, random), .. random.Next(4) == 0 ? resistances : []];
    }

    private static Place[] Some(Place[] all, Random random)
    {
        while (true)
        {
            var conditions = all.Select(p => p.Condition).Distinct().Where(_ => random.Next(10) < 7).ToHashSet();
            Place[] some = [.. all.Where(p => conditions.Contains(p.Condition) && random.Next(10) < 7)];
            if (some.Length >= FewestReadings) return some;
        }
    }

    /// <summary>On one board in five a reading or two straight across a part.</summary>
    private static Place[] Across(Board board, Place[] chosen, Random random)
    {
        if (random.Next(5) > 0) return [];
        var pairs = TruthBench.Neighbours(board).Where(x => x.B != board.Reference).ToArray();
        return pairs.Length == 0 ? [] : Enumerable.Range(0, 1 + random.Next(2)).Select(_ => pairs[random.Next(pairs.Length)]).Distinct()
            .Select(x => new Place(chosen[random.Next(chosen.Length)].Condition, ReadingQuantity.Voltage, x.A, x.B)).ToArray();
    }
}
