using System.Collections.Immutable;

namespace BenchCheck.Core.Boards;

/// <summary>A kind of part: the word that names it in a board file, the trade names of its pins in their order, and its designator letter.</summary>
/// <param name="Name">as written for <c>kind</c> in a board file</param>
/// <param name="Pins">pin names in order; a two-pin part without polarity calls them "1" and "2"</param>
/// <param name="Letter">class letter of the reference designator (IEEE 315)</param>
public sealed record PartKind(string Name, ImmutableArray<string> Pins, string Letter)
{
    /// <summary>True when the two pins are alike, so that a board file may list the nodes without naming pins.</summary>
    public bool IsSymmetric => Pins.Length == 2 && Pins[0] == "1";

    public override string ToString() => Name;
}
