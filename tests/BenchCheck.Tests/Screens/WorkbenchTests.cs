using BenchCheck.Core.Metering;
using BenchCheck.Files;
using BenchCheck.Screens;
using Xunit;

namespace BenchCheck.Tests.Screens;

/// <summary>What the screen does with files, without any drawing.</summary>
public sealed class WorkbenchTests : IDisposable
{
    private readonly WorkFolder folder = new();

    public void Dispose() => folder.Dispose();

    [Fact]
    public void An_entry_is_on_disk_before_the_session_shows_it()
    {
        using var bench = Open();
        Assert.Null(bench.Enter((s, t) => s.Type("11.5", false, t)));
        var left = ReadingsJournal.Read(bench.ReadingsPath, bench.Session.Bench)!;
        Assert.Equal(11.5, left.Sets[0].Readings[0].Value);
        Assert.True(bench.Session.IsDirty);
    }

    [Fact]
    public void What_a_crash_left_is_offered_and_taken_back()
    {
        using (var bench = Open()) bench.Enter((s, t) => s.Type("11.5", false, t));
        using (var bench = Open())
        {
            Assert.NotNull(bench.Left);
            Assert.Equal(12.16, bench.Session.Readings.Readings[0].Value);
            Assert.Null(bench.TakeLeft());
            Assert.Equal(11.5, bench.Session.Readings.Readings[0].Value);
        }

        using var again = Open();
        Assert.NotNull(again.Left);
    }

    [Fact]
    public void An_entry_that_cannot_be_written_is_not_shown()
    {
        Directory.CreateDirectory(folder.In("mist-valve.csv.journal"));
        using var bench = Open();
        Assert.Contains("Not entered", bench.Enter((s, t) => s.Type("11.5", false, t)));
        Assert.Equal(12.16, bench.Session.Readings.Readings[0].Value);
    }

    [Fact]
    public void A_second_screen_looks_but_does_not_enter()
    {
        using var first = Open();
        using var second = Open();
        Assert.Contains("Another screen", second.Enter((s, t) => s.Type("11.5", false, t)));
        Assert.False(second.Session.IsDirty);
    }

    [Fact]
    public void Both_screens_on_one_file_know_of_each_other_and_the_second_takes_over_when_the_first_is_closed()
    {
        var first = Open();
        Assert.False(first.HasOnlooker);
        using (var second = Open())
        {
            Assert.False(second.IsOurs);
            Assert.True(first.HasOnlooker);
            Assert.False(second.MayOpenAnew);
            first.Enter((s, t) => s.Type("11.5", false, t));
            first.Save();
            Assert.True(second.MayOpenAnew);
        }

        Assert.False(first.HasOnlooker);
        using var third = Open();
        first.Dispose();
        Assert.True(third.MayOpenAnew);
        using var fourth = Open();
        Assert.True(fourth.IsOurs);
    }

    [Fact]
    public void A_board_file_changed_in_an_editor_is_taken_over_at_once_and_a_broken_one_is_not()
    {
        using var bench = Open();
        var text = File.ReadAllText(bench.BoardPath);
        File.WriteAllText(bench.BoardPath, text.Replace("470 5%", "4k7 5%", StringComparison.Ordinal));
        Assert.Contains("taken over", bench.FollowBoard());
        Assert.Equal("4k7 5%", bench.Session.Board.Part("R4")!.Value("value"));
        Assert.False(bench.Session.IsDirty);
        File.WriteAllText(bench.BoardPath, text.Replace("470 5%", "oops", StringComparison.Ordinal));
        Assert.Contains("stays as it was", bench.FollowBoard());
        Assert.Null(bench.FollowBoard());
        Assert.Equal("4k7 5%", bench.Session.Board.Part("R4")!.Value("value"));
        Assert.Equal(SaveOutcome.Saved, bench.Save().Outcome);
        Assert.Contains("oops", File.ReadAllText(bench.BoardPath));
    }

    [Fact]
    public void A_file_changed_meanwhile_is_brought_together_with_what_was_typed()
    {
        using var bench = Open();
        bench.Enter((s, t) => s.Type("11.5", false, t));
        File.WriteAllText(folder.In("mist-valve.csv"), File.ReadAllText(folder.In("mist-valve.csv")).Replace("2.081", "2.099", StringComparison.Ordinal));
        Assert.Equal((SaveOutcome.ChangedOnDisk, false), bench.Save());
        bench.Reconcile();
        Assert.Equal(SaveOutcome.Saved, bench.Save().Outcome);
        Assert.Equal([11.5, 2.099], ReadingsFile.Read(bench.ReadingsPath, bench.Session.Bench).Sets.Single().Readings.Take(2).Select(r => r.Value));
    }

    [Fact]
    public void Saving_under_another_name_goes_on_there()
    {
        using var bench = Open();
        bench.Enter((s, t) => s.Type("11.5", false, t));
        Assert.NotNull(bench.SaveAs(folder.In("fan-stage.csv")));
        Assert.Null(bench.SaveAs(folder.In("other.csv")));
        Assert.Equal(folder.In("other.csv"), bench.ReadingsPath);
        Assert.False(bench.Session.IsDirty);
        Assert.False(File.Exists(folder.In("mist-valve.csv.journal")));
    }

    [Fact]
    public void A_board_file_with_errors_is_refused_with_all_of_them()
    {
        File.WriteAllText(folder.In("mist-valve.toml"), "[parts]\nR1 = { kind = \"resistro\", value = \"1k\", pins = [\"A\", \"B\"] }\nR2 = { kind = \"resistor\", value = \"many\", pins = [\"A\", \"B\"] }\n");
        var opening = Workbench.Open(folder.In("mist-valve.toml"), null, false, TimeProvider.System);
        Assert.Null(opening.Workbench);
        Assert.True(opening.Problems.Count(p => p.IsError) >= 2);
        Assert.False(opening.CanSkipRows);
    }

    [Fact]
    public void Rows_that_cannot_be_used_are_named_before_anything_is_taken()
    {
        File.AppendAllText(folder.In("mist-valve.csv"), "NOWHERE,3 V\n");
        var opening = Workbench.Open(folder.In("mist-valve.toml"), null, false, TimeProvider.System);
        Assert.True(opening.CanSkipRows);
        Assert.Contains(opening.Problems, p => p.Line == 7 && p.Read.Contains("NOWHERE", StringComparison.Ordinal));
        using var bench = Workbench.Open(folder.In("mist-valve.toml"), null, true, TimeProvider.System).Workbench!;
        Assert.Equal(5, bench.Session.Readings.Readings.Length);
    }

    [Fact]
    public void A_reading_keeps_its_row_when_its_value_changes_and_the_guided_place_is_a_row()
    {
        using var bench = Open();
        bench.Look(s => s.MoveTo(new Place("powered", ReadingQuantity.Voltage, "E1", "GND")));
        bench.Enter((s, t) => s.Type("1.5", false, t));
        Assert.Equal(["VCC", "B1", "C1", "E1", "OUT"], bench.Session.Rows.Select(r => r.Place.At));
        Assert.Equal(1.5, bench.Session.Row!.Reading!.Value);
    }

    private Workbench Open() => Workbench.Open(folder.In("mist-valve.toml"), null, false, TimeProvider.System).Workbench!;
}
