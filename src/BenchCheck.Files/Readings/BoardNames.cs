using BenchCheck.Core.Boards;
using BenchCheck.Core.Metering;
using BenchCheck.Core.Quantities;

namespace BenchCheck.Files;

/// <summary>Finds what a reading names: nodes, parts, pins, conditions, meters of one bench.</summary>
/// <remarks>Names match exactly, or without regard to capitals where only one name is then meant.</remarks>
internal sealed class BoardNames(Bench bench)
{
    private readonly Dictionary<string, Parsed<string>> nodes = new(StringComparer.Ordinal);
    private readonly Dictionary<string, Parsed<string>> joints = new(StringComparer.Ordinal);
    private const int MostRemembered = 100_000;

    public Board Board => bench.Board;

    public Parsed<string> Node(string name)
    {
        if (nodes.TryGetValue(name, out var found)) return found;
        found = Match(name, Board.Nodes) is { } node
            ? node
            : new TextFault(
                Board.Find(name) is not null ? $"{TextFault.Quote(name)}, which is a part" : $"unknown node {TextFault.Quote(name)}",
                $"a node: {NearMiss.List(Board.Nodes)}", NearMiss.Suggest(name, Board.Nodes));
        if (nodes.Count < MostRemembered) nodes[name] = found;
        return found;
    }

    /// <summary>A part with two pins, or a pin as "Q1.base": where a current is read.</summary>
    public Parsed<string> Joint(string name)
    {
        if (joints.TryGetValue(name, out var found)) return found;
        found = FindJoint(name);
        if (joints.Count < MostRemembered) joints[name] = found;
        return found;
    }

    public Parsed<Condition> Condition(string name)
    {
        if (name.Length == 0) return Board.Conditions[0];
        if (Board.FindCondition(name) is { } exact) return exact;
        var names = Board.Conditions.Select(c => c.Name).ToList();
        return Match(name, names) is { } match
            ? Board.FindCondition(match)!
            : new TextFault($"unknown condition {TextFault.Quote(name)}", NearMiss.List(names), NearMiss.Suggest(name, names));
    }

    public Parsed<Meter> Meter(string name)
    {
        if (name.Length == 0) return bench.Meters[0];
        foreach (var meter in bench.Meters)
        {
            if (meter.Name == name) return meter;
        }

        var names = bench.Meters.Select(m => m.Name).ToList();
        return Match(name, names) is { } match
            ? bench.Meters.First(m => m.Name == match)
            : new TextFault($"unknown meter {TextFault.Quote(name)}", NearMiss.List(names), NearMiss.Suggest(name, names));
    }

    private static string? Match(string name, IEnumerable<string> known)
    {
        string? similar = null;
        var count = 0;
        foreach (var candidate in known)
        {
            if (candidate == name) return candidate;
            if (!candidate.Equals(name, StringComparison.OrdinalIgnoreCase)) continue;
            similar = candidate;
            count++;
        }

        return count == 1 ? similar : null;
    }

    private Parsed<string> FindJoint(string name)
    {
        var dot = name.LastIndexOf('.');
        var partName = dot < 0 ? name : name[..dot];
        var designators = Board.Parts.Select(p => p.Designator).ToList();
        if (Match(partName, designators) is not { } designator)
        {
            return new TextFault(
                $"unknown part {TextFault.Quote(partName)}", "a part (R3) or one of its pins (Q1.base), through which the current flows",
                NearMiss.Suggest(partName, designators));
        }

        var part = Board.Find(designator)!;
        var pins = part.Kind.Pins;
        if (dot < 0)
        {
            return pins.Length == 2
                ? designator
                : new TextFault($"{designator}, a {part.Kind.Name} with {pins.Length} pins", $"one pin: {string.Join(", ", pins.Select(p => $"{designator}.{p}"))}");
        }

        return Match(name[(dot + 1)..], pins) is { } pin
            ? $"{designator}.{pin}"
            : new TextFault($"unknown pin {TextFault.Quote(name)}", string.Join(", ", pins.Select(p => $"{designator}.{p}")), NearMiss.Suggest(name[(dot + 1)..], pins));
    }
}
