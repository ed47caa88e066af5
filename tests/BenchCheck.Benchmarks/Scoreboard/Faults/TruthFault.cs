using System.Collections.Immutable;
using BenchCheck.Core.Checking;
using BenchCheck.Core.Diagnosis;

namespace BenchCheck.Benchmarks.Scoreboard.Faults;

/// <summary>What was put wrong, in the words of the result file.</summary>
/// <param name="Kind">one of <see cref="FaultKind"/></param>
/// <param name="Value">what was put in, in ohms, volts or as a gain; null for a fault without a number</param>
public sealed record TruthFault(string Kind, ImmutableArray<string> Parts, ImmutableArray<string> Pins, ImmutableArray<string> Nodes, double? Value)
{
    /// <summary>For a reading error: the row of the readings that is wrong, counted from zero.</summary>
    public int Row { get; init; } = -1;

    /// <summary>For a reading error: what went wrong with it.</summary>
    public string? How { get; init; }

    public static TruthFault At(string kind, params string[] parts) => new(kind, [.. parts], [], [], null);

    /// <summary>The fault that a suspect names.</summary>
    public static TruthFault Of(NamedFault named)
    {
        ArgumentNullException.ThrowIfNull(named);
        return new TruthFault(named.Fault, named.Parts, named.Pins, named.Nodes, named.Value);
    }

    public override string ToString()
    {
        var where = string.Join(", ", Pins.IsEmpty ? Parts.Concat(Nodes) : Pins);
        var value = Value is { } v ? string.Create(System.Globalization.CultureInfo.InvariantCulture, $" = {v:G4}") : "";
        return $"{Kind} {where}{(Row >= 0 ? $"row {Row} ({How})" : "")}{value}";
    }
}
