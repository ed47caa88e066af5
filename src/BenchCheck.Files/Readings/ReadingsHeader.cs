using System.Collections.Frozen;
using System.Collections.Immutable;
using BenchCheck.Core.Metering;
using BenchCheck.Core.Quantities;

namespace BenchCheck.Files;

/// <summary>A column of the wide form: where its values were read.</summary>
internal sealed record PlaceColumn(int Index, ReadingQuantity Quantity, string At, string? Against, string? UnitText);

/// <summary>What the columns of a readings file are.</summary>
/// <param name="Fields">column of each field of the long form that the file has</param>
/// <param name="ValueUnit">unit of the value column from its header; null when the header names none</param>
/// <param name="Places">columns of the wide form; empty for the long form</param>
internal sealed record ReadingsHeader(
    FrozenDictionary<string, int> Fields, string? ValueUnit, ImmutableArray<PlaceColumn> Places, int ColumnCount)
{
    /// <summary>Fields of the long form.</summary>
    public static ImmutableArray<string> LongFields { get; } =
        ["serial", "condition", "quantity", "at", "against", "value", "unit", "meter", "range", "uncertainty", "repeats", "scatter", "time", "note"];

    private static readonly ImmutableArray<string> WideFields = ["serial", "condition", "meter", "time", "note"];

    private const string Forms = "a header row: at,value or node,volts for a row a reading; serial,C1,B1 for a row a board";

    public bool IsWide => !Places.IsEmpty;

    public bool HasSerial => Fields.ContainsKey("serial");

    /// <summary>The cell of a field; empty when the file or the row has none.</summary>
    public string Cell(string[] cells, string field) =>
        Fields.TryGetValue(field, out var index) && index < cells.Length ? CellText.Restore(cells[index]) : "";

    /// <summary>Reads the header row; null, with errors, when the file has no usable header.</summary>
    public static ReadingsHeader? Read(DelimitedRow row, BoardNames names, Action<FileProblem> report, string file)
    {
        void Report(bool isError, string read, string? expected, string? hint) => report(new FileProblem(file, row.Line, 0, isError, read, expected, hint));

        var columns = row.Cells.Select((cell, index) => Split(CellText.Restore(cell), index)).ToList();
        var isLong = columns.Exists(c => c.Name == "at") || columns.Exists(c => c.Name == "value");
        if (isLong) columns = [.. columns.Select(c => c with { Place = null })];
        else columns = [.. columns.Select(c => WideFields.Contains(c.Name) || c.Name.Length == 0 ? c : c with { Place = PlaceOf(c, names) })];
        if (columns.Exists(c => c.Place is null && QuantityText.Number(c.Name, Unit.Volt).IsValue))
        {
            Report(true, $"values in the first row, {TextFault.Quote(string.Join(",", row.Cells))}", Forms, "put a header row above it");
            return null;
        }

        var known = isLong ? LongFields : WideFields;
        if (!isLong && columns.TrueForAll(c => c.Place is null))
        {
            Report(true, $"header {TextFault.Quote(string.Join(",", row.Cells))}", Forms,
                columns.Select(c => NearMiss.Suggest(c.Name, [.. LongFields, .. names.Board.Nodes])).FirstOrDefault(s => s is not null));
            return null;
        }

        var fields = new Dictionary<string, int>(StringComparer.Ordinal);
        var isUsable = true;
        foreach (var column in columns.Where(c => c.Place is null && c.Name.Length > 0))
        {
            if (!known.Contains(column.Name))
            {
                var candidates = isLong ? known : known.AddRange(names.Board.Nodes);
                Report(false, $"unknown column {TextFault.Quote(column.Name)} is not read", NearMiss.List(candidates), NearMiss.Suggest(column.Name, candidates));
            }
            else if (!fields.TryAdd(column.Name, column.Index))
            {
                Report(true, $"column {column.Name} is there twice", "each column once", null);
                isUsable = false;
            }
        }

        foreach (var missing in isLong ? LongFields.Where(f => f is "at" or "value" && !fields.ContainsKey(f)) : [])
        {
            Report(true, $"no column {missing}", Forms, columns.Any(c => !known.Contains(c.Name) && NearMiss.Suggest(c.Name, [missing]) is not null)
                ? $"a column with a similar name is there: write {missing}" : null);
            isUsable = false;
        }

        foreach (var twice in columns.Where(c => c.Place is not null).GroupBy(c => (c.Place!.Quantity, c.Place.At, c.Place.Against)).Where(g => g.Count() > 1))
        {
            Report(true, $"column {TextFault.Quote(twice.First().Name)} is there twice", "each place once", null);
            isUsable = false;
        }

        foreach (var reference in columns.Where(c => c.Place is { } p && p.At == p.Against))
            Report(false, $"column {TextFault.Quote(reference.Name)} is against itself and is not read", null, null);
        var valueUnit = columns.Find(c => c.Name == "value")?.UnitText;
        foreach (var unit in columns.Where(c => c.UnitText is not null && (c.Place is not null || c.Name == "value")).Select(c => c.UnitText!))
        {
            if (QuantityText.UnitWithPrefix(unit).Fault is not { } fault) continue;
            Report(true, $"header: {fault.Read}", fault.Expected, fault.Hint);
            isUsable = false;
        }

        return isUsable ? new ReadingsHeader(fields.ToFrozenDictionary(StringComparer.Ordinal), valueUnit, [.. columns.Where(c => c.Place is { } p && p.At != p.Against).Select(c => c.Place!)], row.Cells.Length) : null;
    }

    private static Column Split(string cell, int index)
    {
        var name = cell.Trim();
        string? unit = null;
        var open = name.LastIndexOfAny(['[', '(']);
        if (open >= 0 && name.Length > open + 1 && name[^1] == (name[open] == '[' ? ']' : ')'))
        {
            unit = name[(open + 1)..^1].Trim();
            name = name[..open].TrimEnd();
        }

        var lower = name.ToLowerInvariant();
        return lower switch
        {
            "node" => new Column(index, "at", null, null),
            "volts" => new Column(index, "value", unit ?? "V", null),
            _ when LongFields.Contains(lower) => new Column(index, lower, unit, null),
            _ => new Column(index, name, unit, null) { Whole = cell.Trim() },
        };
    }

    /// <summary>What a wide column names: a node, two nodes "C1-E1", or, with a unit of current, a part or a pin.</summary>
    private static PlaceColumn? PlaceOf(Column column, BoardNames names)
    {
        // A node's own name may hold brackets or a minus sign, so the longest reading comes first.
        if (column.Whole is { } whole && whole != column.Name && names.Node(whole) is { IsValue: true } exact)
            return new PlaceColumn(column.Index, ReadingQuantity.Voltage, exact.Value, names.Board.Reference, null);
        var unit = column.UnitText is { } text && QuantityText.UnitWithPrefix(text) is { IsValue: true } read ? read.Value.Unit : null;
        if (unit == Unit.Ampere)
            return names.Joint(column.Name) is { IsValue: true } joint ? new PlaceColumn(column.Index, ReadingQuantity.Current, joint.Value, null, column.UnitText) : null;
        var quantity = unit == Unit.Ohm ? ReadingQuantity.Resistance : ReadingQuantity.Voltage;
        if (names.Node(column.Name) is { IsValue: true } node)
            return new PlaceColumn(column.Index, quantity, node.Value, names.Board.Reference, column.UnitText);
        for (var minus = column.Name.IndexOf('-', StringComparison.Ordinal); minus > 0; minus = column.Name.IndexOf('-', minus + 1))
        {
            if (names.Node(column.Name[..minus].Trim()) is { IsValue: true } at && names.Node(column.Name[(minus + 1)..].Trim()) is { IsValue: true } against)
                return new PlaceColumn(column.Index, quantity, at.Value, against.Value, column.UnitText);
        }

        return null;
    }

    private sealed record Column(int Index, string Name, string? UnitText, PlaceColumn? Place)
    {
        public string? Whole { get; init; }
    }
}
