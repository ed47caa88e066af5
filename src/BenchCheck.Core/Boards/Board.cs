using System.Collections.Immutable;

namespace BenchCheck.Core.Boards;

/// <summary>The circuit under test.</summary>
/// <remarks>
/// Invariant: designators are unique, there is at least one condition, every designator that a condition or a control names exists.
/// Whether the circuit can be solved (no loop of supplies, no island) is a question for <see cref="BoardStructure"/>.
/// </remarks>
public sealed class Board
{
    private readonly Dictionary<string, Part> byDesignator = new(StringComparer.Ordinal);

    public Board(
        string title, string reference, BoardOrigin origin, ImmutableArray<Part> parts, ImmutableArray<Condition> conditions,
        ImmutableArray<ImmutableArray<string>> adjacent = default)
    {
        Title = title;
        Reference = reference;
        Origin = origin;
        Parts = parts;
        Conditions = conditions.IsDefaultOrEmpty ? [Condition.Powered] : conditions;
        Adjacent = adjacent.IsDefault ? [] : adjacent;
        foreach (var part in parts)
        {
            if (!byDesignator.TryAdd(part.Designator, part))
                throw new ArgumentException($"{part.Designator} is given twice", nameof(parts));
        }

        Nodes = [.. parts.SelectMany(p => p.Nodes).Prepend(reference).Distinct(StringComparer.Ordinal)];
        foreach (var name in Conditions.SelectMany(c => c.Set.Keys.Concat(c.Switches.Keys)))
        {
            if (!byDesignator.ContainsKey(name)) throw new ArgumentException($"a condition sets {name}, which is no part of the board", nameof(conditions));
        }
    }

    public string Title { get; }

    /// <summary>The node that every voltage is counted against unless a reading says otherwise.</summary>
    public string Reference { get; }

    public BoardOrigin Origin { get; }

    public ImmutableArray<Part> Parts { get; }

    /// <summary>At least one; the first is meant where a reading names none.</summary>
    public ImmutableArray<Condition> Conditions { get; }

    /// <summary>Every node, the reference first, the others in the order of the parts list.</summary>
    public ImmutableArray<string> Nodes { get; }

    /// <summary>Groups of nodes that lie side by side on the layout, where a solder bridge can form; empty when the file tells none.</summary>
    public ImmutableArray<ImmutableArray<string>> Adjacent { get; }

    /// <summary>Temperature of the junctions in degrees Celsius.</summary>
    public double Celsius { get; init; } = 25;

    public Part? Find(string designator) => byDesignator.GetValueOrDefault(designator);

    public Condition? FindCondition(string name) => Conditions.FirstOrDefault(c => c.Name == name);
}
