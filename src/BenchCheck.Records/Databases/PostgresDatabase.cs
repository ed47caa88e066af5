using System.Data.Common;
using Npgsql;

namespace BenchCheck.Records.Databases;

/// <summary>A log in a PostgreSQL database that several benches share.</summary>
internal sealed class PostgresDatabase : LogDatabase
{
    /// <summary>Key of the lock that orders first set-ups; any number that no other program takes.</summary>
    private const long SetUpLock = 7_310_462_118;

    private readonly NpgsqlConnection connection;

    public PostgresDatabase(LogPlace place)
    {
        connection = new NpgsqlConnection(new NpgsqlConnectionStringBuilder(place.Connection)
        {
            ApplicationName = "benchcheck", CommandTimeout = PatienceSeconds, Pooling = false,
        }.ConnectionString);
    }

    public override DbConnection Connection => connection;

    public override void Open(bool creates) => connection.Open();

    public override DbTransaction BeginWriting()
    {
        var transaction = connection.BeginTransaction();
        Execute($"SELECT pg_advisory_xact_lock({SetUpLock})");
        return transaction;
    }

    public override string Spell(string statement) => statement
        .Replace("{bytes}", "BYTEA", StringComparison.Ordinal).Replace("{text}", "TEXT COLLATE \"C\"", StringComparison.Ordinal)
        .Replace("{number}", "BIGINT", StringComparison.Ordinal).Replace("{position}", "strpos", StringComparison.Ordinal)
        .Replace("{guard records}", Guard("records"), StringComparison.Ordinal).Replace("{guard inputs}", Guard("inputs"), StringComparison.Ordinal);

    public override bool HasTable(string name)
    {
        // Not to_regclass: within a transaction that has asked before, it does not see a table that another program has made since.
        using var command = Command("SELECT count(*) > 0 FROM pg_catalog.pg_class WHERE relname = @name AND pg_catalog.pg_table_is_visible(oid)", ("@name", name));
        return (bool)command.ExecuteScalar()!;
    }

    public override string Explain(DbException failure) => failure is not PostgresException refused
        ? $"the server does not answer ({failure.Message}); check host, port and network"
        : refused.SqlState switch
        {
            "53100" => "the disk of the server is full; nothing of this filing was kept and what was filed before is whole",
            "25006" or "42501" => "this user may only read, or may not make tables; ask for the right to write",
            "28P01" or "28000" => "the server refused user or password",
            "3D000" => "there is no such database; make it first (createdb)",
            "P0001" => $"records are never changed or deleted: {refused.MessageText}",
            _ => $"{refused.MessageText} ({refused.SqlState})",
        };

    private static string Guard(string table) => $"""
        CREATE OR REPLACE FUNCTION benchcheck_append_only() RETURNS trigger LANGUAGE plpgsql AS
            $$ BEGIN RAISE EXCEPTION 'the bench log is append-only'; END $$;
        CREATE TRIGGER {table}_keep BEFORE UPDATE OR DELETE OR TRUNCATE ON {table} EXECUTE FUNCTION benchcheck_append_only();
        """;
}
