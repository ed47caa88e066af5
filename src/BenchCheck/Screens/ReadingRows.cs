using System.Collections.Immutable;
using BenchCheck.Core.Checking;
using BenchCheck.Core.Metering;

namespace BenchCheck.Screens;

/// <summary>The rows of the readings table: what was read in the condition, and every node where nothing was read yet.</summary>
internal static class ReadingRows
{
    public static ImmutableArray<ReadingRow> Of(BenchSession session)
    {
        var board = session.Bench.Board;
        var condition = board.FindCondition(session.Condition);
        if (condition is null) return [];
        var quantity = condition.SuppliesRemoved ? ReadingQuantity.Resistance : ReadingQuantity.Voltage;
        Reading[] taken = [.. session.Readings.Readings.Where(r => r.Condition == condition.Name)];
        var results = session.Result?.Readings.ToLookup(r => Place.Of(r.Reading, board));
        ReadingRow[] read = [.. taken.Select(r => new ReadingRow(Place.Of(r, board), r, ResultOf(r), null))];
        Place[] nodes = condition.IsSmallSignal
            ? [.. Signals(session).Select(s => new Place(s.Condition, s.Quantity, s.At, s.Against ?? board.Reference))]
            : [.. board.Nodes.Where(n => n != board.Reference).Select(n => new Place(condition.Name, quantity, n, board.Reference))];
        IEnumerable<ReadingRow> rows = nodes.SelectMany(n => read.Any(r => r.Place == n) ? read.Where(r => r.Place == n) : [new ReadingRow(n, null, null, Expected(session, n))]);
        rows = rows.Concat(read.Where(r => !nodes.Contains(r.Place)));
        if (session.Suggested is { } next && next.Condition == condition.Name && !rows.Any(r => r.Place == next)) rows = rows.Append(new ReadingRow(next, null, null, null));
        rows = session.Order switch
        {
            RowOrder.Worst => rows.OrderByDescending(r => r.Result is { } result ? Math.Abs(result.En) : r.Reading is null ? -1 : 0),
            RowOrder.Entered => rows.OrderBy(r => r.Reading is { } reading ? Array.IndexOf(taken, reading) : int.MaxValue),
            _ => rows,
        };
        return [.. rows.Where(r => !session.OnlyFlagged || r.IsFlagged || r.Place == session.Cursor)];

        ReadingResult? ResultOf(Reading reading) => results?[Place.Of(reading, board)].FirstOrDefault(r => reading.IsRepeatOf(r.Reading) && r.Reading.Value.Equals(reading.Value));
    }

    /// <summary>What can be read of the small signals: gains to the nodes, resistances looking in.</summary>
    private static IEnumerable<PredictedSignal> Signals(BenchSession session) =>
        session.Prediction?.Signals.Where(s => s.Condition == session.Condition) ?? [];

    private static Expected? Expected(BenchSession session, Place place)
    {
        if (Signals(session).FirstOrDefault(s => s.Quantity == place.Quantity && s.At == place.At && (s.Against ?? session.Bench.Board.Reference) == place.Against) is { } signal)
            return new Expected(signal.Value, signal.BandLow, signal.BandHigh, signal.Influences);
        var predicted = session.Prediction?.Nodes.FirstOrDefault(n => n.Condition == place.Condition && n.Node == place.At);
        if (place.Quantity == ReadingQuantity.Voltage && predicted is not null) return new Expected(predicted.Volts, predicted.BandLow, predicted.BandHigh, predicted.Influences);
        var unmeasured = session.Result?.Unmeasured.FirstOrDefault(n => n.Condition == place.Condition && n.Node == place.At);
        return place.Quantity == ReadingQuantity.Voltage && unmeasured is not null ? new Expected(unmeasured.Predicted, unmeasured.BandLow, unmeasured.BandHigh, []) : null;
    }
}
