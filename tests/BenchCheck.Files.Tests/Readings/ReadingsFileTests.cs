using System.Text;
using BenchCheck.Core.Metering;
using CsCheck;
using Xunit;

namespace BenchCheck.Files.Tests.Readings;

public class ReadingsFileTests
{
    [Fact]
    public void The_long_form_needs_only_place_and_value()
    {
        var readings = Samples.Only("at,value\nC1,5.212\nB1,1.028\nE1,-0\n");
        Assert.Equal([("C1", "GND", 5.212), ("B1", "GND", 1.028), ("E1", "GND", 0.0)], readings.Select(r => (r.At, r.Against!, r.Value)));
        Assert.All(readings, r => Assert.Equal(("powered", ReadingQuantity.Voltage, null), (r.Condition, r.Quantity, r.Meter)));
        Assert.Equal([2], readings[0].Lines);
    }

    [Fact]
    public void Every_column_of_the_long_form_is_read_in_any_order_and_capitals()
    {
        var reading = Assert.Single(Samples.Only(
            "Note,TIME,Uncertainty,range,Meter,unit,VALUE,against,At,Quantity,condition,serial\n" +
            "warm,2026-03-14T09:26:00+01:00,5,6000,bench,mV,652,E1,B1,Voltage,powered,A17\n"));
        Assert.Equal(("B1", "E1", "bench", "warm"), (reading.At, reading.Against!, reading.Meter!, reading.Note!));
        Assert.Equal((0.652, 6.0, 0.005), (reading.Value, reading.Range!.Value, reading.StatedUncertainty!.Value));
        Assert.Equal(new DateTimeOffset(2026, 3, 14, 9, 26, 0, TimeSpan.FromHours(1)), reading.Time);
    }

    [Theory]
    [InlineData("node,volts\nC1,5.212\n")]
    [InlineData("at;value\nC1;5,212\n")]
    [InlineData("at\tvalue\nC1\t5,212 V\n")]
    [InlineData("at,value\nC1,\"5,212\"\n")]
    [InlineData("sep=;\nat;value\nC1;5,212\n")]
    [InlineData("at,value [mV]\nC1,5212\n")]
    [InlineData("at,value [mV]\nC1,5.212 V\n")]
    [InlineData("node,volts [mV]\nC1,5212\n")]
    [InlineData("at,value,unit\nC1,5212,mV\n")]
    [InlineData("at,value,unit\nC1,5212 mV,V\n")]
    [InlineData("\uFEFFat,value\r\n# taken before lunch\r\n\r\n , \r\nC1,5.212\r\n")]
    [InlineData("serial,C1\n,5.212\n")]
    [InlineData("C1 [mV]\n5212\n")]
    [InlineData("at,value\nc1,5V212\n")]
    public void Delimiters_decimal_commas_units_comments_and_codes_are_recognised(string text)
    {
        var reading = Assert.Single(Samples.Only(text));
        Assert.Equal(("C1", "GND"), (reading.At, reading.Against));
        Assert.Equal(5.212, reading.Value, 1e-12);
    }

    [Fact]
    public void Currents_are_read_at_parts_and_pins_and_resistances_without_supplies()
    {
        var readings = Samples.Only("""
            condition,quantity,at,value,unit
            ,current,R3,2.5,mA
            ,,Q1.base,12 uA,A
            unpowered,resistance,B1,4k7,
            unpowered,resistance,E1,R47,
            unpowered,,C1,2.2,kΩ
            """);
        Assert.Equal([("R3", 2.5e-3), ("Q1.base", 12e-6), ("B1", 4700), ("E1", 0.47), ("C1", 2200)], readings.Select(r => (r.At, r.Value)));
        Assert.Equal([ReadingQuantity.Current, ReadingQuantity.Current, ReadingQuantity.Resistance, ReadingQuantity.Resistance, ReadingQuantity.Resistance], readings.Select(r => r.Quantity));
        Assert.Null(readings[0].Against);
        Assert.Equal("GND", readings[2].Against);
    }

    [Fact]
    public void The_wide_form_is_a_board_a_row_with_nodes_node_pairs_and_currents_as_columns()
    {
        var result = Samples.Readings("serial;C1;B1-E1 [mV];R3 [mA];note\n0017;5,2;652;2,5;ok\n0018;5,3;;;\n");
        Assert.Empty(result.Problems);
        Assert.Equal(2, result.BoardCount);
        var sets = result.Sets.ToList();
        Assert.Equal(["0017", "0018"], sets.Select(s => s.Serial));
        Assert.Equal([("C1", "GND", 5.2), ("B1", "E1", 0.652), ("R3", null, 0.0025)], sets[0].Readings.Select(r => (r.At, r.Against, r.Value)));
        Assert.Equal("ok", sets[0].Readings[0].Note);
        Assert.Single(sets[1].Readings);
    }

    [Fact]
    public void Repeats_are_their_mean_with_the_type_A_uncertainty_of_JCGM_100_4_2_3()
    {
        // JCGM 100:2008 table H.2, column V in volts: mean 4.9990, s/√5 = 0.0032.
        var reading = Assert.Single(Samples.Only("at,value\nC1,5.007\nC1,4.994\nC1,5.005\nC1,4.990\nC1,4.999\n"));
        Assert.Equal(4.9990, reading.Value, 1e-12);
        Assert.Equal(0.0032, Math.Round(reading.RepeatUncertainty, 4));
        Assert.Equal(5, reading.Repeats);
        Assert.Equal([2, 3, 4, 5, 6], reading.Lines);
    }

    [Fact]
    public void The_same_place_in_another_condition_or_with_another_meter_is_no_repeat() =>
        Assert.Equal(3, Samples.Only("at,value,meter,condition\nC1,5,,\nC1,5.1,bench,\nC1,0,,unpowered\n").Length);

    [Theory]
    [InlineData("at,value\nC9,5\n", "unknown node \"C9\"", "did you mean \"C1\"?")]
    [InlineData("at,value\nR3,5\n", "\"R3\", which is a part", "current")]
    [InlineData("at,value,condition\nC1,5,powerd\n", "powerd", "did you mean \"powered\"?")]
    [InlineData("at,value,meter\nC1,5,handhold\n", "handhold", "did you mean \"handheld\"?")]
    [InlineData("at,value,quantity\nC1,5,volatge\n", "volatge", "did you mean \"voltage\"?")]
    [InlineData("at,value,quantity\nQ1,1 mA,current\n", "Q1", "Q1.collector, Q1.base, Q1.emitter")]
    [InlineData("at,value,quantity\nQ1.bse,1 mA,current\n", "Q1.bse", "Q1.base")]
    [InlineData("at,value,quantity\nR9,1 mA,current\n", "R9", "did you mean")]
    [InlineData("at,value,quantity\nB1,4k7,resistance\n", "supplies are on", "write unpowered in column condition")]
    [InlineData("at,value,quantity\nC1,-10,gain\n", "gain in condition powered", "small-signal")]
    [InlineData("at,value\nC1,OL\n", "over-range", "higher range")]
    [InlineData("at,value\nC1,----\n", "over-range", "higher range")]
    [InlineData("at,value\nC1,overload\n", "over-range", "higher range")]
    [InlineData("at,value\nC1,20000\n", "20.00 kV", "m is milli")]
    [InlineData("at,value\nC1,5 MV\n", "5.000 MV", "m is milli")]
    [InlineData("at,value\nC1,4.7 kΩ\n", "a resistance", "a voltage")]
    [InlineData("at,value,unit\nC1,5,mA\n", "C1", "a part")]
    [InlineData("at,value,unit,quantity\nC1,5,mA,voltage\n", "mA", "a unit in V")]
    [InlineData("at,value\nC1,five\n", "five", "a voltage")]
    [InlineData("at,value\nC1,NaN\n", "NaN", "finite")]
    [InlineData("at,value\nC1,5,212\n", "3 cells", "semicolons")]
    [InlineData("at,value,against\nC1,5,C1\n", "against itself", "two different nodes")]
    [InlineData("at,value,uncertainty\nC1,5,0\n", "uncertainty", "above zero")]
    [InlineData("at,value,range\nC1,5,-6\n", "range", "above zero")]
    [InlineData("at,value,quantity,meter\nR3,5 mA,current,bench\n", "accuracy for it is not stated", "column uncertainty")]
    [InlineData("at,value\nC1,\"5\n", "never closed", "in pairs")]
    public void A_row_that_cannot_be_used_is_named_with_its_line_and_what_to_do(string text, string read, string advice)
    {
        var result = Samples.Readings(text);
        Assert.False(result.IsUsable);
        Assert.Empty(result.Sets);
        Assert.All(result.Problems, p => Assert.True(p is { IsError: true, Line: 2 }));
        Assert.Contains(result.Problems, p => p.ToString() is var line && line.Contains(read, StringComparison.Ordinal) && line.Contains(advice, StringComparison.Ordinal));
    }

    [Theory]
    [InlineData("", "empty")]
    [InlineData("# nothing\n\n", "empty")]
    [InlineData("at,value\n", "no readings")]
    [InlineData("C1,5.2\nB1,1.0\n", "value")]
    [InlineData("where,what\nC1,5\n", "header")]
    [InlineData("at,valeu\nC1,5\n", "no column value")]
    [InlineData("at,value,value\nC1,5,6\n", "twice")]
    [InlineData("at,value [parsec]\nC1,5\n", "parsec")]
    public void A_file_without_usable_header_or_rows_is_an_error(string text, string read)
    {
        var result = Samples.Readings(text);
        Assert.False(result.IsUsable);
        Assert.Contains(result.Problems, p => p.IsError && p.ToString().Contains(read, StringComparison.Ordinal));
    }

    [Fact]
    public void Bad_rows_are_left_out_with_a_warning_each_where_the_user_chose_so()
    {
        const string text = "at,value\nC1,5\nC9,4\nB1,OL\nE1,0.4\n";
        Assert.Equal([3, 4], Samples.Readings(text).Problems.Where(p => p.IsError).Select(p => p.Line));
        var result = Samples.Readings(text, skipBadRows: true);
        Assert.True(result.IsUsable);
        Assert.Equal([3, 4], result.Problems.Select(p => p.Line));
        Assert.All(result.Problems, p => Assert.StartsWith("row left out", p.Read, StringComparison.Ordinal));
        Assert.Equal(["C1", "E1"], Assert.Single(result.Sets).Readings.Select(r => r.At));
    }

    [Fact]
    public void Unknown_columns_untaken_readings_and_unread_times_are_warnings()
    {
        var result = Samples.Readings("at,value,colour,time\nC1,5,red,yesterday\nB1,,,\n");
        Assert.True(result.IsUsable);
        Assert.Equal([1, 2, 3], result.Problems.Select(p => p.Line));
        Assert.Single(Assert.Single(result.Sets).Readings);
    }

    [Fact]
    public void A_value_above_its_stated_range_is_a_warning() =>
        Assert.Contains("above the range", Assert.Single(Samples.Readings("at,value,range\nC1,7,6\n").Problems).Read, StringComparison.Ordinal);

    [Fact]
    public void Rows_of_a_serial_that_comes_back_are_one_board_and_a_warning_says_so()
    {
        var result = Samples.Readings("serial,at,value\nA,C1,1\nB,C1,2\nA,B1,3\nB,B1,4\n");
        Assert.Contains("comes back", result.Problems[0].Read, StringComparison.Ordinal);
        var sets = result.Sets.ToDictionary(s => s.Serial!, s => s.Readings.Select(r => r.Value).ToArray());
        Assert.Equal([1, 3], sets["A"]);
        Assert.Equal([2, 4], sets["B"]);
    }

    [Fact]
    public void Utf16_and_latin1_files_are_recognised()
    {
        var path = Path.GetTempFileName();
        try
        {
            foreach (var encoding in (Encoding[])[Encoding.UTF8, Encoding.Unicode, Encoding.BigEndianUnicode, new UnicodeEncoding(false, false), new UnicodeEncoding(true, false)])
            {
                File.WriteAllText(path, "at,value,unit\nQ1.base,12,µA\n", encoding);
                var result = ReadingsFile.Read(path, Samples.Bench);
                Assert.Empty(result.Problems);
                Assert.Equal(12e-6, Assert.Single(Assert.Single(result.Sets).Readings).Value, 1e-18);
            }

            File.WriteAllText(path, "at,value,unit\nQ1.base,12,µA\n", Encoding.Latin1);
            var latin = ReadingsFile.Read(path, Samples.Bench);
            Assert.Contains("Latin-1", Assert.Single(latin.Problems).Read, StringComparison.Ordinal);
            Assert.Equal(12e-6, Assert.Single(Assert.Single(latin.Sets).Readings).Value, 1e-18);
        }
        finally
        {
            File.Delete(path);
        }
    }

    [Fact]
    public void A_binary_or_missing_file_is_one_clear_error()
    {
        var path = Path.GetTempFileName();
        try
        {
            File.WriteAllBytes(path, [0x50, 0x4B, 3, 4, 0, 0, 0, 0, 8, 0, 1, 2, 3, 0, 0, 0]);
            Assert.Contains("binary", Assert.Single(ReadingsFile.Read(path, Samples.Bench).Problems).Read, StringComparison.Ordinal);
        }
        finally
        {
            File.Delete(path);
        }

        Assert.Contains("no such file", Assert.Single(ReadingsFile.Read(path, Samples.Bench).Problems).Read, StringComparison.Ordinal);
    }

    [Fact]
    public void A_file_that_changes_after_it_was_checked_is_noticed()
    {
        var path = Path.GetTempFileName();
        try
        {
            File.WriteAllText(path, "serial,at,value\nA,C1,1\nB,C1,2\n");
            var result = ReadingsFile.Read(path, Samples.Bench);
            File.WriteAllText(path, "serial,at,value\nA,C1,1\n");
            Assert.Throws<IOException>(() => result.Sets.ToList());
        }
        finally
        {
            File.Delete(path);
        }
    }

    [Fact]
    public void A_million_rows_of_many_boards_stream_through_flat_memory()
    {
        var path = Path.GetTempFileName();
        try
        {
            using (var writer = new StreamWriter(path))
            {
                writer.WriteLine("serial,C1");
                for (var i = 0; i < 1_000_000; i++) writer.WriteLine($"{i},5.2");
            }

            var before = GC.GetTotalMemory(true);
            var result = ReadingsFile.Read(path, Samples.Bench);
            Assert.Empty(result.Problems);
            var count = 0;
            var held = 0L;
            foreach (var set in result.Sets)
            {
                count += set.Readings.Length;
                if (count == 500_000) held = GC.GetTotalMemory(true) - before;
            }

            Assert.Equal(1_000_000, count);
            Assert.True(held < 300_000_000, $"{held} bytes held");
        }
        finally
        {
            File.Delete(path);
        }
    }

    [Fact]
    public void More_readings_of_one_board_than_the_limit_are_refused_with_the_limit_named()
    {
        var text = new StringBuilder("at,value\n");
        for (var i = 0; i <= ReadingsFile.MostReadingsOfBoard; i++) text.Append("C1,5.2\n");
        var result = Samples.Readings(text.ToString());
        Assert.Contains("more than 100000 readings of one board", Assert.Single(result.Problems).Read, StringComparison.Ordinal);
        Assert.False(result.IsUsable);
    }

    [Fact]
    public void Very_many_errors_are_cut_off_with_their_count()
    {
        var result = Samples.Readings("at,value\n" + string.Concat(Enumerable.Repeat("C9,5\n", 5000)));
        Assert.Equal(201, result.Problems.Length);
        Assert.Contains("4800 more errors", result.Problems[^1].Read, StringComparison.Ordinal);
    }

    [Fact]
    public void Whatever_the_text_reading_a_readings_file_returns() =>
        Gen.Select(Gen.OneOf(Gen.String, Gen.String[Gen.Char["at,value;\t\n\r\"C1B5.-#' =[]mV"], 0, 60]), Gen.Bool, Gen.Bool).Sample((noise, withHeader, skip) =>
        {
            var result = Samples.Readings(withHeader ? "serial,at,value,unit,note\n" + noise : noise, skip);
            Assert.True(result.IsUsable || result.Problems.Any(p => p.IsError));
            foreach (var set in result.Sets) Assert.All(set.Readings, r => Assert.True(double.IsFinite(r.Value)));
            Assert.All(result.Problems, p => Assert.DoesNotContain(p.ToString(), char.IsControl));
        }, iter: 2000);

    [Fact]
    public void Whatever_the_bytes_reading_a_readings_file_returns()
    {
        var path = Path.GetTempFileName();
        try
        {
            Gen.Byte.Array[0, 200].Sample(bytes =>
            {
                File.WriteAllBytes(path, [.. "at,value\nC1,5\n"u8, .. bytes]);
                var result = ReadingsFile.Read(path, Samples.Bench);
                Assert.True(result.IsUsable || result.Problems.Any(p => p.IsError));
                File.WriteAllBytes(path, bytes);
                Assert.NotEmpty(ReadingsFile.Read(path, Samples.Bench).Problems);
                Assert.NotEmpty(BoardFile.Read(path).Problems);
            }, iter: 200, threads: 1);
        }
        finally
        {
            File.Delete(path);
        }
    }
}
