using System.Collections.Immutable;
using BenchCheck.Core.Boards;
using BenchCheck.Core.Quantities;

namespace BenchCheck.Files;

/// <summary>Reads the conditions of a board.</summary>
/// <param name="parts">parts that were read</param>
/// <param name="broken">designators of parts that are in the file but could not be read: no more is said of them</param>
/// <param name="reference">the board's reference node</param>
internal sealed class ConditionReader(IReadOnlyDictionary<string, Part> parts, IReadOnlySet<string> broken, string reference, ProblemList problems)
{
    private static readonly string[] SmallSignalKeys = ["operating_point", "frequency", "drive"];
    private static readonly string[] RestKeys = ["supplies", "set", "switches"];

    public ImmutableArray<Condition> Read(TomlTable conditions)
    {
        var read = ImmutableArray.CreateBuilder<Condition>();
        var tables = new List<(Condition Condition, TomlPlace Place)>();
        foreach (var entry in conditions.Entries)
        {
            if (entry.Value is not TomlTable inner)
            {
                problems.Error(entry.Place, $"condition {TextFault.Quote(entry.Key)} is {entry.Value.Describe}", $"a table: [conditions.{entry.Key}]");
                continue;
            }

            if (!IsUsableName(entry.Key))
            {
                problems.Error(entry.Place, $"condition {TextFault.Quote(entry.Key)}", "a name of printable characters");
                continue;
            }

            var condition = ReadOne(new TableReader(inner, $"condition {entry.Key}", problems), entry.Key);
            read.Add(condition);
            tables.Add((condition, entry.Place));
        }

        foreach (var (condition, place) in tables.Where(t => t.Condition.IsSmallSignal)) CheckOperatingPoint(condition, place, read);
        return read.ToImmutable();
    }

    private static bool IsUsableName(string name) => name.Length is > 0 and <= 64 && name.Trim() == name && TextFault.Quote(name).Length == name.Length + 2;

    private Condition ReadOne(TableReader table, string name)
    {
        var removed = Choice(table, "supplies", "removed", "on") is "removed";
        var isSmallSignal = Choice(table, "kind", "dc", "small-signal") is "small-signal";
        var set = ReadSet(table);
        var switches = ReadSwitches(table);
        var point = table.TakeText("operating_point");
        var frequency = table.TakeNumber("frequency", Unit.Hertz, Limits.Hertz);
        var drive = table.TakeTable("drive") is { } generator ? ReadDrive(new TableReader(generator, $"{table.Subject}: drive", problems)) : null;
        if (isSmallSignal && point is null)
            problems.Error(table.Place, $"condition {name} has no operating_point", "operating_point = the name of the DC condition that it stands on");
        if (!isSmallSignal && SmallSignalKeys.Select(table.Take).OfType<TomlEntry>().FirstOrDefault() is { } stray)
            problems.Error(stray.Place, $"condition {name}: {stray.Key}", "kind = \"small-signal\" beside it");
        if (isSmallSignal && RestKeys.Select(table.Take).OfType<TomlEntry>().FirstOrDefault() is { } misplaced)
            problems.Error(misplaced.Place, $"condition {name}: {misplaced.Key} in a small-signal condition", "it in the DC condition that operating_point names");
        table.Finish();
        return isSmallSignal
            ? new Condition(name, removed, set, switches) { OperatingPoint = point?.Text ?? "", Hertz = frequency, Drive = drive }
            : new Condition(name, removed, set, switches);
    }

    /// <summary>The generator: where it is connected, and what it is set to.</summary>
    private Drive? ReadDrive(TableReader table)
    {
        var at = ReadNode(table, "at");
        if (at is null && table.Take("at") is null) problems.Error(table.Place, $"{table.Subject} has no place", "at = the node that the generator drives");
        var against = ReadNode(table, "against") ?? reference;
        var volts = table.TakeNumber("value", Unit.Volt, new Limits(1e-9, 1e3, Unit.Volt, true, "the RMS voltage that the generator is set to"));
        var ohms = table.TakeNumber("resistance", Unit.Ohm, new Limits(0, 1e9, Unit.Ohm)) ?? 0;
        table.Finish();
        if (at is null) return null;
        if (at == against)
        {
            problems.Error(table.Place, $"{table.Subject}: {at} against itself", "two different nodes");
            return null;
        }

        return new Drive(at, against, volts, ohms);
    }

    private string? ReadNode(TableReader table, string key)
    {
        if (table.TakeText(key) is not { } text) return null;
        var nodes = parts.Values.SelectMany(p => p.Nodes).Distinct(StringComparer.Ordinal).ToList();
        if (nodes.Contains(text.Text) || broken.Count > 0) return text.Text;
        problems.Error(text.Place, $"{table.Subject}: no node {TextFault.Quote(text.Text)} on the board", NearMiss.List(nodes), NearMiss.Suggest(text.Text, nodes));
        return null;
    }

    private string? Choice(TableReader table, string key, string first, string second)
    {
        if (table.TakeText(key) is not { } text) return null;
        if (text.Text == first || text.Text == second) return text.Text;
        problems.Error(text.Place, $"{table.Subject}: {key} {TextFault.Quote(text.Text)}", $"\"{first}\" or \"{second}\"", NearMiss.Suggest(text.Text, [first, second]));
        return null;
    }

    private ImmutableDictionary<string, Nominal> ReadSet(TableReader table)
    {
        var set = ImmutableDictionary.CreateBuilder<string, Nominal>();
        if (table.TakeTable("set") is not { } values) return set.ToImmutable();
        var reader = new TableReader(values, $"{table.Subject}: set", problems);
        foreach (var entry in values.Entries)
        {
            reader.Take(entry.Key);
            if (PartOf(entry, p => p is Supply or CurrentSource, "a supply or current source") is not { } part) continue;
            var nominal = part is Supply
                ? reader.TakeNominal(entry.Key, Unit.Volt, default, Limits.Volts)
                : reader.TakeNominal(entry.Key, Unit.Ampere, default, Limits.Amperes);
            if (nominal is not null) set[entry.Key] = WithOwnTolerance(part, nominal);
        }

        return set.ToImmutable();
    }

    /// <summary>A source set to another value keeps its tolerance in proportion; a supply is never steadier than the floor.</summary>
    private static Nominal WithOwnTolerance(Part part, Nominal set)
    {
        if (set.IsUnknown) return set;
        var own = part.Parameters[0].Nominal;
        var half = set.ToleranceAssumed ? OwnHalfWidth(own, part is Supply ? UsualTolerance.Supply : UsualTolerance.CurrentSource, set.Value) : 0;
        if (part is Supply && (set.ToleranceAssumed || set.High - set.Low < 2 * UsualTolerance.SupplyFloor)) half = Math.Max(half, UsualTolerance.SupplyFloor);
        return half > 0 ? Nominal.Within(set.Value, Tolerance.Absolute(half)) : set;
    }

    private static double OwnHalfWidth(Nominal own, Tolerance usual, double value) =>
        own.IsUnknown ? usual.Around(value)
        : own.Value == 0 ? Math.Max(own.High - own.Value, usual.Around(value))
        : (own.High - own.Low) / 2 / Math.Abs(own.Value) * Math.Abs(value);

    private ImmutableDictionary<string, string> ReadSwitches(TableReader table)
    {
        var switches = ImmutableDictionary.CreateBuilder<string, string>();
        if (table.TakeTable("switches") is not { } values) return switches.ToImmutable();
        var reader = new TableReader(values, $"{table.Subject}: switches", problems);
        foreach (var entry in values.Entries)
        {
            reader.Take(entry.Key);
            if (PartOf(entry, p => p is Switch, "a switch") is null) continue;
            if (Choice(reader, entry.Key, Switch.Open, Switch.Closed) is { } state) switches[entry.Key] = state;
        }

        return switches.ToImmutable();
    }

    private Part? PartOf(TomlEntry entry, Func<Part, bool> isMeant, string meant)
    {
        if (broken.Contains(entry.Key)) return null;
        if (parts.TryGetValue(entry.Key, out var part) && isMeant(part)) return part;
        var candidates = parts.Values.Where(isMeant).Select(p => p.Designator).ToList();
        problems.Error(entry.Place, part is null ? $"no part {TextFault.Quote(entry.Key)} on the board" : $"{entry.Key} is a {part.Kind.Name}",
            candidates.Count == 0 ? meant : $"{meant}: {NearMiss.List(candidates)}", NearMiss.Suggest(entry.Key, candidates));
        return null;
    }

    private void CheckOperatingPoint(Condition condition, TomlPlace place, IEnumerable<Condition> all)
    {
        if (condition.OperatingPoint!.Length == 0) return;
        var dc = all.Where(c => c is { IsSmallSignal: false, SuppliesRemoved: false }).Select(c => c.Name).ToList();
        if (!dc.Contains(condition.OperatingPoint!))
            problems.Error(place, $"condition {condition.Name}: operating_point {TextFault.Quote(condition.OperatingPoint)}",
                dc.Count == 0 ? "the name of a DC condition; the board has none" : $"a DC condition: {NearMiss.List(dc)}", NearMiss.Suggest(condition.OperatingPoint!, dc));
    }
}
