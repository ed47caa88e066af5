using System.Collections.Immutable;
using BenchCheck.Core.Checking;
using BenchCheck.Core.Quantities;

namespace BenchCheck.Core.Batches;

/// <summary>A batch in a few tables, gathered board by board.</summary>
public sealed class BatchSummary
{
    private readonly Dictionary<BoardVerdict, int> verdicts = [];
    private readonly Dictionary<string, int> suspects = new(StringComparer.Ordinal);
    private readonly List<string> placeOrder = [];
    private readonly Dictionary<string, (int Readings, int Out)> places = new(StringComparer.Ordinal);
    private readonly List<(string Name, Unit Unit)> estimateOrder = [];
    private readonly Dictionary<string, DistributionBuilder> estimates = new(StringComparer.Ordinal);

    /// <summary>Boards, those that could not be checked included.</summary>
    public int Boards { get; private set; }

    public int Failed { get; private set; }

    public int Agreeing => verdicts.GetValueOrDefault(BoardVerdict.Agrees);

    public int Disagreeing => verdicts.GetValueOrDefault(BoardVerdict.Disagrees);

    public int Undecided => verdicts.GetValueOrDefault(BoardVerdict.Undecided);

    /// <summary>Likeliest faults of the boards that do not agree, commonest first.</summary>
    public ImmutableArray<(string Suspect, int Boards)> Suspects =>
        [.. suspects.OrderByDescending(s => s.Value).ThenBy(s => s.Key, StringComparer.Ordinal).Select(s => (s.Key, s.Value))];

    /// <summary>For each place, how often it was read and how often the reading was out of tolerance; in the order of the readings.</summary>
    public ImmutableArray<(string Place, int Readings, int Out)> Places => [.. placeOrder.Select(p => (p, places[p].Readings, places[p].Out))];

    /// <summary>Each estimate over the boards that agree: a faulty board's estimates, made as if it were healthy, tell nothing about the lot.</summary>
    public ImmutableArray<(string Name, Unit Unit, Distribution Distribution)> Estimates =>
        [.. estimateOrder.Select(e => (e.Name, e.Unit, estimates[e.Name].Build())).Where(e => e.Item3 is not null).Select(e => (e.Name, e.Unit, e.Item3!))];

    /// <summary>The values behind <see cref="Estimates"/>, in the order of the boards.</summary>
    public IReadOnlyList<BatchValue> PointsOf(string name) => estimates[name].Kept;

    public void Add(BoardOutcome board)
    {
        ArgumentNullException.ThrowIfNull(board);
        Boards++;
        if (board.Verdict is not { } verdict)
        {
            Failed++;
            return;
        }

        verdicts[verdict] = verdicts.GetValueOrDefault(verdict) + 1;
        if (verdict != BoardVerdict.Agrees && board.Suspect is { } suspect) suspects[suspect] = suspects.GetValueOrDefault(suspect) + 1;
        foreach (var place in board.Places)
        {
            if (!places.TryGetValue(place.Place, out var counts)) placeOrder.Add(place.Place);
            places[place.Place] = (counts.Readings + 1, counts.Out + (place.Verdict == ReadingVerdict.Out ? 1 : 0));
        }

        if (verdict != BoardVerdict.Agrees) return;
        foreach (var estimate in board.Estimates)
        {
            if (!estimates.TryGetValue(estimate.Name, out var builder))
            {
                estimates[estimate.Name] = builder = new DistributionBuilder();
                estimateOrder.Add((estimate.Name, estimate.Unit));
            }

            builder.Add(board.Serial, estimate.Value);
        }
    }
}
