using BenchCheck.Files;
using BenchCheck.Screens;
using Terminal.Gui.Input;
using Xunit;

namespace BenchCheck.Tests.Screens;

/// <summary>Parts and connections changed at the bench: checked at once, undone, saved without touching what was not changed.</summary>
[Collection("screen")]
public sealed class PartEditingTests : IDisposable
{
    private readonly WorkFolder folder = new();

    public void Dispose() => folder.Dispose();

    [Fact]
    public void A_part_corrected_in_the_form_is_checked_at_once_and_saved_with_every_comment_kept()
    {
        var before = File.ReadAllText(folder.In("mist-valve.toml"));
        using var screen = new ScreenUnderTest(folder.Path);
        screen.Await("DISAGREES !");
        screen.Press(Key.F3, Key.CursorDown, Key.CursorDown, Key.CursorDown, Key.CursorDown, Key.Enter);
        Assert.Contains("Edit R4, resistor", screen.Text);
        screen.Press(Key.Tab, Key.Tab, Key.Tab);
        for (var i = 0; i < 6; i++) screen.Press(Key.Backspace);
        screen.Type("4k99 1%").Press(Key.Enter);
        screen.Await("AGREES  ");
        Assert.Equal(before, File.ReadAllText(folder.In("mist-valve.toml")));
        screen.Press(Key.S.WithCtrl);
        Assert.Contains("mist-valve.toml", screen.Text);
        Assert.Equal(before.Replace("\"470 5%\"", "\"4k99 1%\"", StringComparison.Ordinal), File.ReadAllText(folder.In("mist-valve.toml")));
        Assert.False(File.Exists(folder.In("mist-valve.csv.bak")), "readings that were not changed are not written");
        screen.Press(Key.U.WithCtrl);
        screen.Await("DISAGREES !");
        Assert.Contains("not yet saved", screen.Text);
    }

    [Fact]
    public void A_part_is_added_by_its_kind_and_removed_and_brought_back()
    {
        using var screen = new ScreenUnderTest(folder.Path);
        screen.AwaitCheck();
        screen.Press(Key.F3, Key.F6);
        Assert.Contains("Which kind of part", screen.Text);
        screen.Press(Key.Enter);
        Assert.Contains("R7", screen.Text);
        screen.Press(Key.Tab).Type("VCC").Press(Key.Tab).Type("GND").Press(Key.Tab).Type("1M").Press(Key.Enter);
        Assert.Contains("> R7", screen.AwaitCheck());
        screen.Press(Key.Delete);
        Assert.DoesNotContain("> R7", screen.AwaitCheck());
        screen.Press(Key.U.WithCtrl);
        screen.AwaitCheck();
        Assert.NotNull(screen.Screen.Workbench!.Session.Bench.Board.Find("R7"));
    }

    [Fact]
    public void A_change_that_makes_no_board_is_refused_in_the_form_with_the_reason()
    {
        using var screen = new ScreenUnderTest(folder.Path);
        screen.AwaitCheck();
        screen.Press(Key.F3, Key.CursorDown, Key.Enter, Key.Tab, Key.Tab, Key.Tab).Type(" oops").Press(Key.Enter);
        Assert.Contains("! ", screen.Text);
        Assert.Contains("oops", screen.Text);
        Assert.Contains("Edit R1", screen.Text);
        screen.Press(Key.Esc);
        Assert.False(screen.Screen.Workbench!.Session.IsDirty);
    }

    [Fact]
    public void A_change_that_would_leave_readings_without_a_place_is_refused()
    {
        using var bench = Open();
        var refused = bench.EnterBoard(t =>
        {
            var one = t.Changed("R5", t.Part("R5")! with { Nodes = ["C1", "EXIT"] }).Value;
            return one.Changed("R6", one.Part("R6")! with { Nodes = ["EXIT", "GND"] });
        });
        Assert.Contains("OUT would have no place", refused);
        Assert.False(bench.Session.IsDirty);
    }

    [Fact]
    public void A_changed_board_is_offered_again_after_a_crash_with_the_readings_taken_on_it()
    {
        using (var bench = Open())
        {
            Assert.Null(bench.EnterBoard(t => t.Added(new PartText("R9", "resistor", ["OUT", "TEST"], bench.Session.Board.Part("R6")!.Values))));
            Assert.Null(bench.EnterBoard(t => t.Added(new PartText("R10", "resistor", ["TEST", "GND"], bench.Session.Board.Part("R6")!.Values))));
            bench.Look(s => s.MoveTo(s.Rows.First(r => r.Place.At == "TEST").Place));
            Assert.Null(bench.Enter((s, t) => s.Type("2.5", false, t)));
        }

        using (var bench = Open())
        {
            Assert.Null(bench.Session.Bench.Board.Find("R9"));
            Assert.Null(bench.TakeLeft());
            Assert.NotNull(bench.Session.Bench.Board.Find("R10"));
            Assert.Contains(bench.Session.Readings.Readings, r => r.At == "TEST" && r.Value == 2.5);
            Assert.Equal(SaveOutcome.Saved, bench.Save().Outcome);
        }

        using var again = Open();
        Assert.Null(again.Left);
        Assert.Contains(again.Session.Readings.Readings, r => r.At == "TEST");
    }

    [Fact]
    public void A_board_file_changed_by_another_program_is_never_overwritten()
    {
        using var bench = Open();
        Assert.Null(bench.EnterBoard(t => t.Removed("C1")));
        var theirs = File.ReadAllText(folder.In("mist-valve.toml")).Replace("470 5%", "560 5%", StringComparison.Ordinal);
        File.WriteAllText(folder.In("mist-valve.toml"), theirs);
        Assert.Equal((SaveOutcome.ChangedOnDisk, true), bench.Save());
        Assert.Equal(theirs, File.ReadAllText(folder.In("mist-valve.toml")));
        Assert.Null(bench.WriteBoardCopy(folder.In("mine.toml")));
        Assert.Null(bench.RereadBoard());
        Assert.NotNull(bench.Session.Bench.Board.Find("C1"));
        Assert.False(bench.Session.IsBoardDirty);
        Assert.DoesNotContain("C1 =", File.ReadAllText(folder.In("mine.toml")), StringComparison.Ordinal);
    }

    [Fact]
    public void A_second_screen_may_not_change_the_same_board()
    {
        using var first = Open();
        using var second = Workbench.Open(folder.In("mist-valve.toml"), folder.In("other.csv"), false, TimeProvider.System).Workbench!;
        Assert.Null(first.EnterBoard(t => t.Removed("C1")));
        Assert.Contains("another screen is changing this board", second.EnterBoard(t => t.Removed("C1")));
    }

    private Workbench Open() => Workbench.Open(folder.In("mist-valve.toml"), null, false, TimeProvider.System).Workbench!;
}
