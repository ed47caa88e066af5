using System.Diagnostics.CodeAnalysis;

namespace BenchCheck.Files;

/// <summary>Where something stands in a TOML text; line and column are counted from 1.</summary>
internal readonly record struct TomlPlace(int Line, int Column);

/// <summary>A value of a TOML document with its place.</summary>
internal abstract record TomlValue(TomlPlace Place)
{
    /// <summary>What it is, for messages.</summary>
    public abstract string Describe { get; }
}

/// <summary>A string, or a number as it was written: a board file may write <c>value = 12</c> as well as <c>value = "12"</c>.</summary>
internal sealed record TomlText(TomlPlace Place, string Text, bool IsNumber) : TomlValue(Place)
{
    public override string Describe => IsNumber ? "a number" : "a text";
}

internal sealed record TomlList(TomlPlace Place, IReadOnlyList<TomlValue> Items) : TomlValue(Place)
{
    public override string Describe => "a list";
}

/// <summary>true, false, a date: nothing that a board file uses.</summary>
internal sealed record TomlOther(TomlPlace Place, string Describes) : TomlValue(Place)
{
    public override string Describe => Describes;
}

/// <summary>A table: its entries in the order of the file.</summary>
internal sealed record TomlTable(TomlPlace Place) : TomlValue(Place)
{
    private readonly Dictionary<string, int> positions = new(StringComparer.Ordinal);
    private readonly List<TomlEntry> entries = [];

    public override string Describe => "a table";

    /// <summary>True while only longer headers or dotted keys have named it, so that it may still get a header of its own.</summary>
    public bool IsImplied { get; set; }

    public IReadOnlyList<TomlEntry> Entries => entries;

    public bool TryGet(string key, [NotNullWhen(true)] out TomlEntry? entry)
    {
        entry = positions.TryGetValue(key, out var position) ? entries[position] : null;
        return entry is not null;
    }

    public bool TryAdd(TomlEntry entry)
    {
        if (!positions.TryAdd(entry.Key, entries.Count)) return false;
        entries.Add(entry);
        return true;
    }
}

/// <summary>A key with its value.</summary>
internal sealed record TomlEntry(string Key, TomlPlace Place, TomlValue Value);
