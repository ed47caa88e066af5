using System.Globalization;
using System.Text;
using System.Text.Json;
using Xunit;

namespace BenchCheck.Tests.Commands;

public sealed class BatchCommandTests : IDisposable
{
    private readonly CommandLine line = new();
    private readonly string board;

    public BatchCommandTests() => board = line.File("board.toml", WorkshopFiles.Board);

    [Fact]
    public async Task A_shelf_is_summed_up_and_every_board_has_its_row_in_the_order_of_the_file()
    {
        var shelf = line.File("shelf.csv", Shelf(40, faulty: 7));
        var target = Path.Combine(line.Folder, "results.csv");
        Assert.Equal(1, await line.Run("batch", board, shelf, "--out", target));
        var rows = File.ReadAllLines(target);
        Assert.Equal(41, rows.Length);
        Assert.Equal(Enumerable.Range(0, 40).Select(i => $"S{i:000}"), rows.Skip(1).Select(r => r.Split(',')[0]));
        Assert.Contains("disagrees", rows[8], StringComparison.Ordinal);
        Assert.Matches(@"39\s+97\.5 %\s+agree", line.Output);
        Assert.Contains("Commonest suspects", line.Output, StringComparison.Ordinal);
        Assert.Contains("Q1 gain", line.Output, StringComparison.Ordinal);
    }

    [Fact]
    public async Task Json_lines_are_those_that_check_prints()
    {
        var shelf = line.File("shelf.csv", Shelf(3, faulty: 1));
        await line.Run("check", board, shelf, "--json");
        var expected = line.Output;
        var target = Path.Combine(line.Folder, "results.jsonl");
        await line.Run("batch", board, shelf, "--out", target);
        Assert.Equal(expected.ReplaceLineEndings("\n"), File.ReadAllText(target));
    }

    [Theory]
    [InlineData("results.csv")]
    [InlineData("results.jsonl")]
    public async Task A_batch_that_was_cut_off_in_the_middle_of_a_row_goes_on_to_the_same_file_and_summary(string name)
    {
        var shelf = line.File("shelf.csv", Shelf(12, faulty: 5));
        var target = Path.Combine(line.Folder, name);
        await line.Run("batch", board, shelf, "--out", target);
        var (whole, summary) = (File.ReadAllBytes(target), line.Output);
        foreach (var part in new[] { whole.Length / 2, whole.Length / 5, 3, 0 })
        {
            File.WriteAllBytes(target, whole[..part]);
            Assert.Equal(1, await line.Run("batch", board, shelf, "--out", target, "--resume"));
            Assert.Equal(Encoding.UTF8.GetString(whole), File.ReadAllText(target));
            Assert.Equal(summary, line.Output);
        }
    }

    [Fact]
    public async Task Results_are_never_written_over_and_never_joined_to_those_of_other_readings()
    {
        var shelf = line.File("shelf.csv", Shelf(3, faulty: 1));
        var target = Path.Combine(line.Folder, "results.csv");
        await line.Run("batch", board, shelf, "--out", target);
        var before = File.ReadAllText(target);
        Assert.Equal(2, await line.Run("batch", board, shelf, "--out", target));
        Assert.Equal(2, await line.Run("batch", board, line.File("other.csv", Shelf(3, faulty: 1).Replace("S00", "T00", StringComparison.Ordinal)), "--out", target, "--resume"));
        Assert.Equal(before, File.ReadAllText(target));
        Assert.Equal(2, await line.Run("batch", board, shelf, "--out", Path.Combine(line.Folder, "results.xls")));
    }

    [Theory]
    [InlineData("results.csv")]
    [InlineData("results.jsonl")]
    public async Task A_lot_stands_in_every_line_of_a_board_that_agrees_and_a_resumed_batch_finds_the_same_lot(string name)
    {
        var shelf = line.File("shelf.csv", Shelf(12, faulty: 5));
        var target = Path.Combine(line.Folder, name);
        Assert.Equal(1, await line.Run("batch", board, shelf, "--pool", "--no-suspects", "--out", target));
        Assert.Contains("The lot, from 11 boards that agree", line.Output, StringComparison.Ordinal);
        var lines = File.ReadAllLines(target);
        if (name.EndsWith("csv", StringComparison.Ordinal))
        {
            var column = lines[0].Split(',').ToList().IndexOf("u(V1 voltage with lot)");
            double Cell(int row, int at) => double.Parse(lines[row].Split(',')[at], CultureInfo.InvariantCulture);
            Assert.True(Cell(1, column) < Cell(1, lines[0].Split(',').ToList().IndexOf("u(V1 voltage)")));
            Assert.Equal("", lines[6].Split(',')[column]);
        }
        else
        {
            var supply = JsonDocument.Parse(lines[0]).RootElement.GetProperty("parameters").EnumerateArray().Single(p => p.GetProperty("part").GetString() == "V1");
            Assert.True(supply.GetProperty("withLot").GetProperty("standardUncertainty").GetDouble() < supply.GetProperty("standardUncertainty").GetDouble());
            Assert.DoesNotContain("withLot", lines[5], StringComparison.Ordinal);
        }

        var whole = File.ReadAllBytes(target);
        File.WriteAllBytes(target, whole[..(whole.Length / 2)]);
        await line.Run("batch", board, shelf, "--pool", "--no-suspects", "--out", target, "--resume");
        Assert.Equal(whole, File.ReadAllBytes(target));
    }

    [Fact]
    public async Task Pictures_of_a_batch_are_left_in_a_folder_under_names_that_no_part_can_steer()
    {
        var hostile = line.File("hostile.toml", WorkshopFiles.Board.Replace("title =", "# title =", StringComparison.Ordinal).Insert(0, "title = \"../../x <b>\"\n"));
        var folder = Path.Combine(line.Folder, "pictures");
        Assert.Equal(0, await line.Run("batch", hostile, line.File("shelf.csv", Shelf(9, faulty: -1)), "--no-suspects", "--plots", folder));
        string[] names = [.. Directory.EnumerateFiles(folder).Select(f => Path.GetFileName(f)!)];
        Assert.Contains("estimates.png", names);
        Assert.Contains("Q1-gain-histogram.png", names);
        Assert.Contains("Q1-gain-trend.png", names);
        Assert.All(names, n => Assert.Matches("^[A-Za-z0-9_-]+[.]png$", n));
        Assert.Equal(0x89, File.ReadAllBytes(Path.Combine(folder, "estimates.png"))[0]);
        Assert.Equal(2, await line.Run("batch", hostile, line.File("shelf.csv", Shelf(9, faulty: -1)), "--no-suspects", "--plots", Path.Combine(folder, "estimates.png")));
    }

    [Fact]
    public async Task A_bad_row_costs_only_itself_and_is_named()
    {
        var shelf = line.File("shelf.csv", Shelf(4, faulty: -1).Replace("S002,11.94", "S002,twelve", StringComparison.Ordinal));
        Assert.Equal(1, await line.Run("batch", board, shelf));
        Assert.Contains("shelf.csv:4", line.Error, StringComparison.Ordinal);
        Assert.Contains("twelve", line.Error, StringComparison.Ordinal);
        Assert.Matches(@"3\s+100\.0 %\s+agree", line.Output);
    }

    [Fact]
    public async Task A_folder_of_files_is_read_in_the_order_of_their_names_and_a_file_that_is_no_use_is_named()
    {
        var folder = Directory.CreateDirectory(Path.Combine(line.Folder, "readings")).FullName;
        File.WriteAllText(Path.Combine(folder, "b-12.csv"), WorkshopFiles.Healthy);
        File.WriteAllText(Path.Combine(folder, "a-11.csv"), WorkshopFiles.Faulty);
        File.WriteAllText(Path.Combine(folder, "c-13.csv"), "what,ever\n1,2\n");
        var target = Path.Combine(line.Folder, "results.jsonl");
        Assert.Equal(1, await line.Run("batch", board, folder, "--out", target));
        Assert.Equal(["a-11", "b-12"], File.ReadAllLines(target).Select(l => JsonDocument.Parse(l).RootElement.GetProperty("serial").GetString()));
        Assert.Contains("c-13.csv", line.Error, StringComparison.Ordinal);
    }

    [Fact]
    public async Task A_serial_that_a_spreadsheet_would_run_is_defused()
    {
        var shelf = line.File("shelf.csv", Shelf(3, faulty: -1).Replace("S001", "=HYPERLINK(1)", StringComparison.Ordinal));
        var target = Path.Combine(line.Folder, "results.csv");
        Assert.Equal(0, await line.Run("batch", board, shelf, "--out", target));
        Assert.StartsWith("'=HYPERLINK(1)", File.ReadAllLines(target)[2], StringComparison.Ordinal);
        Assert.Equal(0, await line.Run("batch", board, shelf, "--out", target, "--resume"));
    }

    public void Dispose() => line.Dispose();

    /// <summary>Boards that differ a little, as parts do; the one at <paramref name="faulty"/> has R4 a decade too high.</summary>
    private static string Shelf(int count, int faulty)
    {
        var text = new StringBuilder("serial,VCC,B1,C1,E1,OUT\n");
        for (var i = 0; i < count; i++)
        {
            var shift = 0.01 * ((i * 7 % 11) - 5) / 5;
            text.Append(CultureInfo.InvariantCulture, $"S{i:000},");
            text.Append(i == faulty ? "12.16,2.081,11.16,1.467,8.60\n" : string.Create(CultureInfo.InvariantCulture, $"11.94,{2.139 + shift:0.000},{5.306 - 4 * shift:0.000},{1.484 + shift:0.000},{4.131 - 3 * shift:0.000}\n"));
        }

        return text.ToString();
    }
}
