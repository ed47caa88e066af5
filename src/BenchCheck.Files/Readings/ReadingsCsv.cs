using System.Globalization;
using BenchCheck.Core.Metering;
using CsvHelper;

namespace BenchCheck.Files;

/// <summary>Writes readings as a long-form CSV file (RFC 4180) that <see cref="ReadingsFile"/> reads back to the same readings.</summary>
/// <remarks>
/// Values stand in SI units with all their digits. Text that a spreadsheet would take for a formula is protected; reading undoes that. Columns
/// that no reading needs are left out. A mean of repeats is one row that says how many it is of and how they scatter: only lines are not kept.
/// </remarks>
public static class ReadingsCsv
{
    private static readonly (string Name, Func<string?, Reading, string> Cell, bool IsAlwaysThere)[] Columns =
    [
        ("serial", (serial, _) => CellText.Protect(serial ?? ""), false),
        ("condition", (_, r) => CellText.Protect(r.Condition), true),
        ("quantity", (_, r) => r.Quantity.Name(), true),
        ("at", (_, r) => CellText.Protect(r.At), true),
        ("against", (_, r) => CellText.Protect(r.Against ?? ""), true),
        ("value", (_, r) => Digits(r.Value), true),
        ("unit", (_, r) => r.Quantity.Unit().Symbol, true),
        ("meter", (_, r) => CellText.Protect(r.Meter ?? ""), false),
        ("range", (_, r) => Digits(r.Range), false),
        ("uncertainty", (_, r) => Digits(r.StatedUncertainty), false),
        ("repeats", (_, r) => r.Repeats > 1 ? r.Repeats.ToString(CultureInfo.InvariantCulture) : "", false),
        ("scatter", (_, r) => r.Repeats > 1 ? Digits(r.RepeatUncertainty) : "", false),
        ("time", (_, r) => r.Time?.ToString("O", CultureInfo.InvariantCulture) ?? "", false),
        ("note", (_, r) => CellText.Protect(r.Note ?? ""), false),
    ];

    public static string Text(ReadingSet set)
    {
        using var text = new StringWriter(CultureInfo.InvariantCulture);
        Write(text, [set]);
        return text.ToString();
    }

    /// <param name="target">receives the rows; stays open</param>
    /// <param name="sets">boards in their order</param>
    public static void Write(TextWriter target, IReadOnlyCollection<ReadingSet> sets)
    {
        ArgumentNullException.ThrowIfNull(sets);
        var columns = Columns.Where(c => c.IsAlwaysThere || sets.Any(s => s.Readings.Any(r => c.Cell(s.Serial, r).Length > 0))).ToList();
        using var csv = CsvTarget.Open(target);
        csv.WriteRecord([.. columns.Select(c => c.Name)]);
        foreach (var set in sets)
        {
            foreach (var reading in set.Readings) csv.WriteRecord([.. columns.Select(c => c.Cell(set.Serial, reading))]);
        }
    }

    private static string Digits(double? value) => value?.ToString("R", CultureInfo.InvariantCulture) ?? "";
}
