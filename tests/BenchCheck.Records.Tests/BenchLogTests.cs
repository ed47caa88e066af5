using System.Data.Common;
using System.Text;
using System.Text.Json;
using BenchCheck.Records.Databases;
using CsCheck;
using Xunit;

namespace BenchCheck.Records.Tests;

/// <summary>What every database that can hold a log has to do.</summary>
public abstract class BenchLogTests : IDisposable
{
    /// <summary>Path or connection string of a log that is not there yet.</summary>
    protected abstract string NewPlace();

    public abstract void Dispose();

    [Fact]
    public void What_was_filed_comes_back_byte_for_byte()
    {
        using var log = New();
        byte[] readings = [0xFF, 0xFE, 0x41, 0x00, 0x0D, 0x00, 0x00, 0x00];
        var filing = Filings.Of("=cmd|'/c'!A1", "disagrees", "Größe Ω <b>'; DROP TABLE records;--") with { ReadingsFile = readings, RatesFile = Encoding.UTF8.GetBytes("open,1,2"), Plot = Encoding.UTF8.GetBytes("<svg>Ω</svg>") };
        var entry = Assert.Single(log.Append(filing));
        var record = log.Find(entry.Number)!;
        Assert.Equal((filing.Serial, filing.BoardTitle, filing.Verdict, filing.Settings, filing.Result), (record.Entry.Serial, record.Entry.BoardTitle, record.Entry.Verdict, record.Settings, record.Result));
        Assert.Equal("2026-03-01T09:30:00.000Z", record.Entry.FiledAt);
        Assert.Equal(readings, log.Input(record.ReadingsFile));
        Assert.Equal(Filings.Board, log.Input(record.BoardFile));
        Assert.Equal(filing.RatesFile!.Value.ToArray(), log.Input(record.RatesFile!));
        Assert.Equal(filing.Plot!.Value.ToArray(), log.Input(record.Plot!));
        Assert.Null(log.Find(2));
        Assert.True(ChainReport.Of(log).IsWhole);
    }

    [Fact]
    public void Whatever_text_a_filing_holds_the_log_keeps_it_whole()
    {
        using var log = New();
        Gen.Select(Gen.String, Gen.String, Gen.Byte.Array[0, 60]).Sample((title, serial, file) =>
        {
            var entry = log.Append(Filings.Of(serial, "agrees", title) with { ReadingsFile = file })[0];
            var record = log.Find(entry.Number)!;
            Assert.Equal(file, log.Input(record.ReadingsFile));
            Assert.Equal(Filing.Storable(title), record.Entry.BoardTitle);
            Assert.Equal(entry, Assert.Single(log.List(new LogQuery { Serial = serial, From = Filings.Of("").FiledAt }, 1)));
        }, iter: 60, threads: 1);
        Assert.Empty(ChainReport.Of(log).Faults);
    }

    [Fact]
    public void Records_are_found_by_board_serial_verdict_and_time_and_the_newest_come_last()
    {
        using var log = New();
        log.Append(Filings.Of("41", "agrees", "Fan stage", 0), Filings.Of("42", "disagrees", "Fan stage", 60), Filings.Of("41", "undecided", "Mist valve 100%_", 120));
        Assert.Equal([1, 3], Numbers(new LogQuery { Serial = "41" }));
        Assert.Equal([2], Numbers(new LogQuery { Verdict = "disagrees" }));
        Assert.Equal([3], Numbers(new LogQuery { Board = "0%_" }));
        Assert.Equal([1, 2], Numbers(new LogQuery { Board = "Fan" }));
        Assert.Equal([2], Numbers(new LogQuery { From = Filings.Of("", second: 60).FiledAt, Before = Filings.Of("", second: 120).FiledAt }));
        Assert.Equal([2, 3], log.List(LogQuery.All, 2).Select(e => e.Number));
        Assert.Empty(Numbers(new LogQuery { Serial = "' OR '1'='1" }));

        IEnumerable<long> Numbers(LogQuery query) => log.List(query, 100).Select(e => e.Number);
    }

    [Fact]
    public void A_filing_that_cannot_be_kept_leaves_no_part_of_it()
    {
        using var log = New();
        log.Append(Filings.Of("first"));
        Assert.ThrowsAny<Exception>(() => log.Append(Filings.Of("second"), Filings.Of("third") with { Result = null! }));
        Assert.Equal("first", Assert.Single(log.List(LogQuery.All, 10)).Serial);
        Assert.Equal(2, log.Append(Filings.Of("fourth"))[0].Number);
        Assert.True(ChainReport.Of(log).IsWhole);
    }

    [Fact]
    public void The_database_itself_refuses_to_change_or_delete_a_record()
    {
        var place = NewPlace();
        using var log = BenchLog.Open(LogPlace.Parse(place));
        log.Append(Filings.Of("41"));
        Raw(place, database =>
        {
            Assert.ThrowsAny<DbException>(() => database.Execute("UPDATE records SET verdict = 'disagrees'"));
            Assert.ThrowsAny<DbException>(() => database.Execute("DELETE FROM records"));
            Assert.ThrowsAny<DbException>(() => database.Execute("DELETE FROM inputs"));
        });
        Assert.True(ChainReport.Of(log).IsWhole);
    }

    [Theory]
    [InlineData("UPDATE records SET verdict = 'agrees' WHERE number = 2", "record 2 is not as it was filed")]
    [InlineData("UPDATE records SET serial = NULL WHERE number = 3", "record 3 is not as it was filed")]
    [InlineData("DELETE FROM records WHERE number = 2", "record 2 is missing")]
    [InlineData("UPDATE records SET number = 12 WHERE number = 1", "record 2 does not follow")]
    [InlineData("UPDATE records SET plot = NULL WHERE number = 1", "record 1 is not as it was filed")]
    [InlineData("UPDATE inputs SET body = '' WHERE sha256 = (SELECT readings_file FROM records WHERE number = 2)", "a file of record 2 is not as it was filed")]
    public void Whoever_gets_round_the_guards_is_found_out(string change, string finding)
    {
        var place = NewPlace();
        using (var log = BenchLog.Open(LogPlace.Parse(place)))
            log.Append(Filings.Of("41", "agrees", second: 1) with { Plot = "<svg/>"u8.ToArray() }, Filings.Of("42", "disagrees", second: 2), Filings.Of("43", "agrees", second: 3));
        Raw(place, database =>
        {
            DropGuards(database);
            database.Execute(change);
        });
        using var again = BenchLog.OpenExisting(LogPlace.Parse(place));
        var report = ChainReport.Of(again);
        Assert.False(report.IsWhole);
        Assert.Contains(report.Faults, f => f.Contains(finding, StringComparison.Ordinal));
    }

    [Fact]
    public void A_hash_noted_before_shows_that_the_newest_records_were_cut_off()
    {
        var place = NewPlace();
        string newest;
        using (var log = BenchLog.Open(LogPlace.Parse(place))) newest = log.Append(Filings.Of("41"), Filings.Of("42"))[^1].Hash;
        Raw(place, database =>
        {
            DropGuards(database);
            database.Execute("DELETE FROM records WHERE number = 2");
        });
        using var again = BenchLog.OpenExisting(LogPlace.Parse(place));
        Assert.True(ChainReport.Of(again).IsWhole);
        Assert.False(ChainReport.Of(again, newest).IsWhole);
    }

    [Fact]
    public void A_log_of_the_first_version_is_brought_forward_with_its_records()
    {
        var place = NewPlace();
        string before;
        using (var other = New())
        {
            before = other.Append(Filings.Of("41"))[0].Hash;
            var filed = other.Find(1)!;
            using (BenchLog.Open(LogPlace.Parse(place), true, 1)) Raw(place, database => InsertAsFirstVersion(database, filed, other));
        }

        using var log = BenchLog.OpenExisting(LogPlace.Parse(place));
        log.Append(Filings.Of("42"));
        Assert.Equal(before, log.Find(1)!.Entry.Hash);
        Assert.True(ChainReport.Of(log).IsWhole);
        Raw(place, database => Assert.Equal(Migrations.Newest, Migrations.Version(database)));
    }

    [Fact]
    public void A_log_of_a_newer_program_is_refused_and_left_alone()
    {
        var place = NewPlace();
        using (var log = BenchLog.Open(LogPlace.Parse(place))) log.Append(Filings.Of("41"));
        Raw(place, database => database.Execute("INSERT INTO log_version (version) VALUES (99)"));
        var refusal = Assert.Throws<BenchLogException>(() => BenchLog.Open(LogPlace.Parse(place)));
        Assert.Contains("newer program", refusal.Message, StringComparison.Ordinal);
    }

    [Fact]
    public async Task Eight_programs_that_file_a_thousand_records_each_at_once_lose_none()
    {
        var cancel = TestContext.Current.CancellationToken;
        const int Writers = 8;
        const int Each = 1000;
        var place = NewPlace();
        var processes = Enumerable.Range(0, Writers).Select(w => Writer.Start(place, $"w{w}", Each)).ToArray();
        var outputs = await Task.WhenAll(processes.Select(async p =>
        {
            var error = p.StandardError.ReadToEndAsync(cancel);
            var output = await p.StandardOutput.ReadToEndAsync(cancel);
            await p.WaitForExitAsync(cancel);
            Assert.True(p.ExitCode == 0, await error);
            return output;
        }));
        using var log = BenchLog.OpenExisting(LogPlace.Parse(place));
        var report = ChainReport.Of(log);
        Assert.Empty(report.Faults);
        Assert.Equal(Writers * Each, report.Count);
        var filed = log.List(LogQuery.All, Writers * Each).Select(e => e.Serial).ToHashSet();
        Assert.Equal(Writers * Each, filed.Count);
        Assert.All(outputs.SelectMany(o => o.Split('\n', StringSplitOptions.RemoveEmptyEntries)), serial => Assert.Contains(serial, filed));
    }

    [Fact]
    public async Task A_program_killed_while_filing_loses_nothing_that_was_acknowledged()
    {
        var place = NewPlace();
        var cancel = TestContext.Current.CancellationToken;
        var acknowledged = new List<string>();
        for (var round = 0; round < 3; round++)
        {
            using var process = Writer.Start(place, $"round{round}", 100_000);
            for (var i = 0; i < 40 + 25 * round; i++) acknowledged.Add((await process.StandardOutput.ReadLineAsync(cancel))!);
            process.Kill();
            // What it managed to say before it died counts as acknowledged too.
            while (await process.StandardOutput.ReadLineAsync(cancel) is { Length: 11 } line) acknowledged.Add(line);
            await process.WaitForExitAsync(cancel);
        }

        using var log = BenchLog.OpenExisting(LogPlace.Parse(place));
        Assert.Empty(ChainReport.Of(log).Faults);
        var filed = log.Records(LogQuery.All).Select(r => r.Entry.Serial).ToHashSet();
        Assert.All(acknowledged, serial => Assert.Contains(serial, filed));
        Assert.Equal(filed.Count + 1, log.Append(Filings.Of("after"))[0].Number);
    }

    [Fact]
    public void An_export_has_every_record_and_every_file_once_and_its_hashes_can_be_recomputed()
    {
        using var log = New();
        log.Append(Filings.Of("41", second: 1), Filings.Of("=1+1", "disagrees", "a\nb\u2028", 2), Filings.Of(null, second: 1) with { BoardFile = new byte[] { 0xFF, 0x00 } });
        var lines = Encoding.UTF8.GetString(Export(log)).TrimEnd('\n').Split('\n').Select(l => JsonDocument.Parse(l).RootElement).ToArray();
        var files = lines.Where(l => l.TryGetProperty("sha256", out _)).ToArray();
        Assert.Equal(4, files.Length);
        foreach (var file in files)
        {
            var bytes = file.TryGetProperty("text", out var text) ? Encoding.UTF8.GetBytes(text.GetString()!) : file.GetProperty("base64").GetBytesFromBase64();
            Assert.Equal(file.GetProperty("sha256").GetString(), ChainHash.Of(bytes));
        }

        var records = lines.Where(l => l.TryGetProperty("number", out _)).ToArray();
        Assert.Equal(["41", "=1+1", null], records.Select(r => r.GetProperty("serial").GetString()));
        Assert.Equal(records[0].GetProperty("hash").GetString(), records[1].GetProperty("previous").GetString());
        Assert.Equal("disagrees", records[1].GetProperty("result").GetProperty("verdict").GetString());
    }

    internal static byte[] Export(BenchLog log)
    {
        using var target = new MemoryStream();
        LogExport.Write(log, LogQuery.All, target);
        return target.ToArray();
    }

    /// <summary>Takes away what keeps records from being changed, as somebody with the database's password could.</summary>
    private protected abstract void DropGuards(LogDatabase database);

    private static void InsertAsFirstVersion(LogDatabase database, LogRecord record, BenchLog source)
    {
        foreach (var file in record.Files)
        {
            using var input = database.Command("INSERT INTO inputs (sha256, body) VALUES (@sha256, @body)", ("@sha256", file), ("@body", source.Input(file)));
            input.ExecuteNonQuery();
        }

        var entry = record.Entry;
        using var command = database.Command(
            """
            INSERT INTO records (number, filed_at, program, board, serial, verdict, settings, result, board_file, readings_file, rates_file, previous, hash)
            VALUES (1, @filed_at, @program, @board, @serial, @verdict, @settings, @result, @board_file, @readings_file, NULL, @previous, @hash)
            """,
            ("@filed_at", entry.FiledAt), ("@program", entry.Program), ("@board", entry.BoardTitle), ("@serial", entry.Serial), ("@verdict", entry.Verdict),
            ("@settings", record.Settings), ("@result", record.Result), ("@board_file", record.BoardFile), ("@readings_file", record.ReadingsFile),
            ("@previous", record.Previous), ("@hash", entry.Hash));
        command.ExecuteNonQuery();
    }

    private static void Raw(string place, Action<LogDatabase> work)
    {
        using var database = LogDatabase.Of(LogPlace.Parse(place));
        database.Open(false);
        work(database);
    }

    private BenchLog New() => BenchLog.Open(LogPlace.Parse(NewPlace()));
}
