using BenchCheck.Records.Databases;
using Xunit;

namespace BenchCheck.Records.Tests;

public sealed class SqliteLogTests : BenchLogTests
{
    private readonly string folder = Directory.CreateTempSubdirectory("bench log ").FullName;
    private int count;

    [Fact]
    public void A_full_disk_is_said_plainly_and_leaves_the_log_whole()
    {
        using var log = BenchLog.Open(LogPlace.Parse(NewPlace()), true, Migrations.Newest, database => database.Execute("PRAGMA max_page_count = 40"));
        var kept = 0;
        BenchLogException? refusal = null;
        while (refusal is null && kept < 1000)
        {
            try
            {
                log.Append(Filings.Of($"{kept}") with { ReadingsFile = new byte[4000 + kept] });
                kept++;
            }
            catch (BenchLogException full)
            {
                refusal = full;
            }
        }

        Assert.Contains("disk is full", refusal!.Message, StringComparison.Ordinal);
        Assert.Equal(kept, ChainReport.Of(log).Count);
        Assert.True(ChainReport.Of(log).IsWhole);
    }

    [Theory]
    [InlineData("/proc/bench-log.db")]
    [InlineData("/dev/null/bench-log.db")]
    public void A_folder_that_may_not_be_written_is_said_plainly(string path)
    {
        Assert.SkipUnless(OperatingSystem.IsLinux(), "the folders of Linux in which nobody can make a file");
        var refusal = Assert.Throws<BenchLogException>(() => BenchLog.Open(LogPlace.Parse(path)));
        Assert.Contains(path, refusal.Message, StringComparison.Ordinal);
        Assert.Matches("folder|writable", refusal.Message);
    }

    [Fact]
    public void A_file_that_is_no_log_is_refused_and_left_as_it_was()
    {
        var path = NewPlace();
        File.WriteAllText(path, "The minutes of the workshop meeting, which are no bench log at all.");
        var refusal = Assert.Throws<BenchLogException>(() => BenchLog.Open(LogPlace.Parse(path)));
        Assert.Contains("no bench log", refusal.Message, StringComparison.Ordinal);
        Assert.StartsWith("The minutes", File.ReadAllText(path), StringComparison.Ordinal);
    }

    [Fact]
    public void A_log_that_is_not_there_is_not_made_by_looking_for_it()
    {
        var path = NewPlace();
        Assert.Contains("no bench log", Assert.Throws<BenchLogException>(() => BenchLog.OpenExisting(LogPlace.Parse(path))).Message, StringComparison.Ordinal);
        Assert.False(File.Exists(path));
    }

    [Fact]
    public void The_folder_of_a_log_is_made_on_first_use()
    {
        var path = Path.Combine(folder, "new", "deep", "log.db");
        using (var log = BenchLog.Open(LogPlace.Parse(path))) log.Append(Filings.Of("41"));
        Assert.True(File.Exists(path));
    }

    [Fact]
    public void A_password_never_shows_in_the_name_of_a_place()
    {
        var place = LogPlace.Parse("Host=shop;Database=bench;Username=anna;Password=tomatoes");
        Assert.Equal("database bench on shop", place.Name);
        Assert.DoesNotContain("tomatoes", Assert.Throws<BenchLogException>(() => LogPlace.Parse("Host=shop;Password=tomatoes;Sort=ripe")).Message, StringComparison.Ordinal);
    }

    public override void Dispose() => Directory.Delete(folder, true);

    protected override string NewPlace() => Path.Combine(folder, $"log {++count}.db");

    private protected override void DropGuards(LogDatabase database)
    {
        foreach (var guard in new[] { "records_keep", "records_stay", "inputs_keep", "inputs_stay" }) database.Execute($"DROP TRIGGER {guard}");
        database.Execute("PRAGMA foreign_keys = OFF");
    }
}
