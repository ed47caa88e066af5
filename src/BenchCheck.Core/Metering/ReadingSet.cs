using System.Collections.Immutable;

namespace BenchCheck.Core.Metering;

/// <summary>The readings of one board.</summary>
/// <param name="Serial">which board they are of, when the file tells</param>
public sealed record ReadingSet(string? Serial, ImmutableArray<Reading> Readings);
