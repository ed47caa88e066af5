using System.Collections.Immutable;
using BenchCheck.Core.Metering;
using CsCheck;
using Xunit;

namespace BenchCheck.Files.Tests.Readings;

public class ReadingsCsvTests
{
    private static readonly Gen<string> Text = Gen.OneOf(Gen.String, Gen.String[Gen.Char["=+-@'#,;\"\t\n\rabc1 |cmd!A0µ"], 0, 20])
        .Select(s => string.Concat(s.Where(c => c != '\0' && c != '\uFEFF' && !char.IsSurrogate(c))).ReplaceLineEndings("\n").Trim());

    private static readonly Gen<Reading> Readings = Gen.Select(
        Gen.OneOf<(ReadingQuantity Quantity, string Condition, string At, string? Against)>(
            (ReadingQuantity.Voltage, "powered", "C1", "GND"), (ReadingQuantity.Voltage, "powered", "B1", "E1"), (ReadingQuantity.Voltage, "unpowered", "VCC", "GND"),
            (ReadingQuantity.Current, "powered", "R3", null), (ReadingQuantity.Current, "powered", "Q1.base", null), (ReadingQuantity.Resistance, "unpowered", "B1", "C1")),
        Gen.Double[-1, 1], Gen.Int[-9, 3], Text, Gen.Int[1, 5],
        Gen.Select(Gen.Bool, Gen.Bool, Gen.Bool, Gen.Double[1e-6, 1]),
        Gen.DateTimeOffset).Select((place, digits, exponent, note, repeats, with, time) => new Reading(
            [], place.Condition, place.Quantity, place.At, place.Against, (place.Quantity == ReadingQuantity.Resistance ? Math.Abs(digits) : digits) * Math.Pow(10, exponent))
        {
            Meter = with.Item1 ? "handheld" : null,
            Range = with.Item2 ? with.Item4 : null,
            StatedUncertainty = with.Item3 ? with.Item4 / 7 : null,
            Repeats = repeats,
            RepeatUncertainty = repeats > 1 ? with.Item4 / 3 : 0,
            Time = with.Item2 ? time : null,
            Note = note.Length == 0 ? null : note,
        });

    [Fact]
    public void What_is_written_is_read_back_to_the_same_readings() =>
        Gen.Select(Text, Readings.Array[1, 6]).Sample((serial, readings) =>
        {
            var distinct = readings.Where((r, i) => !readings.Take(i).Any(r.IsRepeatOf)).ToImmutableArray();
            var text = ReadingsCsv.Text(new ReadingSet(serial.Length == 0 ? null : serial, distinct));
            var result = Samples.Readings(text);
            Assert.DoesNotContain(result.Problems, p => p.IsError);
            var set = Assert.Single(result.Sets);
            Assert.Equal(serial.Length == 0 ? null : serial, set.Serial);
            Assert.Equal(distinct, set.Readings.Select(r => r with { Lines = [] }));
        }, iter: 2000);

    [Theory]
    [InlineData("=1+2")]
    [InlineData("+1")]
    [InlineData("-cmd|' /C calc'!A0")]
    [InlineData("@SUM(A1)")]
    [InlineData("'=1+2")]
    [InlineData("  =1")]
    public void No_text_cell_is_written_as_a_spreadsheet_formula(string note)
    {
        var reading = new Reading([], "powered", ReadingQuantity.Voltage, "C1", "GND", -5) { Note = note };
        var text = ReadingsCsv.Text(new ReadingSet(note, [reading]));
        var cells = text.Split("\r\n")[1].Split(',').Select(c => c.Trim('"')).ToList();
        Assert.StartsWith("'", cells[0], StringComparison.Ordinal);
        Assert.StartsWith("'", cells[^1], StringComparison.Ordinal);
        Assert.Contains("-5", cells);
        Assert.Equal(note.Trim(), Assert.Single(Samples.Readings(text).Sets).Readings[0].Note!.Trim());
    }

    [Fact]
    public void Only_columns_that_a_reading_needs_are_written()
    {
        var text = ReadingsCsv.Text(new ReadingSet(null, [new Reading([], "powered", ReadingQuantity.Voltage, "C1", "GND", 5.212)]));
        Assert.Equal("condition,quantity,at,against,value,unit\r\npowered,voltage,C1,GND,5.212,V\r\n", text);
    }

    [Fact]
    public void A_serial_that_looks_like_a_comment_is_still_a_serial()
    {
        var text = ReadingsCsv.Text(new ReadingSet("#17", [new Reading([], "powered", ReadingQuantity.Voltage, "C1", "GND", 5)]));
        Assert.Equal("#17", Assert.Single(Samples.Readings(text).Sets).Serial);
    }

    [Fact]
    public void Means_of_repeats_are_pooled_with_further_repeats_as_if_all_were_single_rows()
    {
        var single = Assert.Single(Samples.Only("at,value\nC1,5.007\nC1,4.994\nC1,5.005\nC1,4.990\nC1,4.999\n"));
        var firstThree = Assert.Single(Samples.Only("at,value\nC1,5.007\nC1,4.994\nC1,5.005\n"));
        var pooled = Assert.Single(Samples.Only(ReadingsCsv.Text(new ReadingSet(null, [firstThree])) + "powered,voltage,C1,GND,4.990,V\npowered,voltage,C1,GND,4.999,V\n"));
        Assert.Equal(5, pooled.Repeats);
        Assert.Equal(single.Value, pooled.Value, 1e-12);
        Assert.Equal(single.RepeatUncertainty, pooled.RepeatUncertainty, 1e-12);
    }

    [Theory]
    [InlineData("at,value,repeats\nC1,5,0\n")]
    [InlineData("at,value,repeats\nC1,5,two\n")]
    [InlineData("at,value,repeats,scatter\nC1,5,1,0.1\n")]
    [InlineData("at,value,repeats,scatter\nC1,5,3,-0.1\n")]
    public void Impossible_repeats_are_errors(string text) => Assert.False(Samples.Readings(text).IsUsable);
}
