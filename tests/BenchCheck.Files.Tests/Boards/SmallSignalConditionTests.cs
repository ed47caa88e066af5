using Xunit;

namespace BenchCheck.Files.Tests.Boards;

/// <summary>Small-signal conditions as board files write them, right and wrong.</summary>
public class SmallSignalConditionTests
{
    private const string Parts = """
        [parts]
        V1 = { kind = "supply",    value = "12 V 1%", pins = { plus = "VCC", minus = "GND" } }
        C1 = { kind = "capacitor", value = "10 uF",   pins = ["IN", "B1"] }
        R1 = { kind = "resistor",  value = "470k 5%", pins = ["VCC", "B1"] }
        R2 = { kind = "resistor",  value = "3k3 5%",  pins = ["VCC", "C1"] }
        Q1 = { kind = "npn", gain = "100..300", pins = { collector = "C1", base = "B1", emitter = "GND" } }
        [conditions.powered]

        """;

    [Fact]
    public void A_generator_is_read_and_its_node_needs_no_second_part()
    {
        var result = Read("""
            [conditions.signal]
            kind = "small-signal"
            operating_point = "powered"
            frequency = "1 kHz"
            drive = { at = "IN", value = "5 mV", resistance = "600" }
            """);
        var condition = result.Bench!.Board.FindCondition("signal")!;
        Assert.Equal(("powered", 1000.0), (condition.OperatingPoint, condition.Hertz));
        Assert.Equal(new Core.Boards.Drive("IN", "GND", 5e-3, 600), condition.Drive);
        Assert.DoesNotContain(result.Problems, p => p.ToString().Contains("IN", StringComparison.Ordinal));
    }

    [Theory]
    [InlineData("kind = \"small-signal\"", "has no operating_point")]
    [InlineData("kind = \"small-signal\"\noperating_point = \"powerd\"", "did you mean \"powered\"?")]
    [InlineData("kind = \"small-signal\"\noperating_point = \"powered\"\nset = { V1 = \"5 V\" }", "in the DC condition that operating_point names")]
    [InlineData("kind = \"small-signal\"\noperating_point = \"powered\"\ndrive = { at = \"INN\" }", "no node \"INN\"")]
    [InlineData("kind = \"small-signal\"\noperating_point = \"powered\"\ndrive = { value = \"1 mV\" }", "has no place")]
    [InlineData("kind = \"small-signal\"\noperating_point = \"powered\"\ndrive = { at = \"GND\" }", "against itself")]
    [InlineData("kind = \"small-signal\"\noperating_point = \"powered\"\ndrive = { at = \"IN\", value = \"-1 mV\" }", "the RMS voltage that the generator is set to")]
    [InlineData("kind = \"small-signal\"\noperating_point = \"powered\"\ndrive = { at = \"VCC\" }", "the generator of condition signal is shorted: supplies hold VCC and GND still")]
    [InlineData("drive = { at = \"IN\" }", "kind = \"small-signal\" beside it")]
    public void What_is_wrong_with_a_small_signal_condition_is_said(string condition, string words)
    {
        var result = Read("[conditions.signal]\n" + condition);
        Assert.Null(result.Bench);
        Assert.Contains(result.Problems, p => p.ToString().Contains(words, StringComparison.Ordinal));
    }

    [Fact]
    public void A_gain_counted_from_a_node_that_supplies_hold_still_is_refused()
    {
        var bench = Read("[conditions.signal]\nkind = \"small-signal\"\noperating_point = \"powered\"").Bench!;
        var result = ReadingsFile.Parse("condition,quantity,at,against,value\nsignal,gain,C1,VCC,-180\nsignal,gain,C1,IN,-180\n", "amplifier.csv", bench, ReadingsOptions.Default);
        var problem = Assert.Single(result.Problems);
        Assert.Equal(2, problem.Line);
        Assert.Contains("a gain counted from VCC", problem.ToString(), StringComparison.Ordinal);
    }

    private static BoardFileResult Read(string condition) => BoardFile.Parse(Parts + condition, "amplifier.toml");
}
