using System.Collections.Immutable;
using System.Text;
using BenchCheck.Core.Metering;
using BenchCheck.Files;
using Xunit;

namespace BenchCheck.Files.Tests.Documents;

/// <summary>Readings that are being worked on: on the disk before anything else, recovered after a crash, never written over a stranger's change.</summary>
public sealed class ReadingsDocumentTests : IDisposable
{
    private const string Board = """
        reference = "GND"
        [parts]
        V1 = { kind = "supply",   value = "12 V 1%", pins = { plus = "VCC", minus = "GND" } }
        R1 = { kind = "resistor", value = "10k 5%",  pins = ["VCC", "OUT"] }
        R2 = { kind = "resistor", value = "10k 5%",  pins = ["OUT", "GND"] }
        """;

    private static readonly DateTimeOffset Noon = new(2026, 5, 4, 12, 0, 0, TimeSpan.FromHours(2));
    private readonly string folder = Directory.CreateTempSubdirectory("benchcheck-").FullName;
    private readonly Bench bench = BoardFile.Parse(Board, "board.toml").Bench!;

    private string Readings => Path.Combine(folder, "readings.csv");

    public void Dispose() => Directory.Delete(folder, true);

    [Fact]
    public void An_entry_recorded_and_not_saved_is_found_by_the_next_run()
    {
        var first = ReadingsDocument.Open(Readings, []);
        first.Record([Set(("OUT", 5.97))], Noon);
        first.Record([Set(("OUT", 5.97), ("VCC", 11.9))], Noon);
        first.Dispose();
        var left = ReadingsJournal.Read(Readings, bench)!;
        Assert.Equal(2, left.Entries);
        Assert.Equal(Noon, left.Time);
        Assert.Equal(FileFingerprint.Absent, left.Basis);
        Assert.Equal([("OUT", 5.97), ("VCC", 11.9)], left.Sets[0].Readings.Select(r => (r.At, r.Value)));
    }

    [Fact]
    public void A_journal_torn_at_any_byte_still_gives_every_entry_that_was_whole()
    {
        using (var document = ReadingsDocument.Open(Readings, []))
        {
            for (var i = 1; i <= 4; i++) document.Record([Set([.. Enumerable.Range(0, i).Select(n => (n % 2 == 0 ? "OUT" : "VCC", 5.0 + n))])], Noon);
        }

        var whole = File.ReadAllBytes(ReadingsJournal.PathFor(Readings));
        for (var length = 0; length <= whole.Length; length++)
        {
            File.WriteAllBytes(ReadingsJournal.PathFor(Readings), whole[..length]);
            var complete = Math.Max(0, whole.AsSpan(0, length).Count((byte)'\n') - 1);
            Assert.Equal(complete, ReadingsJournal.Read(Readings, bench)?.Entries ?? 0);
        }
    }

    [Theory]
    [InlineData("")]
    [InlineData("\0\0\0\0\n\n\n")]
    [InlineData("{\"format\":1,\"basis\":\"x\"}\n{\"readings\":17}\n[1]\n\"readings\"\nnull\n")]
    [InlineData("{\"format\":1,\"basis\":\"x\"}\n{\"readings\":\"at,value\\nNOWHERE,1\\n\"}\n")]
    public void A_journal_that_holds_nothing_usable_is_no_journal(string content)
    {
        File.WriteAllText(ReadingsJournal.PathFor(Readings), content);
        Assert.Null(ReadingsJournal.Read(Readings, bench));
    }

    [Fact]
    public void Saving_empties_the_journal_and_the_file_reads_back_the_same()
    {
        using var document = ReadingsDocument.Open(Readings, []);
        var sets = ImmutableArray.Create(Set(("OUT", 5.97)));
        document.Record(sets, Noon);
        Assert.Equal(SaveOutcome.Saved, document.Save(sets));
        Assert.Null(ReadingsJournal.Read(Readings, bench));
        Assert.False(File.Exists(ReadingsJournal.PathFor(Readings)));
        Assert.Equal(5.97, ReadingsFile.Read(Readings, bench).Sets.Single().Readings.Single().Value);
    }

    [Fact]
    public void A_file_changed_on_disk_is_not_written_over()
    {
        File.WriteAllText(Readings, "at,value\nOUT,6\n");
        using var document = ReadingsDocument.Open(Readings, [.. ReadingsFile.Read(Readings, bench).Sets]);
        File.WriteAllText(Readings, "at,value\nOUT,7\n");
        Assert.Equal(SaveOutcome.ChangedOnDisk, document.Save([Set(("OUT", 5))]));
        Assert.Equal("at,value\nOUT,7\n", File.ReadAllText(Readings));
    }

    [Fact]
    public void A_file_with_comments_of_its_own_is_kept_beside_when_ours_takes_its_place()
    {
        const string theirs = "# bench 2, Tuesday\nat,value\nOUT,6\n";
        File.WriteAllText(Readings, theirs);
        using var document = ReadingsDocument.Open(Readings, [.. ReadingsFile.Read(Readings, bench).Sets]);
        Assert.Equal(SaveOutcome.Saved, document.Save([Set(("OUT", 5))]));
        Assert.Equal(theirs, File.ReadAllText(Readings + ".bak"));
    }

    [Fact]
    public void Two_programs_on_one_file_notice_each_other_and_a_lock_left_behind_claims_nothing()
    {
        File.WriteAllText(FileClaim.PathFor(Readings), "99999");
        var first = ReadingsDocument.Open(Readings, []);
        Assert.True(first.IsOurs);
        using (var second = ReadingsDocument.Open(Readings, []))
        {
            Assert.False(second.IsOurs);
            Assert.Equal(SaveOutcome.HeldElsewhere, second.Save([Set(("OUT", 1))]));
        }

        first.Dispose();
        using var third = ReadingsDocument.Open(Readings, []);
        Assert.True(third.IsOurs);
    }

    [Fact]
    public void A_merge_keeps_what_each_side_changed_and_names_what_both_did()
    {
        var basis = Set(("OUT", 6), ("VCC", 12));
        var merged = ReadingsMerge.Of(basis, Set(("OUT", 5), ("VCC", 12)), Set(("OUT", 6), ("VCC", 11.5)));
        Assert.Equal([("OUT", 5.0), ("VCC", 11.5)], merged.Set.Readings.Select(r => (r.At, r.Value)));
        Assert.Empty(merged.Contested);

        merged = ReadingsMerge.Of(basis, Set(("OUT", 5), ("VCC", 12)), Set(("OUT", 4), ("VCC", 12)));
        Assert.Equal(5, merged.Set.Readings[0].Value);
        Assert.Equal(4, Assert.Single(merged.Contested).Value);

        merged = ReadingsMerge.Of(basis, Set(("VCC", 12)), basis);
        Assert.Equal("VCC", Assert.Single(merged.Set.Readings).At);
    }

    [Fact]
    public void A_write_that_fails_leaves_the_old_file()
    {
        File.WriteAllText(Readings, "old");
        Assert.ThrowsAny<IOException>(() => AtomicFile.Write(Path.Combine(Readings, "below-a-file.csv"), Encoding.UTF8.GetBytes("new")));
        Assert.Equal("old", File.ReadAllText(Readings));
        Assert.Single(Directory.GetFiles(folder));
    }

    private static ReadingSet Set(params ReadOnlySpan<(string At, double Volts)> readings)
    {
        var all = ImmutableArray.CreateBuilder<Reading>();
        foreach (var (at, volts) in readings) all.Add(new Reading([], "powered", ReadingQuantity.Voltage, at, "GND", volts) { Range = all.Count > 1 ? all.Count : null });
        return new ReadingSet(null, all.ToImmutable());
    }
}
