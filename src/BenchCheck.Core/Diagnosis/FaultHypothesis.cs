using System.Collections.Immutable;
using BenchCheck.Core.Boards;

namespace BenchCheck.Core.Diagnosis;

/// <summary>One thing that could be wrong with the board, as the board it would make of it.</summary>
/// <remarks>
/// Faults that are the same from outside (a resistor open, or either of its joints open) are one hypothesis with several names, so that they
/// are fitted once. Readings that are wrong are no hypotheses of this kind: the board is then the healthy one.
/// </remarks>
/// <param name="Names">at least one; each with its own prior rate</param>
/// <param name="Board">the board with the fault in it</param>
/// <param name="Free">the number that the fault leaves open (the wrong resistance); null when it has none</param>
public sealed record FaultHypothesis(ImmutableArray<FaultName> Names, Board Board, FreeNumber? Free = null)
{
    public FaultHypothesis(FaultName name, Board board, FreeNumber? free = null) : this([name], board, free)
    {
    }
}

/// <summary>A fault by kind and place, before a value is found for it.</summary>
/// <param name="Kind">one of <see cref="FaultKind"/></param>
/// <param name="Text">short plain words: "R3 open"</param>
public sealed record FaultName(string Kind, string Text)
{
    public ImmutableArray<string> Parts { get; init; } = [];
    public ImmutableArray<string> Pins { get; init; } = [];
    public ImmutableArray<string> Nodes { get; init; } = [];
}

/// <summary>A parameter that a hypothesis leaves free.</summary>
/// <param name="Part">designator on the board of the hypothesis</param>
/// <param name="Kind">which of its numbers</param>
/// <param name="Nominal">what the parts list says it should be; NaN when the fault adds it</param>
public sealed record FreeNumber(string Part, ParameterKind Kind, double Nominal);
