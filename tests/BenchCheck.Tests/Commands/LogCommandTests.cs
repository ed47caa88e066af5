using System.Text.Json;
using BenchCheck.Records;
using Xunit;

namespace BenchCheck.Tests.Commands;

public sealed class LogCommandTests : IDisposable
{
    private readonly CommandLine line = new();
    private readonly string log;
    private readonly string board;

    public LogCommandTests()
    {
        log = Path.Combine(line.Folder, "bench.db");
        board = line.File("board.toml", WorkshopFiles.Board);
    }

    [Fact]
    public async Task A_filed_check_is_found_shown_and_its_answer_is_the_same_again()
    {
        Assert.Equal(1, await File(WorkshopFiles.Faulty));
        Assert.Contains("filed as record 1", line.Error, StringComparison.Ordinal);
        Assert.Equal(0, await line.Run("log", "list", "--log", log, "--verdict", "disagrees"));
        Assert.Contains("Circulation-fan stage", line.Output, StringComparison.Ordinal);
        Assert.Equal(0, await line.Run("log", "show", "1", "--log", log));
        Assert.Contains("R4", line.Output, StringComparison.Ordinal);
        Assert.Equal(0, await line.Run("log", "again", "1", "--log", log));
        Assert.Contains("the same answer, to the last digit: disagrees", line.Output, StringComparison.Ordinal);
        Assert.Equal(0, await line.Run("log", "check", "--log", log));
        Assert.Contains("whole: 1 records", line.Output, StringComparison.Ordinal);
    }

    [Fact]
    public async Task The_result_on_record_is_the_result_that_was_printed()
    {
        var readings = line.File("readings.csv", WorkshopFiles.Healthy);
        await line.Run("check", board, readings, "--json", "--log", log);
        var printed = line.Output;
        await line.Run("log", "show", "1", "--raw", "result", "--log", log);
        Assert.Equal(printed, line.Output);
    }

    [Fact]
    public async Task A_record_whose_answer_would_now_differ_is_told_apart()
    {
        await File(WorkshopFiles.Healthy);
        using (var records = BenchLog.OpenExisting(LogPlace.Parse(log)))
        {
            var record = records.Find(1)!;
            records.Append(new Filing(
                DateTimeOffset.UnixEpoch, "benchcheck 0.1", record.Entry.BoardTitle, null, "disagrees", record.Settings,
                record.Result.Replace("\"verdict\":\"agrees\"", "\"verdict\":\"disagrees\"", StringComparison.Ordinal), records.Input(record.BoardFile)!, records.Input(record.ReadingsFile)!));
        }

        Assert.Equal(1, await line.Run("log", "again", "2", "--log", log));
        Assert.Contains("verdict: disagrees, now agrees", line.Output, StringComparison.Ordinal);
        Assert.Contains("filed by benchcheck 0.1", line.Output, StringComparison.Ordinal);
    }

    [Fact]
    public async Task Two_records_stand_side_by_side_and_a_parameter_is_followed_over_them()
    {
        await File(WorkshopFiles.Faulty);
        await File(WorkshopFiles.Healthy);
        Assert.Equal(0, await line.Run("log", "compare", "1", "2", "--log", log));
        Assert.Contains("11.16 V", line.Output, StringComparison.Ordinal);
        Assert.Contains("5.306 V", line.Output, StringComparison.Ordinal);
        Assert.Equal(0, await line.Run("log", "trend", "Q1 gain", "--log", log));
        Assert.Contains("Q1 gain, Circulation-fan stage", line.Output, StringComparison.Ordinal);
        Assert.Equal(2, await line.Run("log", "trend", "R99", "--log", log));
    }

    [Fact]
    public async Task An_export_goes_to_a_file_and_never_over_one()
    {
        await File(WorkshopFiles.Healthy);
        var target = Path.Combine(line.Folder, "records.jsonl");
        Assert.Equal(0, await line.Run("log", "export", "--log", log, "--out", target));
        var last = System.IO.File.ReadAllLines(target)[^1];
        Assert.Equal("agrees", JsonDocument.Parse(last).RootElement.GetProperty("verdict").GetString());
        Assert.Equal(2, await line.Run("log", "export", "--log", log, "--out", target));
    }

    [Fact]
    public async Task The_picture_of_a_check_is_on_record_with_it()
    {
        await File(WorkshopFiles.Faulty);
        await line.Run("log", "show", "1", "--log", log);
        Assert.Contains("--raw result|settings|board|readings|plot", line.Output, StringComparison.Ordinal);
        var run = new ProgramProcess(line.Folder).Run("log", "show", "1", "--raw", "plot", "--log", log);
        Assert.Equal(0, run.Exit);
        Assert.Equal("svg", System.Xml.Linq.XDocument.Parse(run.Output).Root!.Name.LocalName);
        Assert.Contains("Circulation-fan stage", run.Output, StringComparison.Ordinal);
        Assert.Equal(2, await line.Run("log", "show", "1", "--raw", "rates", "--log", log));
        await line.Run("log", "show", "1", "--raw", "settings", "--log", log);
        Assert.Equal(
            ["confidence", "bands", "law", "draws", "seed", "findFaults", "skipBadRows"], JsonDocument.Parse(line.Output).RootElement.EnumerateObject().Select(p => p.Name));
    }

    [Theory]
    [InlineData("time")]
    [InlineData("serial")]
    public async Task A_trend_is_drawn(string by)
    {
        await File(WorkshopFiles.Faulty);
        await File(WorkshopFiles.Healthy);
        var picture = Path.Combine(line.Folder, "trend.svg");
        Assert.Equal(0, await line.Run("log", "trend", "Q1", "--log", log, "--plot", picture, "--by", by));
        Assert.Contains("Q1 gain: 2 values", await System.IO.File.ReadAllTextAsync(picture, TestContext.Current.CancellationToken), StringComparison.Ordinal);
        Assert.Contains("Q1 drop: 2 values", await System.IO.File.ReadAllTextAsync(Path.Combine(line.Folder, "trend-2.svg"), TestContext.Current.CancellationToken), StringComparison.Ordinal);
        Assert.Equal(2, await line.Run("log", "trend", "Q1", "--log", log, "--plot", Path.Combine(line.Folder, "trend.gif")));
    }

    [Fact]
    public void A_log_set_once_files_every_check_until_it_is_set_otherwise()
    {
        Assert.SkipWhen(OperatingSystem.IsWindows(), "the configuration folder cannot be moved there");
        var program = new ProgramProcess(line.Folder);
        var readings = line.File("readings.csv", WorkshopFiles.Healthy);
        Assert.DoesNotContain("filed", program.Run("check", board, readings).Error, StringComparison.Ordinal);
        var set = program.Run("log", "default", "shop log.db", "--every-check");
        Assert.Equal(0, set.Exit);
        Assert.Contains($"log: {Path.Combine(line.Folder, "shop log.db")}", set.Output, StringComparison.Ordinal);
        Assert.Contains("filed as record 1", program.Run("check", board, readings).Error, StringComparison.Ordinal);
        Assert.DoesNotContain("filed", program.Run("check", board, readings, "--no-log").Error, StringComparison.Ordinal);
        Assert.Contains("Circulation-fan stage", program.Run("log", "list").Output, StringComparison.Ordinal);
        Assert.True(System.IO.File.Exists(Path.Combine(line.Folder, "shop log.db")));
        if (!OperatingSystem.IsWindows())         Assert.Equal(UnixFileMode.UserRead | UnixFileMode.UserWrite, System.IO.File.GetUnixFileMode(Path.Combine(line.Folder, "config", "benchcheck", "settings.json")));
        program.Run("log", "default", "--usual", "--on-request");
        Assert.DoesNotContain("filed", program.Run("check", board, readings).Error, StringComparison.Ordinal);
        Assert.Contains("filed as record 1", program.Run("check", board, readings, "--log").Error, StringComparison.Ordinal);
        Assert.True(System.IO.File.Exists(Path.Combine(line.Folder, "data", "benchcheck", "bench-log.db")));
    }

    [Fact]
    public void Damaged_settings_are_said_plainly_and_a_password_is_never_shown()
    {
        Assert.SkipWhen(OperatingSystem.IsWindows(), "the configuration folder cannot be moved there");
        var program = new ProgramProcess(line.Folder);
        Directory.CreateDirectory(Path.Combine(line.Folder, "config", "benchcheck"));
        line.File("config/benchcheck/settings.json", "{ \"log\": ");
        var refused = program.Run("log", "list");
        Assert.Equal(2, refused.Exit);
        Assert.Contains("settings.json", refused.Error, StringComparison.Ordinal);
        var set = program.Run("log", "default", "Host=shop;Database=bench;Username=anna;Password=tomatoes");
        Assert.Contains("log: database bench on shop", set.Output, StringComparison.Ordinal);
        Assert.DoesNotContain("tomatoes", set.Output + set.Error, StringComparison.Ordinal);
    }

    [Fact]
    public async Task Hostile_names_do_not_steer_the_terminal()
    {
        var hostile = line.File("hostile.toml", WorkshopFiles.Board.Replace("Circulation-fan stage", "Fan \\u001B[2J [red]stage[/]", StringComparison.Ordinal));
        var readings = line.File("readings.csv", WorkshopFiles.Healthy);
        await line.Run("check", hostile, readings, "--log", log);
        foreach (var command in new[] { new[] { "list" }, ["show", "1"], ["compare", "1", "1"], ["trend", "Q1"] })
        {
            Assert.Equal(0, await line.Run(["log", .. command, "--log", log]));
            Assert.DoesNotContain('\u001B', line.Output + line.Error);
            Assert.Contains("[red]stage[/]", line.Output, StringComparison.Ordinal);
        }
    }

    [Fact]
    public async Task A_log_or_record_that_is_not_there_is_said_plainly()
    {
        Assert.Equal(2, await line.Run("log", "list", "--log", log));
        Assert.Contains("no bench log", line.Error, StringComparison.Ordinal);
        await File(WorkshopFiles.Healthy);
        Assert.Equal(2, await line.Run("log", "show", "7", "--log", log));
        Assert.Contains("no record 7", line.Error, StringComparison.Ordinal);
        Assert.Equal(2, await line.Run("check", board, line.File("r.csv", WorkshopFiles.Healthy), "--log", "/dev/null/bench.db"));
        Assert.Contains("/dev/null/bench.db", line.Error, StringComparison.Ordinal);
    }

    public void Dispose() => line.Dispose();

    private Task<int> File(string readings) => line.Run("check", board, line.File("readings.csv", readings), "--log", log);
}
