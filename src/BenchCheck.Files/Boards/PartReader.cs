using System.Collections.Immutable;
using BenchCheck.Core.Boards;
using BenchCheck.Core.Quantities;

namespace BenchCheck.Files;

/// <summary>Reads one part: its pins and the keys that every kind shares; the numbers are for its <see cref="PartSyntax"/>.</summary>
internal sealed class PartReader(TableReader table, string designator, Assumptions assumptions)
{
    private const int LongestName = 64;

    public string Designator => designator;

    public TableReader Table => table;

    /// <summary>Nodes in the order of the kind's pins; set by <see cref="ReadPins"/>.</summary>
    public ImmutableArray<string> Nodes { get; private set; } = [];

    /// <summary>The part, or null when something in it is wrong.</summary>
    public static Part? Read(TomlEntry entry, ProblemList problems, Assumptions assumptions)
    {
        if (entry.Value is not TomlTable inner)
        {
            problems.Error(entry.Value.Place, $"{TextFault.Quote(entry.Key)} is {entry.Value.Describe}", "a part: { kind = \"…\", value = \"…\", pins = … }");
            return null;
        }

        if (!IsUsableName(entry.Key))
        {
            problems.Error(entry.Place, $"designator {TextFault.Quote(entry.Key)}", $"1 to {LongestName} printable characters without spaces or dots");
            return null;
        }

        var table = new TableReader(inner, entry.Key, problems);
        var kindText = table.TakeText("kind");
        if (kindText is null)
        {
            if (!inner.TryGet("kind", out _)) problems.Error(entry.Place, $"{entry.Key} has no kind", $"kind = one of {NearMiss.List(PartSyntax.Names)}");
            return null;
        }

        if (PartSyntax.Find(kindText.Text) is not { } syntax)
        {
            problems.Error(kindText.Place, $"{entry.Key}: unknown kind {TextFault.Quote(kindText.Text)}", string.Join(", ", PartSyntax.Names),
                NearMiss.Suggest(kindText.Text, PartSyntax.Names));
            return null;
        }

        var reader = new PartReader(table, entry.Key, assumptions);
        var hasPins = reader.ReadPins(syntax.Kind, entry.Place);
        var rating = table.TakeNumber("rating", Unit.Watt, Limits.Watts);
        var note = table.TakeText("note")?.Text;
        var part = syntax.Make(reader, hasPins ? reader.Nodes : [.. syntax.Kind.Pins]);
        table.Finish();
        return hasPins && part is not null ? part with { RatedWatts = rating, Note = note } : null;
    }

    /// <summary>A number that the part must have; null, with an error, when it has none.</summary>
    public Nominal? Required(string key, Unit unit, Tolerance usual, Limits limits)
    {
        if (Optional(key, unit, usual, limits) is { } nominal) return nominal;
        if (!Has(key)) table.Problems.Error(table.Place, $"{designator} has no {key}", $"{key} = \"…\", or {key} = \"?\" when it is not known");
        return null;
    }

    /// <summary>A number that the part may have; what was assumed about its tolerance is stated.</summary>
    public Nominal? Optional(string key, Unit unit, Tolerance usual, Limits limits)
    {
        if (table.TakeNominal(key, unit, usual, limits) is not { } nominal) return null;
        if (nominal.ToleranceAssumed)
            Assume($"no tolerance of the {key} stated, {Words(usual, unit)} taken".Replace(" of the value", "", StringComparison.Ordinal));
        return nominal;
    }

    /// <summary>A number that has a usual value where the file states none.</summary>
    public Nominal? OrUsual(string key, Unit unit, Tolerance usual, Limits limits, Nominal taken)
    {
        if (Has(key)) return Optional(key, unit, usual, limits);
        table.Take(key);
        Assume($"no {key} stated, {EngineeringNotation.Range(taken.Low, taken.High, unit)} taken");
        return taken;
    }

    public bool Has(string key) => table.Take(key) is not null;

    public void Assume(string text) => assumptions.Add(designator, text);

    /// <summary>True for a name that can stand in tables, files and messages as it is.</summary>
    public static bool IsUsableName(string name) =>
        name.Length is > 0 and <= LongestName && !name.Any(c => char.IsWhiteSpace(c) || char.IsControl(c) || c == '.')
        && TextFault.Quote(name).Length == name.Length + 2;

    private static bool IsUsableNode(string name) =>
        name.Length is > 0 and <= LongestName && !name.Any(char.IsWhiteSpace) && TextFault.Quote(name).Length == name.Length + 2;

    private static string Words(Tolerance tolerance, Unit unit) =>
        tolerance.IsRelative
            ? FormattableString.Invariant($"{tolerance.HalfWidth * 100:0.###} %")
            : $"± {EngineeringNotation.Format(tolerance.HalfWidth, unit, 2)}";

    private bool ReadPins(PartKind kind, TomlPlace place)
    {
        if (table.Take("pins") is not { } entry)
        {
            table.Problems.Error(place, $"{designator} has no pins", PinsOf(kind));
            return false;
        }

        var nodes = entry.Value switch
        {
            TomlList list => FromList(kind, list),
            TomlTable pins => FromTable(kind, pins),
            _ => null,
        };
        if (entry.Value is not (TomlList or TomlTable))
            table.Problems.Error(entry.Value.Place, $"{designator}: pins is {entry.Value.Describe}", PinsOf(kind));
        if (nodes is null) return false;
        Nodes = [.. nodes];
        return true;
    }

    private string[]? FromList(PartKind kind, TomlList list)
    {
        if (list.Items.Count != kind.Pins.Length)
        {
            table.Problems.Error(list.Place, FormattableString.Invariant($"{designator}: {list.Items.Count} pins"),
                FormattableString.Invariant($"the {kind.Pins.Length} pins of a {kind.Name}: {PinsOf(kind)}"));
            return null;
        }

        if (!kind.IsSymmetric) Assume($"pins listed without their names, read as {string.Join(", ", kind.Pins)}");
        var nodes = list.Items.Select((item, pin) => Node(item, kind.Pins[pin])).ToArray();
        return nodes.Contains(null) ? null : [.. nodes.OfType<string>()];
    }

    private string[]? FromTable(PartKind kind, TomlTable pins)
    {
        var nodes = new string?[kind.Pins.Length];
        var isWhole = true;
        foreach (var entry in pins.Entries)
        {
            var pin = kind.Pins.IndexOf(entry.Key);
            if (pin >= 0)
            {
                nodes[pin] = Node(entry.Value, entry.Key);
                isWhole &= nodes[pin] is not null;
                continue;
            }

            table.Problems.Error(entry.Place, $"{designator}: a {kind.Name} has no pin {TextFault.Quote(entry.Key)}", NearMiss.List(kind.Pins),
                NearMiss.Suggest(entry.Key, kind.Pins));
            isWhole = false;
        }

        var missing = kind.Pins.Where(p => !pins.TryGet(p, out _)).ToList();
        if (missing.Count > 0)
            table.Problems.Error(pins.Place, $"{designator}: no node for pin {string.Join(", ", missing)}", PinsOf(kind), "each pin is tied to a node");
        return isWhole && missing.Count == 0 ? [.. nodes.OfType<string>()] : null;
    }

    private string? Node(TomlValue value, string pin)
    {
        if (value is TomlText text && IsUsableNode(text.Text)) return text.Text;
        var read = value is TomlText bad ? TextFault.Quote(bad.Text) : value.Describe;
        table.Problems.Error(value.Place, $"{designator}: node of pin {pin} is {read}", $"a node's name of 1 to {LongestName} printable characters without spaces");
        return null;
    }

    private static string PinsOf(PartKind kind) => kind.IsSymmetric
        ? "pins = [\"…\", \"…\"]"
        : $"pins = {{ {string.Join(", ", kind.Pins.Select(p => p + " = \"…\""))} }}";
}
