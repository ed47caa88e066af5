using BenchCheck.Screens;
using Terminal.Gui.Input;
using Xunit;

namespace BenchCheck.Tests.Screens;

/// <summary>The bench screen as a user sees it: keys in, drawn text out.</summary>
[Collection("screen")]
public sealed class BenchScreenTests : IDisposable
{
    private readonly WorkFolder folder = new();

    public void Dispose() => folder.Dispose();

    [Fact]
    public void Readings_stand_beside_prediction_band_En_and_a_verdict_in_words()
    {
        using var screen = new ScreenUnderTest(folder.Path);
        var drawn = screen.Await("R4 of another value");
        Assert.Matches(@"C1 +11\.16 V +6\.7\d\d V +5\.\d+\.\.7\.\d+ V +\+4\.\d+ V +\+\d\.\d OUT !", drawn);
        Assert.Contains("DISAGREES !", drawn);
        Assert.Contains("Next reading", drawn);
    }

    [Fact]
    public void A_typed_value_changes_the_verdict_and_moves_to_the_next_row()
    {
        using var screen = new ScreenUnderTest(folder.Path, "fan-stage.toml");
        screen.Await("AGREES");
        screen.Press(Key.CursorDown, Key.CursorDown).Type("11,2").Press(Key.Enter);
        var drawn = screen.Await("DISAGREES !");
        Assert.Contains("C1 = 11.20 V", drawn);
        Assert.Contains("> E1", drawn);
    }

    [Theory]
    [InlineData("652m", "652.0 mV")]
    [InlineData("6.42", "6.420 V")]
    [InlineData("6,42", "6.420 V")]
    [InlineData("12 V", "12.00 V")]
    public void Values_are_understood_as_the_bench_writes_them(string typed, string shown)
    {
        using var screen = new ScreenUnderTest(folder.Path);
        screen.AwaitCheck();
        screen.Type(typed).Press(Key.Enter);
        Assert.Contains($"VCC = {shown}", screen.Text);
    }

    [Fact]
    public void A_value_that_is_none_is_refused_with_what_was_read_and_stays_in_the_field()
    {
        using var screen = new ScreenUnderTest(folder.Path);
        screen.AwaitCheck();
        screen.Type("6.4.2x").Press(Key.Enter);
        Assert.Contains("\"6.4.2x\"", screen.Text);
        Assert.False(screen.Screen.Workbench!.Session.IsDirty);
        Assert.Contains("VCC, powered: 6.4.2x", screen.Text);
    }

    [Fact]
    public void Undo_and_redo_and_delete_work_and_say_so()
    {
        using var screen = new ScreenUnderTest(folder.Path);
        screen.AwaitCheck();
        screen.Type("11").Press(Key.Enter);
        Assert.Contains("11.00 V", screen.Text);
        screen.Press(Key.U.WithCtrl);
        Assert.DoesNotContain("11.00 V", screen.AwaitCheck());
        screen.Press(Key.Y.WithCtrl);
        Assert.Contains("11.00 V", screen.AwaitCheck());
        screen.Press(Key.CursorUp, Key.Delete);
        Assert.Matches(@"> VCC +- ", screen.AwaitCheck());
    }

    [Fact]
    public void A_repeat_is_averaged_with_the_reading()
    {
        using var screen = new ScreenUnderTest(folder.Path);
        screen.AwaitCheck();
        screen.Type("12.20").Press(Key.R.WithCtrl);
        Assert.Contains("VCC = 12.18 V, mean of 2", screen.Text);
    }

    [Fact]
    public void Guided_order_moves_to_the_most_telling_reading()
    {
        File.Delete(folder.In("mist-valve.csv"));
        using var screen = new ScreenUnderTest(folder.Path);
        screen.AwaitCheck();
        screen.Press(Key.G.WithCtrl);
        screen.AwaitCheck();
        Assert.NotEmpty(screen.Screen.Workbench!.Session.Result!.Next);
        screen.Type("9.6").Press(Key.Enter);
        screen.Await("Next: ");
        var session = screen.Screen.Workbench!.Session;
        Assert.Equal(session.Suggested, session.Cursor);
    }

    [Fact]
    public void Tab_shows_what_moves_the_reading_and_what_each_suspect_makes_of_it()
    {
        using var screen = new ScreenUnderTest(folder.Path);
        screen.AwaitCheck();
        screen.Press(Key.CursorDown, Key.CursorDown, Key.Tab);
        var drawn = screen.Text;
        Assert.Contains("Moved by", drawn);
        Assert.Contains("If it is", drawn);
        Assert.Contains("R4 of another value", drawn);
    }

    [Fact]
    public void Choosing_a_suspect_shows_the_readings_as_it_explains_them()
    {
        using var screen = new ScreenUnderTest(folder.Path);
        screen.AwaitCheck();
        screen.Press(Key.F7);
        var drawn = screen.Text;
        Assert.Contains("this suspect says", drawn);
        Assert.Matches(@"C1 +11\.16 V +6\.7\d\d V +1[01]\.\d+ V ", drawn);
    }

    [Fact]
    public void The_parts_view_tells_estimate_interval_and_how_far_it_is_found()
    {
        using var screen = new ScreenUnderTest(folder.Path, height: 40);
        screen.AwaitCheck();
        screen.Press(Key.F3);
        Assert.Matches(@"R4 +resistance +446\.\.494 Ω .*(yes|partly|no)", screen.Text);
    }

    [Fact]
    public void The_plot_marks_each_verdict_by_its_own_sign()
    {
        using var screen = new ScreenUnderTest(folder.Path, width: 120, height: 40);
        screen.AwaitCheck();
        screen.Press(Key.F4);
        var drawn = screen.Text;
        Assert.Matches(@"C1 +.*X>", drawn);
        Assert.Matches(@"B1 +.*o", drawn);
    }

    [Fact]
    public void Help_lists_every_key_that_does_something()
    {
        using var screen = new ScreenUnderTest(folder.Path, height: 60);
        screen.Press(Key.F1);
        var drawn = screen.Text;
        foreach (var key in (string[])["F1", "F2", "F3", "F4", "F5", "F6", "F7", "F8", "F9", "Ctrl+U", "Ctrl+Z", "Ctrl+Y", "Ctrl+R", "Ctrl+N", "Ctrl+D", "Del", "Ctrl+G", "Ctrl+O", "Ctrl+F", "Ctrl+S", "Ctrl+W", "Ctrl+P", "Ctrl+Q"])
            Assert.Contains($"\n{key}", drawn);
    }

    [Fact]
    public void A_newcomer_reaches_a_checked_sample_within_three_keys_past_the_cautions()
    {
        using var screen = new ScreenUnderTest(folder.Path, board: null, isFirstStart: true);
        Assert.Contains("Measure resistance only with the supplies removed", screen.Text);
        screen.Press(Key.Enter);
        Assert.Contains("sample board with readings", screen.Text);
        screen.Press(Key.Enter);
        screen.AwaitCheck();
        Assert.NotEmpty(screen.Screen.Workbench!.Session.Result!.Readings);
    }

    [Fact]
    public void Menus_open_by_F9_and_name_their_keys()
    {
        using var screen = new ScreenUnderTest(folder.Path);
        screen.AwaitCheck();
        screen.Press(Key.F9);
        var drawn = screen.Text;
        Assert.Contains("Save", drawn);
        Assert.Contains("Ctrl+S", drawn);
        screen.Press(Key.CursorRight);
        Assert.Contains("Guided order", screen.Text);
        screen.Press(Key.CursorDown, Key.Enter);
        Assert.Contains("Add a reading", screen.Text);
        screen.Press(Key.Esc, Key.CursorDown);
        Assert.Contains("> B1", screen.Text);
    }

    [Fact]
    public void On_the_smallest_screen_the_verdict_is_still_there()
    {
        using var screen = new ScreenUnderTest(folder.Path, width: 60, height: 16);
        screen.AwaitCheck();
        screen.Press(Key.CursorDown, Key.CursorDown);
        Assert.Matches(@"> C1 +11\.16 V +6\.7\d\d V +\+5\.\d OUT !", screen.Text);
        Assert.Contains("^Q quit", screen.Text);
    }

    [Fact]
    public void What_can_be_read_of_small_signals_is_listed_with_its_prediction()
    {
        File.WriteAllText(folder.In("amplifier.toml"), """
            [parts]
            V1 = { kind = "supply",    value = "12 V 1%", pins = { plus = "VCC", minus = "GND" } }
            C1 = { kind = "capacitor", value = "10 uF",   pins = ["IN", "B1"] }
            R1 = { kind = "resistor",  value = "470k 5%", pins = ["VCC", "B1"] }
            R2 = { kind = "resistor",  value = "3k3 5%",  pins = ["VCC", "C1"] }
            Q1 = { kind = "npn", gain = "100..300", pins = { collector = "C1", base = "B1", emitter = "GND" } }
            [conditions.signal]
            kind = "small-signal"
            operating_point = "powered"
            frequency = "1 kHz"
            drive = { at = "IN", value = "5 mV", resistance = "600" }
            [conditions.powered]

            """);
        using var screen = new ScreenUnderTest(folder.Path, "amplifier.toml");
        Assert.Matches(@"C1/IN +- +-1\d\d\.\d", screen.Await(s => s.Contains("C1/IN ", StringComparison.Ordinal), "the gain"));
    }

    [Fact]
    public void Flagged_readings_of_other_conditions_are_told_where_they_are_not_shown()
    {
        using var screen = new ScreenUnderTest(folder.Path, "frost-guard.toml");
        Assert.Contains("4 flagged in frost (F5)", screen.AwaitCheck());
    }

    [Theory]
    [InlineData(80, 24)]
    [InlineData(120, 40)]
    [InlineData(200, 60)]
    public void Every_view_keeps_within_its_screen(int width, int height)
    {
        using var screen = new ScreenUnderTest(folder.Path, "vent-motor.toml", width, height);
        screen.AwaitCheck();
        foreach (var key in (Key[])[Key.F2, Key.F3, Key.F4, Key.F1, Key.Esc, Key.F8, Key.Esc])
        {
            screen.Press(key);
            var lines = screen.Text.TrimEnd('\n').Split('\n');
            Assert.Equal(height, lines.Length);
            Assert.Contains("Board", lines[0]);
            Assert.Matches("F1 help|Esc back", lines[^1]);
        }
    }

    [Fact]
    public void Without_colour_no_colour_is_sent_and_the_words_still_tell()
    {
        using var screen = new ScreenUnderTest(folder.Path, hasColour: false);
        screen.AwaitCheck();
        screen.Press(Key.F9);
        Assert.DoesNotMatch("\u001b\\[[0-9;]*(3[0-7]|9[0-7]|38;|4[0-7]m|48;)", screen.Ansi);
        screen.Press(Key.Esc);
        Assert.Contains("OUT !", screen.Text);
    }

    [Fact]
    public void Hostile_names_and_notes_steer_no_terminal()
    {
        var board = File.ReadAllText(folder.In("mist-valve.toml")).Replace("Mist-valve driver\"", "Mist\\u001b]0;owned\\u0007\\u202e valve\"", StringComparison.Ordinal);
        File.WriteAllText(folder.In("mist-valve.toml"), board);
        File.WriteAllText(folder.In("mist-valve.csv"), "at,value,note\nVCC,12.1,\"\u001b[2J\u001b]52;c;aGk=\u0007\"\n");
        using var screen = new ScreenUnderTest(folder.Path, width: 160);
        screen.AwaitCheck();
        var drawn = screen.Text;
        Assert.DoesNotContain('\u001b', drawn);
        Assert.DoesNotContain('\u202e', drawn);
        Assert.Contains("Mist·]0;owned··", drawn);
    }

    [Fact]
    public void An_import_shows_what_it_would_take_and_why_rows_are_bad_before_anything_is_taken()
    {
        File.WriteAllText(folder.In("other.csv"), "at,value\nVCC,12.5 V\nNOWHERE,3 V\n");
        using var screen = new ScreenUnderTest(folder.Path, width: 120, height: 40);
        screen.AwaitCheck();
        screen.Press(Key.T.WithCtrl).Type("other.csv").Press(Key.Enter);
        var drawn = screen.Text;
        Assert.Contains("1 readings understood, 1 rows or columns not", drawn);
        Assert.Contains("NOWHERE", drawn);
        Assert.Contains("in place of 12.16 V", drawn);
        Assert.False(screen.Screen.Workbench!.Session.IsDirty);
        screen.Type("2");
        Assert.Contains("12.50 V", screen.AwaitCheck());
        screen.Press(Key.U.WithCtrl);
        Assert.Contains("12.16 V", screen.AwaitCheck());
    }

    [Fact]
    public void Columns_that_are_not_recognised_are_named_by_hand_before_anything_is_taken()
    {
        File.WriteAllText(folder.In("other.csv"), "Messpunkt;Anzeige (mV);Bemerkung\nVCC;12500;warm\nE1;1480,5;\n");
        using var screen = new ScreenUnderTest(folder.Path, width: 120, height: 40);
        screen.AwaitCheck();
        screen.Press(Key.T.WithCtrl).Type("other.csv").Press(Key.Enter);
        var drawn = screen.Text;
        Assert.Contains("What are the columns of other.csv?", drawn);
        Assert.Matches(@"> Messpunkt +at +VCC   E1", drawn);
        Assert.Matches(@"  Anzeige \(mV\) +value +12500", drawn);
        Assert.Matches(@"  Bemerkung +not read +warm", drawn);
        screen.Press(Key.CursorDown, Key.CursorDown, Key.CursorLeft);
        while (!System.Text.RegularExpressions.Regex.IsMatch(screen.Text, @"> Bemerkung +note ")) screen.Press(Key.CursorLeft);
        screen.Press(Key.Enter);
        Assert.Contains("2 readings understood, 0 rows or columns not", screen.Text);
        Assert.False(screen.Screen.Workbench!.Session.IsDirty);
        screen.Type("2");
        screen.AwaitCheck();
        var readings = screen.Screen.Workbench!.Session.Readings.Readings;
        Assert.Contains(readings, r => r is { At: "VCC", Value: 12.5, Note: "warm" });
        Assert.Contains(readings, r => r is { At: "E1", Value: 1.4805 });
    }

    [Fact]
    public void A_table_without_a_header_is_taken_when_the_user_says_so()
    {
        File.WriteAllText(folder.In("other.csv"), "VCC,12.5\nE1,1.48\n");
        using var screen = new ScreenUnderTest(folder.Path, width: 120, height: 40);
        screen.AwaitCheck();
        screen.Press(Key.T.WithCtrl).Type("other.csv").Press(Key.Enter);
        Assert.Contains("The first row is a reading like the others", screen.Text);
        screen.Press(Key.Enter);
        Assert.Contains("2 readings understood", screen.Text);
    }

    [Theory]
    [InlineData(".png", "PNG")]
    [InlineData(".svg", "</svg>")]
    [InlineData(".html", "R4 of another value")]
    [InlineData(".csv", "serial,line,condition,quantity,at,")]
    [InlineData(".json", "\"verdict\": \"disagrees\"")]
    public void The_check_is_exported_by_the_ending_of_the_name_and_never_over_a_file(string ending, string holds)
    {
        using var screen = new ScreenUnderTest(folder.Path, width: 200);
        screen.AwaitCheck();
        Export();
        screen.Await($"Written to {folder.In("mist-valve-check" + ending)}");
        Assert.Contains(holds, File.ReadAllText(folder.In("mist-valve-check" + ending)));
        Export();
        Assert.Contains("there is a file of that name already", screen.Text);

        void Export()
        {
            screen.Press(Key.E.WithCtrl);
            for (var i = 0; i < 4; i++) screen.Press(Key.Backspace);
            screen.Type(ending).Press(Key.Enter);
        }
    }

    [Fact]
    public void A_check_is_filed_in_the_bench_log_under_its_serial_and_looked_at_again()
    {
        using var screen = new ScreenUnderTest(folder.Path, height: 60);
        screen.AwaitCheck();
        screen.Press(Key.K.WithCtrl).Type("0041").Press(Key.Enter);
        screen.AwaitCheck();
        screen.Press(Key.L.WithCtrl);
        screen.Await("Nothing is on record of \"Mist-valve driver\" yet");
        screen.Press(Key.Enter);
        screen.Await("Filed as record 1.");
        screen.Press(Key.L.WithCtrl);
        screen.Await("record 1");
        screen.Press(Key.CursorDown, Key.Enter);
        var drawn = screen.Await("Record 1");
        Assert.Contains("Mist-valve driver, serial 0041", drawn);
        Assert.Matches(@"powered +C1 +11\.16 V +6\.7\d\d V +\+5\.\d out", drawn);
        Assert.Contains("R4 of another value", drawn);
        screen.Press(Key.Esc);
        screen.Await("File this check");
    }

    [Fact]
    public void The_board_on_the_bench_can_be_opened_again()
    {
        using var screen = new ScreenUnderTest(folder.Path);
        screen.AwaitCheck();
        screen.Press(Key.P.WithCtrl, Key.Enter);
        Assert.DoesNotContain("look only", screen.AwaitCheck());
        Assert.True(screen.Screen.Workbench!.IsOurs);
    }

    [Fact]
    public void A_new_board_is_written_and_opens_checked()
    {
        using var screen = new ScreenUnderTest(folder.Path, board: null, height: 60);
        while (!screen.Text.Contains("> ", StringComparison.Ordinal) || !screen.Text.Split('\n').Any(l => l.StartsWith('>') && l.Contains("New board"))) screen.Press(Key.CursorDown);
        screen.Press(Key.Enter).Type(folder.In("heater")).Press(Key.Tab).Type("Heater \"two\"").Press(Key.Enter);
        Assert.Contains("Heater \"two\"", screen.AwaitCheck());
        Assert.True(File.Exists(folder.In("heater.toml")));
    }

    [Fact]
    public void A_suggested_reading_between_two_nodes_has_a_row_to_type_into()
    {
        using var screen = new ScreenUnderTest(folder.Path);
        screen.AwaitCheck();
        var next = screen.Screen.Workbench!.Session.Suggested!;
        screen.Press(Key.G.WithCtrl);
        Assert.Contains($"{next.Name(screen.Screen.Workbench.Session.Bench.Board)}, {next.Condition}:", screen.Text);
        screen.Type("1k77").Press(Key.Enter);
        Assert.Equal(1770, screen.Screen.Workbench.Session.Readings.Readings[^1].Value);
    }
}
