using System.Collections.Immutable;
using System.Globalization;
using Tomlyn.Syntax;

namespace BenchCheck.Files;

/// <summary>Where a part stands in the text of a board file: on a line of [parts], or as a table [parts.R1] of its own.</summary>
internal sealed class WrittenPart
{
    private readonly SyntaxNode name;
    private readonly InlineTableSyntax? line;
    private readonly ImmutableArray<KeyValueSyntax> items;

    private WrittenPart(string designator, SyntaxNode name, InlineTableSyntax? line, IEnumerable<KeyValueSyntax> items) =>
        (Designator, this.name, this.line, this.items) = (designator, name, line, [.. items]);

    public string Designator { get; }

    public bool IsTable => line is null;

    /// <summary>Position of the first character of its name.</summary>
    public int Start => name.Span.Start.Offset;

    /// <summary>Position of its last character, a comment behind it not counted.</summary>
    public int End => line is not null ? BoardText.End(line) : items.IsEmpty ? BoardText.End(name) : BoardText.End(items[^1].Value!);

    public static WrittenPart OfLine(string designator, KeySyntax key, InlineTableSyntax line) =>
        new(designator, key.Key!, line, line.Items.Select(i => i.KeyValue).OfType<KeyValueSyntax>().Where(i => i is { Key: not null, Value: not null }));

    public static WrittenPart OfTable(string designator, TableSyntaxBase table, KeySyntax name) =>
        new(designator, name.DotKeys.GetChild(0)!.Key!, null, table.Items.Where(i => i is { Key: not null, Value: not null }));

    public bool Has(string key) => Item(key) is not null;

    /// <summary>Columns from the name to the equals sign, less the blank before it.</summary>
    public int NameWidth(string text) => line is null ? 0 : Math.Max(0, text.IndexOf('=', BoardText.End(name) + 1) - Start - 1);

    /// <summary>A value as the form shows it; null when it is nothing that a form can show.</summary>
    public string? TextOf(string key) => Item(key)?.Value is { } value ? TextOf(value) : null;

    /// <summary>Nodes in the order of the pins; null when they are not written as a list or a table of names.</summary>
    public ImmutableArray<string>? Nodes(ImmutableArray<string> pins)
    {
        var values = PinValues(pins);
        return values is null || values.Any(v => v is null) ? null : [.. values.Select(v => v!.Value ?? "")];
    }

    /// <summary>What to change in the text so that the part reads as <paramref name="after"/>.</summary>
    public IEnumerable<TextEdit> Edits(string text, PartText before, PartText after)
    {
        if (after.Designator != Designator) yield return At(name, PartLine.Key(after.Designator));
        var pins = PinValues(PartKeys.PinsOf(before.Kind))!;
        for (var i = 0; i < pins.Count; i++)
        {
            if (after.Nodes[i] != before.Nodes[i]) yield return At(pins[i]!, PartLine.Quoted(after.Nodes[i]));
        }

        string[] keys = [.. PartKeys.Of(before.Kind).Select(k => k.Name).Where(k => before.Value(k) != after.Value(k) || Has(k) && after.Value(k).Length == 0)];
        foreach (var key in keys.Where(k => Has(k) && after.Value(k).Length > 0)) yield return At(Item(key)!.Value!, PartLine.Value(key, after.Value(key)));
        KeyValueSyntax[] removed = [.. keys.Where(k => after.Value(k).Length == 0).Select(k => Item(k)!)];
        foreach (var item in removed) yield return Removal(text, item, items.TakeWhile(i => i != item).All(removed.Contains));
        var added = keys.Where(k => !Has(k)).Select(k => PartLine.Pair(k, after)).ToArray();
        if (added.Length == 0) yield break;
        var last = BoardText.End(items[^1].Value!) + 1;
        yield return IsTable
            ? new TextEdit(LineEnd(text, last), 0, string.Concat(added.Select(a => BoardText.NewLine(text) + a)))
            : new TextEdit(last, 0, string.Concat(added.Select(a => ", " + a)));
    }

    private static TextEdit At(SyntaxNode node, string replacement) => new(node.Span.Start.Offset, BoardText.End(node) + 1 - node.Span.Start.Offset, replacement);

    /// <summary>A key on a line goes with the comma before it, or, where nothing is left before it, with the comma behind it; "kind" and "pins" always stay.</summary>
    private TextEdit Removal(string text, KeyValueSyntax item, bool isFirst)
    {
        var (start, end) = (item.Key!.Span.Start.Offset, BoardText.End(item.Value!) + 1);
        if (IsTable)
        {
            start = text.LastIndexOf('\n', Math.Max(0, start - 1)) + 1;
            end = Math.Min(text.Length, text.IndexOf('\n', end) is >= 0 and var line ? line + 1 : text.Length);
        }
        else if (isFirst)
        {
            end = items[items.IndexOf(item) + 1].Key!.Span.Start.Offset;
        }
        else
        {
            start = text.LastIndexOf(',', start);
        }

        return new TextEdit(start, end - start, "");
    }

    private static int LineEnd(string text, int from)
    {
        var end = text.IndexOf('\n', Math.Min(from, text.Length));
        return end < 0 ? text.Length : end > 0 && text[end - 1] == '\r' ? end - 1 : end;
    }

    private KeyValueSyntax? Item(string key) => items.FirstOrDefault(i => i.Key!.DotKeys.ChildrenCount == 0 && BoardText.NameOf(i.Key.Key) == key);

    private List<StringValueSyntax?>? PinValues(ImmutableArray<string> pins) => Item("pins")?.Value switch
    {
        ArraySyntax list when list.Items.ChildrenCount == pins.Length => [.. list.Items.Select(i => i.Value as StringValueSyntax)],
        InlineTableSyntax table => [.. pins.Select(pin => table.Items.Select(i => i.KeyValue).FirstOrDefault(i => BoardText.NameOf(i?.Key?.Key) == pin)?.Value as StringValueSyntax)],
        _ => null,
    };

    private static string? TextOf(ValueSyntax value) => value switch
    {
        StringValueSyntax text => text.Value,
        IntegerValueSyntax integer => integer.Value.ToString(CultureInfo.InvariantCulture),
        FloatValueSyntax number => number.Value.ToString("R", CultureInfo.InvariantCulture),
        ArraySyntax list => string.Join(", ", list.Items.Select(i => i.Value is StringValueSyntax text ? text.Value : "")),
        _ => null,
    };
}
