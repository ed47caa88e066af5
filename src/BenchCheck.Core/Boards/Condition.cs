using System.Collections.Immutable;
using BenchCheck.Core.Quantities;

namespace BenchCheck.Core.Boards;

/// <summary>A state in which the board is measured.</summary>
/// <param name="Name">as readings refer to it</param>
/// <param name="SuppliesRemoved">supplies and current sources lifted off the board: ohmmeter work</param>
/// <param name="Set">supplies that this condition sets to another value, by designator</param>
/// <param name="Switches">switch positions that this condition sets, by designator: "open" or "closed"</param>
public sealed record Condition(
    string Name, bool SuppliesRemoved, ImmutableDictionary<string, Nominal> Set, ImmutableDictionary<string, string> Switches)
{
    /// <summary>Name of the condition of a board file that declares none.</summary>
    public const string DefaultName = "powered";

    public static Condition Powered { get; } =
        new(DefaultName, false, ImmutableDictionary<string, Nominal>.Empty, ImmutableDictionary<string, string>.Empty);

    /// <summary>Supplies lifted off: what an ohmmeter needs. Every board has such a condition, declared or not.</summary>
    public static Condition Unpowered { get; } = Powered with { Name = "unpowered", SuppliesRemoved = true };

    /// <summary>Set for a small-signal condition: the DC condition whose operating point it stands on; null for a DC condition.</summary>
    public string? OperatingPoint { get; init; }

    /// <summary>Frequency of a small-signal condition in hertz; null when capacitors count as shorts.</summary>
    public double? Hertz { get; init; }

    /// <summary>The generator of a small-signal condition; null when each reading says by its nodes where the signal goes in.</summary>
    public Drive? Drive { get; init; }

    public bool IsSmallSignal => OperatingPoint is not null;
}
