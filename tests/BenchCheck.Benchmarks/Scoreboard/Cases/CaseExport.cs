using System.Collections.Immutable;
using System.Globalization;
using System.Text;
using System.Text.Json;
using BenchCheck.Benchmarks.Scoreboard.Physics;
using BenchCheck.Core.Metering;
using BenchCheck.Core.Quantities;

namespace BenchCheck.Benchmarks.Scoreboard.Cases;

/// <summary>Writes a case as a folder: board.toml, readings.csv and truth.json.</summary>
public static class CaseExport
{
    private static readonly JsonSerializerOptions Indented = new() { WriteIndented = true, Encoder = System.Text.Encodings.Web.JavaScriptEncoder.UnsafeRelaxedJsonEscaping };

    public static void Write(DirectoryInfo root, TruthCase truth)
    {
        ArgumentNullException.ThrowIfNull(root);
        ArgumentNullException.ThrowIfNull(truth);
        var folder = Directory.CreateDirectory(Path.Combine(root.FullName, string.Create(CultureInfo.InvariantCulture, $"{truth.Seed:D10}")));
        File.WriteAllText(Path.Combine(folder.FullName, "board.toml"), BoardText.Of(truth.Bench));
        File.WriteAllText(Path.Combine(folder.FullName, "readings.csv"), Readings(truth.Readings));
        File.WriteAllText(Path.Combine(folder.FullName, "truth.json"), Truth(truth));
    }

    private static string Readings(ReadingSet readings)
    {
        var text = new StringBuilder("condition,quantity,at,against,value,unit\n");
        foreach (var r in readings.Readings)
            text.Append(CultureInfo.InvariantCulture, $"{r.Condition},{r.Quantity.Name()},{r.At},{r.Against},{r.Value:G12},{(r.Quantity == ReadingQuantity.Resistance ? "ohm" : "V")}\n");
        return text.ToString();
    }

    private static string Truth(TruthCase truth)
    {
        var known = KnownCase.Of(truth);
        var bench = new TruthBench(truth.Faulty, truth.Bench.Meters[0], new TruthSolver());
        var conditions = truth.Rows.Where(r => r.Quantity == ReadingQuantity.Voltage).Select(r => r.Condition).Distinct().ToArray();
        return JsonSerializer.Serialize(
            new
            {
                board = truth.Bench.Board.Title,
                seed = truth.Seed,
                faults = truth.Faults.Select(f => new Dictionary<string, object?>
                {
                    ["fault"] = f.Kind, ["parts"] = f.Parts, ["pins"] = f.Pins, ["nodes"] = f.Nodes, ["value"] = f.Value,
                }.Concat(f.Row < 0 ? [] : [KeyValuePair.Create("reading", (object?)new { at = truth.Rows[f.Row].At, condition = truth.Rows[f.Row].Condition }), KeyValuePair.Create("how", (object?)f.How)])
                    .ToDictionary()),
                visibility = truth.Visibility,
                values = known.Values.Where(v => v.Key.Condition.Length == 0).ToImmutableSortedDictionary(v => v.Key.Part, v => v.Value),
                transistors = truth.Faulty.Parts.OfType<PhysicalTransistor>().ToDictionary(
                    q => q.Designator, q => conditions.ToDictionary(c => c, c => new { region = bench.Bare(c).ActiveGain(q.Designator) is null ? "not active" : "active", gain = bench.Bare(c).ActiveGain(q.Designator) })),
            },
            Indented);
    }
}
