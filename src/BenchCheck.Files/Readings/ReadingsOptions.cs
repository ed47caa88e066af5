namespace BenchCheck.Files;

/// <summary>What the user may choose about reading a readings file.</summary>
public sealed record ReadingsOptions
{
    public static ReadingsOptions Default { get; } = new();

    /// <summary>Rows that cannot be used are left out, each with a warning; without it one such row makes the file unusable.</summary>
    public bool SkipBadRows { get; init; }

    /// <summary>What the columns are, where the user says so; null for what the file's own header says.</summary>
    public ColumnMap? Columns { get; init; }
}
