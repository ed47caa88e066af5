using System.Collections.Immutable;
using BenchCheck.Core.Quantities;
using Tomlyn.Parsing;
using Tomlyn.Syntax;

namespace BenchCheck.Files;

/// <summary>The text of a board file, changed part by part: whatever is not asked to change stays as it was written, comments and spacing included.</summary>
/// <remarks>Immutable. Whether the board that a text describes makes sense is for <see cref="BoardFile.Parse"/> to say.</remarks>
public sealed class BoardText
{
    private const string NotHere = "a part that is written in a way that cannot be changed here";
    private readonly ImmutableArray<WrittenPart> parts;

    private BoardText(string text, ImmutableArray<WrittenPart> parts, int? heading) => (Text, this.parts, Heading) = (text, parts, heading);

    public string Text { get; }

    /// <summary>Where the line of [parts] ends; null when there is none.</summary>
    private int? Heading { get; }

    public static BoardText Of(string text)
    {
        ArgumentNullException.ThrowIfNull(text);
        var document = SyntaxParser.Parse(text + "\n", "board", validate: false);
        var parts = ImmutableArray.CreateBuilder<WrittenPart>();
        int? heading = null;
        foreach (var table in document.Tables)
        {
            if (table.Name is not { } name || NameOf(name.Key) != "parts") continue;
            if (name.DotKeys.ChildrenCount == 1) parts.Add(WrittenPart.OfTable(NameOf(name.DotKeys.GetChild(0)!.Key), table, name));
            if (name.DotKeys.ChildrenCount > 0) continue;
            heading = End(name) + 1;
            foreach (var item in table.Items)
            {
                if (item is { Key: { } key, Value: InlineTableSyntax inline } && key.DotKeys.ChildrenCount == 0) parts.Add(WrittenPart.OfLine(NameOf(key.Key), key, inline));
            }
        }

        return new BoardText(text, parts.ToImmutable(), heading);
    }

    /// <summary>A part as it is written; null when there is none of that designator, or it is written in a way that cannot be changed here.</summary>
    public PartText? Part(string designator)
    {
        if (parts.FirstOrDefault(p => p.Designator == designator) is not { } part || part.TextOf("kind") is not { } kind) return null;
        var pins = PartKeys.PinsOf(kind);
        return pins.IsEmpty || part.Nodes(pins) is not { } nodes ? null
            : new PartText(designator, kind, nodes, PartKeys.Of(kind).Where(k => part.Has(k.Name)).ToImmutableSortedDictionary(k => k.Name, k => part.TextOf(k.Name) ?? "", StringComparer.Ordinal));
    }

    /// <summary>The text with a part changed; its kind stays.</summary>
    /// <param name="designator">which part; <paramref name="part"/> may bring another designator</param>
    public Parsed<BoardText> Changed(string designator, PartText part)
    {
        ArgumentNullException.ThrowIfNull(part);
        if (parts.FirstOrDefault(p => p.Designator == designator) is not { } written || Part(designator) is not { } before || before.Kind != part.Kind)
            return new TextFault(NotHere, "one line: R1 = { kind = …, pins = … }", "edit the file by hand");
        return Checked(Of(TextEdit.Apply(Text, written.Edits(Text, before, part))), part);
    }

    /// <summary>The text with one more part, after the last of its class or else after the last of all.</summary>
    public Parsed<BoardText> Added(PartText part)
    {
        ArgumentNullException.ThrowIfNull(part);
        if (parts.Any(p => p.Designator == part.Designator)) return new TextFault($"{TextFault.Quote(part.Designator)}, which is there already", "a designator that is not in use");
        var letter = PartKeys.LetterOf(part.Kind);
        var after = parts.LastOrDefault(p => !p.IsTable && p.Designator.StartsWith(letter, StringComparison.Ordinal) && p.Designator.AsSpan(letter.Length).ContainsAnyInRange('0', '9'))
            ?? parts.LastOrDefault(p => !p.IsTable);
        var newline = NewLine(Text);
        if ((after?.End ?? Heading) is not { } place) return Checked(Of($"{Text.TrimEnd('\r', '\n')}{newline}{newline}[parts]{newline}{PartLine.Of(part, 0)}{newline}"), part);
        var end = Text.IndexOf('\n', Math.Min(place, Text.Length));
        var line = PartLine.Of(part, after?.NameWidth(Text) ?? 0);
        return Checked(Of(end < 0 ? Text + newline + line + newline : Text.Insert(end + 1, line + newline)), part);
    }

    /// <summary>The text without a part; a comment behind it on its line goes with it.</summary>
    public Parsed<BoardText> Removed(string designator)
    {
        if (parts.FirstOrDefault(p => p.Designator == designator) is not { } written) return new TextFault(NotHere, "one line: R1 = { kind = …, pins = … }", "edit the file by hand");
        var start = Text.LastIndexOf('\n', Math.Max(0, written.Start - 1)) + 1;
        var end = Text.IndexOf('\n', Math.Min(written.End, Text.Length - 1));
        return Of(end < 0 ? Text[..start] : Text.Remove(start, end + 1 - start));
    }

    internal static string NameOf(BareKeyOrStringValueSyntax? key) => key switch
    {
        BareKeySyntax bare => bare.Key?.Text ?? "",
        StringValueSyntax quoted => quoted.Value ?? "",
        _ => "",
    };

    /// <summary>How the lines of a text end.</summary>
    internal static string NewLine(string text) => text.Contains("\r\n", StringComparison.Ordinal) ? "\r\n" : "\n";

    /// <summary>Position of a node's last character.</summary>
    internal static int End(SyntaxNode node) => node.Span.End.Offset;

    /// <summary>A change counts only when what it says can be read from the text again.</summary>
    private static Parsed<BoardText> Checked(BoardText text, PartText wanted)
    {
        var read = text.Part(wanted.Designator);
        var isThere = read is not null && read.Kind == wanted.Kind && read.Nodes.SequenceEqual(wanted.Nodes) && PartKeys.Of(wanted.Kind).All(k => read.Value(k.Name) == wanted.Value(k.Name));
        return isThere ? text : new TextFault(NotHere, "one line: R1 = { kind = …, pins = … }", "edit the file by hand");
    }
}
