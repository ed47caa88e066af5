using System.Collections.Immutable;
using BenchCheck.Core.Metering;
using BenchCheck.Core.Quantities;

namespace BenchCheck.Files;

/// <summary>What each column of a table is, as the header of a readings file would say it.</summary>
/// <param name="Names">a field of the long form, a node, or empty for a column that is not read; a unit may follow in brackets</param>
/// <param name="HasHeader">false when the first row already holds values</param>
public sealed record ColumnMap(ImmutableArray<string> Names, bool HasHeader)
{
    /// <summary>Rows that a guess looks at.</summary>
    public const int RowsSeen = 20;

    private const string At = "at";
    private const string Value = "value";

    /// <summary>What a column may be on a board, apart from not being read.</summary>
    public static ImmutableArray<string> Choices(Bench bench)
    {
        ArgumentNullException.ThrowIfNull(bench);
        return [.. ReadingsHeader.LongFields, .. bench.Board.Nodes.Where(n => n != bench.Board.Reference && !ReadingsHeader.LongFields.Contains(n))];
    }

    /// <summary>A first guess: by the header where it says something, else by what stands in the column.</summary>
    /// <param name="rows">the first rows of the table, the header with them; not empty</param>
    public static ColumnMap Guess(ImmutableArray<ImmutableArray<string>> rows, Bench bench)
    {
        ArgumentNullException.ThrowIfNull(bench);
        var names = new BoardNames(bench);
        var hasHeader = !rows[0].Any(c => QuantityText.Number(c, Unit.Volt).IsValue);
        var choices = Choices(bench);
        var guessed = rows[0].Select(c => hasHeader ? choices.FirstOrDefault(k => k.Equals(FieldOf(c), StringComparison.OrdinalIgnoreCase)) ?? "" : "").ToArray();
        var isWide = guessed.Any(g => bench.Board.Nodes.Contains(g));
        for (var i = 0; i < guessed.Length && !isWide; i++)
        {
            string[] cells = [.. rows.Skip(hasHeader ? 1 : 0).Select(r => i < r.Length ? r[i] : "").Where(c => c.Length > 0)];
            if (guessed[i].Length > 0 || cells.Length == 0) continue;
            if (!guessed.Contains(At) && cells.All(c => names.Node(c).IsValue)) guessed[i] = At;
            else if (!guessed.Contains(Value) && cells.All(c => QuantityText.Number(c, Unit.Volt).IsValue || QuantityText.Number(c, Unit.Ohm).IsValue)) guessed[i] = Value;
        }

        return new ColumnMap([.. guessed.Select((name, i) => Named(name, hasHeader ? rows[0][i] : ""))], hasHeader);
    }

    /// <summary>A column's new name; a unit in the brackets of its header stays with it.</summary>
    public static string Named(string field, string header)
    {
        ArgumentNullException.ThrowIfNull(header);
        var open = header.LastIndexOfAny(['[', '(']);
        return field.Length == 0 || open < 0 || !header.EndsWith(header[open] == '[' ? ']' : ')') ? field : $"{field} {header[open..]}";
    }

    /// <summary>The name without its unit.</summary>
    public static string FieldOf(string name)
    {
        ArgumentNullException.ThrowIfNull(name);
        var open = name.LastIndexOfAny(['[', '(']);
        return (open > 0 ? name[..open] : name).Trim();
    }

    /// <summary>The rows of a table under these names.</summary>
    internal IEnumerable<DelimitedRow> Under(IEnumerable<DelimitedRow> rows)
    {
        var isFirst = true;
        foreach (var row in rows)
        {
            if (isFirst) yield return row with { Cells = [.. Names], Malformed = null };
            if (!isFirst || !HasHeader) yield return row;
            isFirst = false;
        }
    }
}
