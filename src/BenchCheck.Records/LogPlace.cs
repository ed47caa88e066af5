using Npgsql;

namespace BenchCheck.Records;

/// <summary>Where a bench log lives: a file, or a PostgreSQL database that several benches share.</summary>
public sealed class LogPlace
{
    private LogPlace(string name, string? path, string? connection) => (Name, Path, Connection) = (name, path, connection);

    /// <summary>As messages may show it: never with a password.</summary>
    public string Name { get; }

    /// <summary>A file, whose full path is the name.</summary>
    public bool IsFile => Path is not null;

    internal string? Path { get; }

    internal string? Connection { get; }

    /// <summary>The file in the user's data folder.</summary>
    public static LogPlace Standard()
    {
        var folder = Environment.GetFolderPath(Environment.SpecialFolder.LocalApplicationData, Environment.SpecialFolderOption.DoNotVerify);
        if (folder.Length == 0) throw new BenchLogException("there is no folder for a user's data here; name a file: --log FILE");
        return OfFile(System.IO.Path.Combine(folder, "benchcheck", "bench-log.db"));
    }

    /// <summary>A path, or a connection string of PostgreSQL ("Host=…;Database=…;Username=…").</summary>
    /// <exception cref="BenchLogException">neither</exception>
    public static LogPlace Parse(string text)
    {
        ArgumentNullException.ThrowIfNull(text);
        if (string.IsNullOrWhiteSpace(text) || text.Contains('\0', StringComparison.Ordinal)) throw new BenchLogException("expected a file or a connection string of the bench log, read nothing");
        if (text.Contains("://", StringComparison.Ordinal))
            throw new BenchLogException("a bench log is named by a file or by \"Host=…;Database=…;Username=…\", not by an address with ://");
        return text.Split(';').Any(part => part.TrimStart().StartsWith("Host=", StringComparison.OrdinalIgnoreCase)) ? OfConnection(text) : OfFile(text);
    }

    private static LogPlace OfFile(string path)
    {
        var full = System.IO.Path.GetFullPath(path);
        return new LogPlace(full, full, null);
    }

    private static LogPlace OfConnection(string text)
    {
        try
        {
            var builder = new NpgsqlConnectionStringBuilder(text);
            return new LogPlace($"database {builder.Database ?? builder.Username} on {builder.Host}", null, builder.ConnectionString);
        }
        catch (ArgumentException failure)
        {
            throw new BenchLogException("the connection string of the bench log was not understood; expected \"Host=…;Database=…;Username=…\"", failure);
        }
    }
}
