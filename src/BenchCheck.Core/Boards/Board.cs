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
        if (!Conditions.Any(c => c.SuppliesRemoved || c.Name == Condition.Unpowered.Name)) Conditions = Conditions.Add(Condition.Unpowered);
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

    private Board(Board board, ImmutableArray<string> nodes)
    {
        (Title, Reference, Origin, Parts, Conditions, Adjacent) = (board.Title, board.Reference, board.Origin, board.Parts, board.Conditions, board.Adjacent);
        Celsius = board.Celsius;
        byDesignator = board.byDesignator;
        Nodes = nodes;
    }

    public string Title { get; }

    /// <summary>The node that every voltage is counted against unless a reading says otherwise.</summary>
    public string Reference { get; }

    public BoardOrigin Origin { get; }

    public ImmutableArray<Part> Parts { get; }

    /// <summary>At least one, the first being meant where a reading names none; one with the supplies removed is always among them.</summary>
    public ImmutableArray<Condition> Conditions { get; private init; }

    /// <summary>Every node, the reference first, the others in the order of the parts list.</summary>
    public ImmutableArray<string> Nodes { get; }

    /// <summary>Groups of nodes that lie side by side on the layout, where a solder bridge can form; empty when the file tells none.</summary>
    public ImmutableArray<ImmutableArray<string>> Adjacent { get; }

    /// <summary>Temperature of the junctions in degrees Celsius.</summary>
    public double Celsius { get; init; } = 25;

    /// <summary>The same board with some parts exchanged and others added: what a fault makes of it. Every node stays, even one left bare.</summary>
    /// <param name="exchanged">parts that take the place of those with the same designator</param>
    /// <param name="added">parts with designators of their own</param>
    public Board With(IEnumerable<Part> exchanged, IEnumerable<Part> added)
    {
        var replacement = exchanged.ToDictionary(p => p.Designator, StringComparer.Ordinal);
        ImmutableArray<Part> parts = [.. Parts.Select(p => replacement.GetValueOrDefault(p.Designator, p)), .. added];
        var board = new Board(Title, Reference, Origin, parts, Conditions, Adjacent) { Celsius = Celsius };
        return new Board(board, [.. Nodes.Union(board.Nodes, StringComparer.Ordinal)]);
    }

    /// <summary>The same board with other conditions of the same names.</summary>
    public Board In(ImmutableArray<Condition> conditions) => new(this, Nodes) { Conditions = conditions };

    public Part? Find(string designator) => byDesignator.GetValueOrDefault(designator);

    public Condition? FindCondition(string name) => Conditions.FirstOrDefault(c => c.Name == name);
}
