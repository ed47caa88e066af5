using System.Collections.Immutable;

namespace BenchCheck.Core.Boards;

/// <summary>One component: its designator, the node at each pin, its numbers, and the circuit elements that it is made of.</summary>
/// <remarks>
/// Invariant: as many nodes as its kind has pins, in the order of <see cref="PartKind.Pins"/>. Each kind is one file that says its pins, its
/// parameters and, in <see cref="Describe"/>, its elements: what it does to the equations in each of its states.
/// </remarks>
public abstract record Part
{
    protected Part(PartKind kind, string designator, ImmutableArray<string> nodes)
    {
        ArgumentException.ThrowIfNullOrEmpty(designator);
        if (nodes.Length != kind.Pins.Length)
            throw new ArgumentException($"{designator}: a {kind.Name} has {kind.Pins.Length} pins, {nodes.Length} nodes were given", nameof(nodes));
        Kind = kind;
        Designator = designator;
        Nodes = nodes;
    }

    public PartKind Kind { get; }

    public string Designator { get; }

    /// <summary>Node of each pin, in the order of <see cref="PartKind.Pins"/>.</summary>
    public ImmutableArray<string> Nodes { get; init; }

    /// <summary>Power rating in watts, when stated.</summary>
    public double? RatedWatts { get; init; }

    public string? Note { get; init; }

    /// <summary>The numbers of this part that the fit may move, in the order that <see cref="Describe"/> refers to them.</summary>
    public abstract ImmutableArray<PartParameter> Parameters { get; }

    /// <summary>Adds this part's elements; pins and parameters are referred to by their position in this part.</summary>
    /// <param name="elements">receives the elements</param>
    /// <param name="setting">what the condition sets for this part (a switch position); null when it sets nothing</param>
    public abstract void Describe(PartElements elements, string? setting);

    /// <summary>
    /// Adds this part's elements for small changes around an operating point: the same, with what counts only there. Junctions must be the
    /// same and in the same order as in <see cref="Describe"/>.
    /// </summary>
    public virtual void DescribeSmallSignal(PartElements elements, string? setting) => Describe(elements, setting);

    /// <summary>Joint of a pin as printed: "Q1.base", "R3.1".</summary>
    public string JointName(int pin) => $"{Designator}.{Kind.Pins[pin]}";
}
