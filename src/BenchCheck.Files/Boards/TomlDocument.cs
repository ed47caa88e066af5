using System.Globalization;
using System.Text.RegularExpressions;
using BenchCheck.Core.Quantities;
using Tomlyn;
using Tomlyn.Parsing;
using Tomlyn.Syntax;

namespace BenchCheck.Files;

/// <summary>Reads a TOML text into a tree with places, past syntax errors, so that all problems of a file come at once.</summary>
internal static partial class TomlDocument
{
    private const int MostSyntaxErrors = 50;

    /// <summary>With errors on more lines than these the text is hardly a board file, and reading on past each would only take long.</summary>
    private const int HopelessLines = 200;

    /// <param name="text">the file</param>
    /// <param name="problems">receives syntax errors and keys given twice</param>
    /// <param name="broken">receives the keys of lines that could not be read, so that nothing else is blamed for their absence; an empty key for a rest unread</param>
    public static TomlTable Read(string text, ProblemList problems, ISet<string> broken)
    {
        var lines = text.Split('\n');
        for (var round = 0; ; round++)
        {
            DocumentSyntax document;
            try
            {
                // The last line is ended too: the parser fails on a backslash that is the last character of its text.
                document = SyntaxParser.Parse(string.Join('\n', lines) + '\n', problems.File, validate: false);
            }
            catch (TomlException deep)
            {
                problems.Error(default, TextFault.Quote(deep.Message).Trim('"'), "lists and tables nested a few deep");
                return new TomlTable(default);
            }

            var errors = document.Diagnostics.Where(d => d.Kind == DiagnosticMessageKind.Error).OrderBy(d => d.Span.Start.Line).ThenBy(d => d.Span.Start.Column).ToList();
            if (errors.Count == 0) return new TreeBuilder(problems).Build(document);
            var first = errors[0];
            var isHopeless = errors.Count > HopelessLines && errors.DistinctBy(d => d.Span.Start.Line).Skip(HopelessLines).Any();
            var at = Math.Clamp(first.Span.Start.Line, 0, lines.Length - 1);

            // The unread end of an unclosed list or string shows up on a later, often empty, line: the last line with text holds the error.
            while (at > 0 && string.IsNullOrWhiteSpace(lines[at])) at--;
            problems.Error(new TomlPlace(at + 1, at == first.Span.Start.Line ? first.Span.Start.Column + 1 : 0),
                Describe(first.Message), "TOML: key = value", Advice(lines[at]));
            if (KeyAtStart().Match(lines[at]) is { Success: true } key) broken.Add(key.Groups["key"].Value);
            if (round >= MostSyntaxErrors || isHopeless || string.IsNullOrWhiteSpace(lines[at]))
            {
                broken.Add("");
                problems.Error(new TomlPlace(at + 1, 0), "the rest of the file was not read", null, isHopeless ? "is this a board file?" : "put the errors above right first");
                return new TomlTable(default);
            }

            lines[at] = "";
        }
    }

    private static string Describe(string message)
    {
        var plain = message.Replace("`", "\"", StringComparison.Ordinal).Replace(" (token: \"Eof\")", "", StringComparison.Ordinal)
            .Replace("\"<eof>\"", "the end of the file", StringComparison.Ordinal).Replace("\"Eof\"", "the end of the file", StringComparison.Ordinal);
        return string.Concat(plain.EnumerateRunes().Select(r =>
            System.Text.Rune.IsControl(r) ? string.Create(CultureInfo.InvariantCulture, $"\\u{r.Value:x4}") : r.ToString()));
    }

    private static string? Advice(string line) =>
        line.Count(c => c == '"') % 2 == 1 ? "a closing quotation mark is missing"
        : line.Count(c => c == '{') > line.Count(c => c == '}') ? "a closing brace is missing"
        : line.Count(c => c == '[') > line.Count(c => c == ']') ? "a closing bracket is missing"
        : Unquoted().IsMatch(line) ? "texts and values with units stand in double quotes: value = \"47k 5%\""
        : null;

    [GeneratedRegex("""^\s*"?(?<key>[\w-]+)"?\s*=""")]
    private static partial Regex KeyAtStart();

    [GeneratedRegex("""=\s*(?!true|false)[^\s"'\[{]*[^\s"'\[{\d.,}+-]""")]
    private static partial Regex Unquoted();

    private sealed class TreeBuilder(ProblemList problems)
    {
        public TomlTable Build(DocumentSyntax document)
        {
            var root = new TomlTable(new TomlPlace(1, 1));
            AddAll(root, document.KeyValues);
            foreach (var syntax in document.Tables)
            {
                if (syntax.Name is null) continue;
                var path = Path(syntax.Name);
                if (Descend(root, path[..^1]) is not { } parent) continue;
                var (name, place) = path[^1];
                var table = new TomlTable(place);
                if (syntax is TableArraySyntax)
                    problems.Error(place, $"a list of tables [[{name}]]", $"one table [{name}]");
                else if (parent.TryGet(name, out var there) && there.Value is TomlTable { IsImplied: true } implied)
                {
                    table = implied;
                    table.IsImplied = false;
                }
                else if (!parent.TryAdd(new TomlEntry(name, place, table)))
                    Twice(place, name, there!.Place);
                AddAll(table, syntax.Items);
            }

            return root;
        }

        private static List<(string Name, TomlPlace Place)> Path(KeySyntax key)
        {
            var path = new List<(string, TomlPlace)> { (NameOf(key.Key), PlaceOf(key)) };
            foreach (var dotted in key.DotKeys) path.Add((NameOf(dotted.Key), PlaceOf(dotted)));
            return path;
        }

        private static string NameOf(BareKeyOrStringValueSyntax? key) => key switch
        {
            BareKeySyntax bare => bare.Key?.Text ?? "",
            StringValueSyntax quoted => quoted.Value ?? "",
            _ => "",
        };

        private static TomlPlace PlaceOf(SyntaxNode node) => new(node.Span.Start.Line + 1, node.Span.Start.Column + 1);

        private void AddAll(TomlTable table, IEnumerable<KeyValueSyntax> items)
        {
            foreach (var item in items)
            {
                if (item.Key is null || item.Value is null) continue;
                var path = Path(item.Key);
                if (Descend(table, path[..^1]) is not { } parent) continue;
                var (name, place) = path[^1];
                if (!parent.TryAdd(new TomlEntry(name, place, Value(item.Value)))) Twice(place, name, parent.TryGet(name, out var there) ? there.Place : place);
            }
        }

        private TomlTable? Descend(TomlTable table, List<(string Name, TomlPlace Place)> path)
        {
            foreach (var (name, place) in path)
            {
                if (table.TryGet(name, out var entry))
                {
                    if (entry.Value is not TomlTable inner)
                    {
                        Twice(place, name, entry.Place);
                        return null;
                    }

                    table = inner;
                    continue;
                }

                var implied = new TomlTable(place) { IsImplied = true };
                table.TryAdd(new TomlEntry(name, place, implied));
                table = implied;
            }

            return table;
        }

        private TomlValue Value(ValueSyntax value)
        {
            var place = PlaceOf(value);
            switch (value)
            {
                case StringValueSyntax text:
                    return new TomlText(place, text.Value ?? "", false);
                case IntegerValueSyntax integer:
                    return new TomlText(place, integer.Value.ToString(CultureInfo.InvariantCulture), true);
                case FloatValueSyntax number:
                    return new TomlText(place, number.Value.ToString("R", CultureInfo.InvariantCulture), true);
                case ArraySyntax array:
                    return new TomlList(place, [.. array.Items.Where(i => i.Value is not null).Select(i => Value(i.Value!))]);
                case InlineTableSyntax inline:
                    var table = new TomlTable(place);
                    AddAll(table, inline.Items.Where(i => i.KeyValue is not null).Select(i => i.KeyValue!));
                    return table;
                default:
                    return new TomlOther(place, value is BooleanValueSyntax ? "true or false" : "a date or time");
            }
        }

        private void Twice(TomlPlace place, string name, TomlPlace before) =>
            problems.Error(place, string.Create(CultureInfo.InvariantCulture, $"{TextFault.Quote(name)} is given twice, on line {before.Line} and on line {place.Line}"),
                "each name once", "rename or remove one of the two");
    }
}
