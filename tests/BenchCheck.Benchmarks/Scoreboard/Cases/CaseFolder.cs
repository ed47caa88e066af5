using System.Collections.Immutable;
using System.Text.Json;
using BenchCheck.Benchmarks.Scoreboard.Faults;
using BenchCheck.Core.Diagnosis;
using BenchCheck.Core.Metering;
using BenchCheck.Files;

namespace BenchCheck.Benchmarks.Scoreboard.Cases;

/// <summary>Reads cases kept as folders: board.toml, readings.csv and truth.json each.</summary>
public static class CaseFolder
{
    public static ImmutableArray<KnownCase> Read(DirectoryInfo root, TextWriter problems)
    {
        ArgumentNullException.ThrowIfNull(root);
        ArgumentNullException.ThrowIfNull(problems);
        if (!root.Exists) return [];
        return [.. root.GetDirectories().OrderBy(d => d.Name, StringComparer.Ordinal).Select(d => Case(d, problems)).OfType<KnownCase>()];
    }

    private static KnownCase? Case(DirectoryInfo folder, TextWriter problems)
    {
        var board = BoardFile.Read(Path.Combine(folder.FullName, "board.toml"));
        foreach (var problem in board.Problems) problems.WriteLine(problem);
        if (board.Bench is not { } bench) return null;
        var readings = ReadingsFile.Read(Path.Combine(folder.FullName, "readings.csv"), bench);
        foreach (var problem in readings.Problems) problems.WriteLine(problem);
        if (readings.Sets.FirstOrDefault() is not { } set) return null;
        using var document = JsonDocument.Parse(File.ReadAllText(Path.Combine(folder.FullName, "truth.json")));
        var truth = document.RootElement;
        return new KnownCase(
            folder.Name, bench, set, [.. truth.GetProperty("faults").EnumerateArray().Select(f => Fault(f, set))], truth.GetProperty("visibility").GetDouble(),
            truth.GetProperty("values").EnumerateObject().ToImmutableDictionary(v => (v.Name, ""), v => v.Value.GetDouble()), Gains(truth, set));
    }

    private static TruthFault Fault(JsonElement fault, ReadingSet readings)
    {
        var kind = fault.GetProperty("fault").GetString()!;
        var known = new TruthFault(
            kind == "pin open" ? FaultKind.Open : kind, Texts(fault, "parts"), Texts(fault, "pins"), Texts(fault, "nodes"),
            fault.TryGetProperty("value", out var value) && value.ValueKind == JsonValueKind.Number ? value.GetDouble() : null);
        if (!fault.TryGetProperty("reading", out var reading)) return known;
        var at = reading.GetProperty("at").GetString();
        var condition = reading.GetProperty("condition").GetString();
        var row = readings.Readings.ToList().FindIndex(r => r.At == at && (condition is null || r.Condition == condition));
        return known with { Row = row, How = fault.GetProperty("how").GetString() };
    }

    private static ImmutableArray<string> Texts(JsonElement element, string name) =>
        element.TryGetProperty(name, out var list) ? [.. list.EnumerateArray().Select(x => x.GetString()!)] : [];

    /// <summary>Geometric mean over the conditions with readings in which the transistor is active.</summary>
    private static ImmutableDictionary<string, double> Gains(JsonElement truth, ReadingSet readings)
    {
        var conditions = readings.Readings.Select(r => r.Condition).ToHashSet();
        var gains = ImmutableDictionary.CreateBuilder<string, double>();
        foreach (var transistor in truth.GetProperty("transistors").EnumerateObject())
        {
            var active = transistor.Value.EnumerateObject()
                .Where(c => conditions.Contains(c.Name) && c.Value.GetProperty("region").GetString() == "active" && c.Value.GetProperty("gain").ValueKind == JsonValueKind.Number)
                .Select(c => c.Value.GetProperty("gain").GetDouble()).ToArray();
            if (active.Length > 0) gains[transistor.Name] = Math.Exp(active.Average(Math.Log));
        }

        return gains.ToImmutable();
    }
}
