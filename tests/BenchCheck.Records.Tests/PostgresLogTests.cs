using BenchCheck.Records.Databases;
using Xunit;

namespace BenchCheck.Records.Tests;

public sealed class PostgresLogTests(PostgresServer server) : BenchLogTests
{
    private readonly List<string> databases = [];

    [Fact]
    public void The_same_records_give_the_same_export_byte_for_byte_as_from_a_file()
    {
        var folder = Directory.CreateTempSubdirectory("bench log ").FullName;
        try
        {
            using var shared = BenchLog.Open(LogPlace.Parse(NewPlace()));
            using var own = BenchLog.Open(LogPlace.Parse(Path.Combine(folder, "log.db")));
            var filings = Enumerable.Range(0, 250).Select(i => Filings.Of(i % 7 == 0 ? null : $"Ω{i}\u0001\"", i % 3 == 0 ? "agrees" : "disagrees", "Größe\n<&>", i)
                with { ReadingsFile = i % 5 == 0 ? [0xFF, (byte)i] : "at,value\nC1,1"u8.ToArray() }).ToArray();
            foreach (var part in filings.Chunk(90))
            {
                shared.Append(part);
                own.Append(part);
            }

            Assert.Equal(Export(own), Export(shared));
        }
        finally
        {
            Directory.Delete(folder, true);
        }
    }

    [Fact]
    public void A_server_that_does_not_answer_is_said_plainly()
    {
        var refusal = Assert.Throws<BenchLogException>(() => BenchLog.Open(LogPlace.Parse("Host=127.0.0.1;Port=1;Database=bench;Username=anna;Password=tomatoes;Timeout=5")));
        Assert.Contains("does not answer", refusal.Message, StringComparison.Ordinal);
        Assert.DoesNotContain("tomatoes", refusal.Message, StringComparison.Ordinal);
    }

    [Fact]
    public void A_database_without_a_log_is_said_plainly_by_those_who_only_read()
    {
        var refusal = Assert.Throws<BenchLogException>(() => BenchLog.OpenExisting(LogPlace.Parse(NewPlace())));
        Assert.Contains("no bench log yet", refusal.Message, StringComparison.Ordinal);
    }

    public override void Dispose() => PostgresServer.Drop(databases);

    protected override string NewPlace()
    {
        databases.Add(server.NewDatabase());
        return databases[^1];
    }

    private protected override void DropGuards(LogDatabase database)
    {
        database.Execute("DROP TRIGGER records_keep ON records");
        database.Execute("DROP TRIGGER inputs_keep ON inputs");
        database.Execute("ALTER TABLE records DROP CONSTRAINT records_board_file_fkey, DROP CONSTRAINT records_readings_file_fkey");
    }
}
