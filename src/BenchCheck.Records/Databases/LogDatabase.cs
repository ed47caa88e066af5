using System.Data.Common;

namespace BenchCheck.Records.Databases;

/// <summary>What differs between the databases that can hold a log; the tables and the statements are the same.</summary>
internal abstract class LogDatabase : IDisposable
{
    /// <summary>Longest wait for another writer, in seconds.</summary>
    protected const int PatienceSeconds = 120;

    public abstract DbConnection Connection { get; }

    public static LogDatabase Of(LogPlace place) => place.Path is { } path ? new SqliteDatabase(path) : new PostgresDatabase(place);

    /// <summary>Opens the database.</summary>
    /// <param name="creates">make the file when there is none</param>
    public abstract void Open(bool creates);

    /// <summary>Begins a transaction that no other writer can overlap.</summary>
    public abstract DbTransaction BeginWriting();

    /// <summary>The statement in this database's own words: {bytes}, {text}, {number}, {guard TABLE}, {position}.</summary>
    public abstract string Spell(string statement);

    /// <summary>Whether the table is there.</summary>
    public abstract bool HasTable(string name);

    /// <summary>Why the database refused, and what to do, in plain words.</summary>
    public abstract string Explain(DbException failure);

    public void Dispose() => Connection.Dispose();

    public DbCommand Command(string statement, params ReadOnlySpan<(string Name, object? Value)> values)
    {
        var command = Connection.CreateCommand();
        command.CommandText = Spell(statement);
        foreach (var (name, value) in values)
        {
            var parameter = command.CreateParameter();
            parameter.ParameterName = name;
            parameter.Value = value ?? DBNull.Value;
            command.Parameters.Add(parameter);
        }

        return command;
    }

    public void Execute(string statement)
    {
        using var command = Command(statement);
        command.ExecuteNonQuery();
    }
}
