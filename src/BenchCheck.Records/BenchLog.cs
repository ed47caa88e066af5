using System.Collections.Immutable;
using System.Data.Common;
using System.Text;
using BenchCheck.Records.Databases;

namespace BenchCheck.Records;

/// <summary>The bench log: checks on record, kept for good, in the order in which they were filed.</summary>
/// <remarks>
/// Records are only ever added. Several programs may write at once; what <see cref="Append"/> has returned is on the disk. A file that many
/// records share (a board file, a shelf of readings) is kept once. One instance serves one thread.
/// </remarks>
public sealed class BenchLog : IDisposable
{
    private const int PageLength = 100;

    private const string EntryColumns = "number, filed_at, program, board, serial, verdict, hash";
    private const string RecordColumns = EntryColumns + ", settings, result, board_file, readings_file, rates_file, previous, plot";

    private readonly LogDatabase database;
    private readonly LogPlace place;

    private BenchLog(LogPlace place, LogDatabase database) => (this.place, this.database) = (place, database);

    /// <summary>Opens a log for filing, made on first use and brought forward from any older version.</summary>
    /// <exception cref="BenchLogException">it cannot be opened or made; the message says why and what to do</exception>
    public static BenchLog Open(LogPlace place) => Open(place, true, Migrations.Newest);

    /// <summary>Opens a log that is there already.</summary>
    /// <exception cref="BenchLogException">there is none, or it cannot be opened</exception>
    public static BenchLog OpenExisting(LogPlace place) => Open(place, false, Migrations.Newest);

    /// <param name="version">of the tables to bring an older log to</param>
    /// <param name="prepare">done with the database once it is open</param>
    internal static BenchLog Open(LogPlace place, bool creates, int version, Action<LogDatabase>? prepare = null)
    {
        ArgumentNullException.ThrowIfNull(place);
        var database = LogDatabase.Of(place);
        var log = new BenchLog(place, database);
        try
        {
            log.Explained(() =>
            {
                database.Open(creates);
                prepare?.Invoke(database);
                if (!creates && Migrations.Version(database) == 0) throw new BenchLogException($"{place.Name}: there is no bench log yet; check --log makes one");
                Migrations.Run(database, version);
                return true;
            });
            return log;
        }
        catch
        {
            log.Dispose();
            throw;
        }
    }

    /// <summary>Files checks: all of them or none.</summary>
    /// <returns>the entries, when they are on the disk</returns>
    /// <exception cref="BenchLogException">they could not be filed; the log is as it was</exception>
    public ImmutableArray<LogEntry> Append(params IReadOnlyCollection<Filing> filings)
    {
        ArgumentNullException.ThrowIfNull(filings);
        return Explained(() =>
        {
            using var transaction = database.BeginWriting();
            var (number, hash) = Last();
            var result = ImmutableArray.CreateBuilder<LogEntry>(filings.Count);
            using var inputs = new InputWriter(database);
            using var records = new RecordWriter(database);
            foreach (var filing in filings)
            {
                var record = Chained(filing, ++number, hash, inputs);
                records.Write(record);
                hash = record.Entry.Hash;
                result.Add(record.Entry);
            }

            transaction.Commit();
            return result.MoveToImmutable();
        });
    }

    /// <summary>The newest <paramref name="most"/> entries that match, oldest of them first.</summary>
    public ImmutableArray<LogEntry> List(LogQuery query, int most)
    {
        ArgumentNullException.ThrowIfNull(query);
        return Explained(() =>
        {
            using var command = Select(EntryColumns, query, "", "number DESC", most);
            using var reader = command.ExecuteReader();
            var entries = new List<LogEntry>();
            while (reader.Read()) entries.Add(Entry(reader));
            entries.Reverse();
            return entries.ToImmutableArray();
        });
    }

    /// <summary>One record; null when there is none of that number.</summary>
    public LogRecord? Find(long number) => Page(LogQuery.All, number - 1, 1) is [var record] && record.Entry.Number == number ? record : null;

    /// <summary>Every record that matches, oldest first; streamed.</summary>
    public IEnumerable<LogRecord> Records(LogQuery query)
    {
        ArgumentNullException.ThrowIfNull(query);
        var after = long.MinValue;
        while (Page(query, after, PageLength) is { IsEmpty: false } page)
        {
            foreach (var record in page) yield return record;
            after = page[^1].Entry.Number;
        }
    }

    /// <summary>A file by its SHA-256, byte for byte; null when it is not in the log.</summary>
    public byte[]? Input(string sha256) => Explained(() =>
    {
        using var command = database.Command("SELECT body FROM inputs WHERE sha256 = @sha256", ("@sha256", sha256));
        return command.ExecuteScalar() switch
        {
            byte[] bytes => bytes,
            string text => Encoding.UTF8.GetBytes(text), // what only somebody who went round the log can have put there
            _ => null,
        };
    });

    public void Dispose() => database.Dispose();

    private static LogRecord Chained(Filing filing, long number, string previous, InputWriter inputs)
    {
        var entry = new LogEntry(
            number, filing.FiledText, Filing.Storable(filing.Program), Filing.Storable(filing.BoardTitle),
            filing.Serial is null ? null : Filing.Storable(filing.Serial), Filing.Storable(filing.Verdict), "");
        var record = new LogRecord(
            entry, Filing.Storable(filing.Settings), Filing.Storable(filing.Result), inputs.Write(filing.BoardFile), inputs.Write(filing.ReadingsFile),
            filing.RatesFile is { } rates ? inputs.Write(rates) : null, previous,
            filing.Plot is { } plot ? inputs.Write(plot) : null);
        return record with { Entry = entry with { Hash = ChainHash.Of(record) } };
    }

    private static LogEntry Entry(DbDataReader reader) => new(
        reader.GetInt64(0), reader.GetString(1), reader.GetString(2), reader.GetString(3), reader.IsDBNull(4) ? null : reader.GetString(4),
        reader.GetString(5), reader.GetString(6));

    private (long Number, string Hash) Last()
    {
        using var command = database.Command("SELECT number, hash FROM records ORDER BY number DESC LIMIT 1");
        using var reader = command.ExecuteReader();
        return reader.Read() ? (reader.GetInt64(0), reader.GetString(1)) : (0, ChainHash.Start);
    }

    private ImmutableArray<LogRecord> Page(LogQuery query, long after, int most) => Explained(() =>
    {
        using var command = Select(RecordColumns, query, " AND number > @after", "number", most);
        var from = command.CreateParameter();
        from.ParameterName = "@after";
        from.Value = after;
        command.Parameters.Add(from);
        using var reader = command.ExecuteReader();
        var records = ImmutableArray.CreateBuilder<LogRecord>();
        while (reader.Read())
        {
            records.Add(new LogRecord(
                Entry(reader), reader.GetString(7), reader.GetString(8), reader.GetString(9), reader.GetString(10),
                reader.IsDBNull(11) ? null : reader.GetString(11), reader.GetString(12), reader.IsDBNull(13) ? null : reader.GetString(13)));
        }

        return records.ToImmutable();
    });

    private DbCommand Select(string columns, LogQuery query, string further, string order, int most)
    {
        var conditions = "1 = 1" + further;
        var values = new List<(string, object?)>();
        Want(query.Board, "@board", "{position}(board, @board) > 0");
        Want(query.Serial, "@serial", "serial = @serial");
        Want(query.Verdict, "@verdict", "verdict = @verdict");
        Want(query.From is { } from ? Filing.TimeText(from) : null, "@from", "filed_at >= @from");
        Want(query.Before is { } before ? Filing.TimeText(before) : null, "@before", "filed_at < @before");
        values.Add(("@most", (long)most));
        return database.Command($"SELECT {columns} FROM records WHERE {conditions} ORDER BY {order} LIMIT @most", values.ToArray());

        void Want(string? value, string name, string condition)
        {
            if (value is null) return;
            conditions += " AND " + condition;
            values.Add((name, Filing.Storable(value)));
        }
    }

    private T Explained<T>(Func<T> work)
    {
        try
        {
            return work();
        }
        catch (DbException failure)
        {
            throw new BenchLogException($"{place.Name}: {database.Explain(failure)}", failure);
        }
    }
}
