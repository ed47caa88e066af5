using System.Collections.Immutable;
using System.Text.Json;
using BenchCheck.Core.Batches;
using BenchCheck.Core.Checking;
using BenchCheck.Core.Metering;
using BenchCheck.Core.Quantities;

namespace BenchCheck.Files;

/// <summary>The results of a batch as JSON lines: <see cref="ResultJson"/> a board, or its serial with the reason why it could not be checked.</summary>
public static class BatchJson
{
    public static string FailureLine(ReadingSet board, string reason)
    {
        ArgumentNullException.ThrowIfNull(board);
        return JsonSerializer.Serialize(new Dictionary<string, object?> { ["format"] = ResultJson.Format, ["serial"] = board.Serial, ["verdict"] = null, ["failure"] = reason });
    }

    /// <summary>A line read back; null when it is none.</summary>
    public static BoardOutcome? Outcome(string line)
    {
        try
        {
            using var document = JsonDocument.Parse(line);
            var root = document.RootElement;
            var serial = root.GetProperty("serial").GetString();
            if (root.TryGetProperty("failure", out var failure)) return BoardOutcome.Failed(serial, failure.GetString() ?? "");
            if (ResultWords.BoardVerdictOf(root.GetProperty("verdict").GetString()) is not { } verdict) return null;
            var suspect = root.GetProperty("suspects").EnumerateArray().Select(s => BoardOutcome.SuspectName(
                s.GetProperty("fault").GetString() ?? "", Texts(s, "parts"), Texts(s, "nodes"))).FirstOrDefault();
            return new BoardOutcome(
                serial, verdict, suspect, [.. root.GetProperty("readings").EnumerateArray().Select(Place)],
                [.. root.GetProperty("parameters").EnumerateArray().Where(p => p.GetProperty("parameter").GetString() != "scale error").Select(Estimate)]);
        }
        catch (Exception failure) when (failure is JsonException or InvalidOperationException or KeyNotFoundException or FormatException)
        {
            return null;
        }
    }

    private static PlaceOutcome Place(JsonElement row)
    {
        var quantity = row.GetProperty("quantity").GetString();
        var against = row.GetProperty("against").GetString();
        var verdict = row.GetProperty("verdict").GetString() switch { "out" => ReadingVerdict.Out, "doubtful" => ReadingVerdict.Doubtful, _ => ReadingVerdict.In };
        return new PlaceOutcome($"{(quantity == "voltage" ? "" : quantity + " ")}{row.GetProperty("at").GetString()}{(against is null ? "" : "-" + against)} ({row.GetProperty("condition").GetString()})", verdict);
    }

    private static EstimateOutcome Estimate(JsonElement row)
    {
        var name = $"{row.GetProperty("part").GetString()} {row.GetProperty("parameter").GetString()}";
        var condition = row.GetProperty("condition").GetString();
        return new EstimateOutcome(
            condition is null ? name : $"{name} ({condition})", new Unit(row.GetProperty("unit").GetString() ?? "1"), Number(row, "estimate"), Number(row, "standardUncertainty"));
    }

    private static double Number(JsonElement row, string name) => row.GetProperty(name) is { ValueKind: JsonValueKind.Number } value ? value.GetDouble() : double.NaN;

    private static ImmutableArray<string> Texts(JsonElement row, string name) => [.. row.GetProperty(name).EnumerateArray().Select(t => t.GetString() ?? "")];
}
