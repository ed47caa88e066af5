using System.Data.Common;
using Microsoft.Data.Sqlite;

namespace BenchCheck.Records.Databases;

/// <summary>A log in one SQLite file: write-ahead log, every commit on the disk before it is acknowledged.</summary>
internal sealed class SqliteDatabase : LogDatabase
{
    private readonly string path;
    private readonly SqliteConnection connection;

    public SqliteDatabase(string path)
    {
        this.path = path;
        connection = new SqliteConnection();
    }

    public override DbConnection Connection => connection;

    public override void Open(bool creates)
    {
        if (creates) CreateFolder();
        else if (!File.Exists(path)) throw new BenchLogException($"there is no bench log at {path}; check --log makes one");
        connection.ConnectionString = new SqliteConnectionStringBuilder
        {
            DataSource = path, Mode = creates ? SqliteOpenMode.ReadWriteCreate : SqliteOpenMode.ReadWrite, DefaultTimeout = PatienceSeconds, Pooling = false,
        }.ConnectionString;
        connection.Open();
        Execute($"PRAGMA busy_timeout = {PatienceSeconds * 1000}");
        Execute("PRAGMA synchronous = FULL");
        using var mode = Command("PRAGMA journal_mode");
        if (creates && !"wal".Equals(mode.ExecuteScalar() as string, StringComparison.Ordinal)) Execute("PRAGMA journal_mode = WAL");
    }

    public override DbTransaction BeginWriting() => connection.BeginTransaction(deferred: false);

    public override string Spell(string statement) => statement
        .Replace("{bytes}", "BLOB", StringComparison.Ordinal).Replace("{text}", "TEXT", StringComparison.Ordinal)
        .Replace("{number}", "INTEGER", StringComparison.Ordinal).Replace("{position}", "instr", StringComparison.Ordinal)
        .Replace("{guard records}", Guard("records"), StringComparison.Ordinal).Replace("{guard inputs}", Guard("inputs"), StringComparison.Ordinal);

    public override bool HasTable(string name)
    {
        using var command = Command("SELECT count(*) FROM sqlite_master WHERE type = 'table' AND name = @name", ("@name", name));
        return (long)command.ExecuteScalar()! > 0;
    }

    public override string Explain(DbException failure) => failure is not SqliteException sqlite ? failure.Message : sqlite.SqliteErrorCode switch
    {
        5 or 6 => $"another program kept the log busy for {PatienceSeconds} s; try again when it has finished",
        8 => "the log or its folder may only be read; make it writable or name another log: --log FILE",
        10 => "the disk reported an error; what was filed before is kept; check the disk and its free space",
        11 => "the file is damaged; keep it as it is and restore the log from a copy",
        13 => "the disk is full; nothing of this filing was kept and what was filed before is whole; make room and file again",
        14 => "the file cannot be opened or made; check that its folder exists and may be written",
        19 => $"records are never changed or deleted: {sqlite.Message}",
        26 => "the file is no bench log",
        _ => sqlite.Message,
    };

    private static string Guard(string table) => $"""
        CREATE TRIGGER {table}_keep BEFORE UPDATE ON {table} BEGIN SELECT RAISE(ABORT, 'the bench log is append-only'); END;
        CREATE TRIGGER {table}_stay BEFORE DELETE ON {table} BEGIN SELECT RAISE(ABORT, 'the bench log is append-only'); END;
        """;

    private void CreateFolder()
    {
        try
        {
            if (Path.GetDirectoryName(path) is { Length: > 0 } folder) Directory.CreateDirectory(folder);
        }
        catch (Exception failure) when (failure is IOException or UnauthorizedAccessException or NotSupportedException)
        {
            throw new BenchLogException($"{path}: the folder of the bench log cannot be made ({failure.Message}); name another log: --log FILE", failure);
        }
    }
}
