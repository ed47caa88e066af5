using System.Collections.Immutable;

namespace BenchCheck.Files;

/// <summary>A part as it is written in a board file, before anything in it is understood.</summary>
/// <param name="Nodes">in the order of the kind's pins</param>
/// <param name="Values">texts by key; a key without a text is not stated</param>
public sealed record PartText(string Designator, string Kind, ImmutableArray<string> Nodes, ImmutableSortedDictionary<string, string> Values)
{
    /// <summary>The text of a key; empty when it is not stated.</summary>
    public string Value(string key) => Values.GetValueOrDefault(key, "");
}
