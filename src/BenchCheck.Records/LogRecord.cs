namespace BenchCheck.Records;

/// <summary>A filed record without its contents, as lists show it.</summary>
/// <param name="Number">1, 2, 3 … in the order of filing, without gaps</param>
/// <param name="FiledAt">UTC, <c>2026-03-01T09:30:00.000Z</c></param>
/// <param name="Hash">SHA-256 over the record and the hash before it, 64 hexadecimal digits</param>
public sealed record LogEntry(long Number, string FiledAt, string Program, string BoardTitle, string? Serial, string Verdict, string Hash);

/// <summary>A filed record.</summary>
/// <param name="Previous">hash of the record before; 64 zeros for the first</param>
/// <param name="BoardFile">SHA-256 of the board file, by which <see cref="BenchLog.Input"/> gives it</param>
/// <param name="ReadingsFile">as above</param>
/// <param name="RatesFile">as above; null when the usual fault rates were taken</param>
/// <param name="Plot">as above, the picture; null when none was filed</param>
public sealed record LogRecord(
    LogEntry Entry, string Settings, string Result, string BoardFile, string ReadingsFile, string? RatesFile, string Previous, string? Plot = null)
{
    /// <summary>SHA-256 of every file of the record.</summary>
    public IEnumerable<string> Files => new[] { BoardFile, ReadingsFile, RatesFile, Plot }.OfType<string>();
}

/// <summary>Which records are wanted; what is null does not matter.</summary>
public sealed record LogQuery
{
    public static LogQuery All { get; } = new();

    /// <summary>part of the board's title</summary>
    public string? Board { get; init; }

    public string? Serial { get; init; }

    public string? Verdict { get; init; }

    /// <summary>filed at this time or later</summary>
    public DateTimeOffset? From { get; init; }

    /// <summary>filed before this time</summary>
    public DateTimeOffset? Before { get; init; }
}
