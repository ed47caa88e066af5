using System.Data.Common;

namespace BenchCheck.Records.Databases;

/// <summary>Inserts records within one transaction by one prepared statement.</summary>
internal sealed class RecordWriter(LogDatabase database) : IDisposable
{
    private readonly DbCommand command = database.Command("""
        INSERT INTO records (number, filed_at, program, board, serial, verdict, hash, settings, result, board_file, readings_file, rates_file, previous, plot)
        VALUES (@number, @filed_at, @program, @board, @serial, @verdict, @hash, @settings, @result, @board_file, @readings_file, @rates_file, @previous, @plot)
        """,
        ("@number", 0L), ("@filed_at", ""), ("@program", ""), ("@board", ""), ("@serial", ""), ("@verdict", ""), ("@hash", ""), ("@settings", ""),
        ("@result", ""), ("@board_file", ""), ("@readings_file", ""), ("@rates_file", ""), ("@previous", ""), ("@plot", ""));

    public void Write(LogRecord record)
    {
        var entry = record.Entry;
        ReadOnlySpan<object?> values =
        [
            entry.Number, entry.FiledAt, entry.Program, entry.BoardTitle, entry.Serial, entry.Verdict, entry.Hash, record.Settings, record.Result,
            record.BoardFile, record.ReadingsFile, record.RatesFile, record.Previous, record.Plot,
        ];
        for (var i = 0; i < values.Length; i++) command.Parameters[i].Value = values[i] ?? DBNull.Value;
        command.ExecuteNonQuery();
    }

    public void Dispose() => command.Dispose();
}
