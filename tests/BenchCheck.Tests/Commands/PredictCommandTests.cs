using System.Text.Json;
using Xunit;

namespace BenchCheck.Tests.Commands;

public sealed class PredictCommandTests : IDisposable
{
    private readonly CommandLine line = new();
    private readonly string board;

    public PredictCommandTests() => board = line.File("board.toml", WorkshopFiles.Board);

    [Fact]
    public async Task Looking_in_between_a_divider_and_ground_gives_its_equivalent()
    {
        var divider = line.File("divider.toml", """
            title = "Divider"
            [parts]
            V1 = { kind = "supply",   value = "10 V 1%", pins = { plus = "VCC", minus = "GND" } }
            R1 = { kind = "resistor", value = "3k 1%",   pins = ["VCC", "OUT"] }
            R2 = { kind = "resistor", value = "1k 1%",   pins = ["OUT", "GND"] }
            """);
        Assert.Equal(0, await line.Run("predict", divider, "--looking-in", "OUT", "--json"));
        using var json = JsonDocument.Parse(line.Output);
        var powered = json.RootElement.GetProperty("lookingIn").EnumerateArray().First(l => l.GetProperty("condition").GetString() == "powered");
        Assert.Equal(2.5, powered.GetProperty("openVoltage").GetDouble(), 1e-6);
        Assert.Equal(750, powered.GetProperty("resistance").GetDouble(), 1e-3);
        Assert.Equal(2.5 / 750, powered.GetProperty("shortCurrent").GetDouble(), 1e-8);
        Assert.Equal(0, await line.Run("predict", divider, "--looking-in", "VCC,OUT"));
        Assert.Matches(@"powered\s+7\.500 V\s+750\.0 Ω\s+10\.0 mA", line.Output);
    }

    [Theory]
    [InlineData("C9", "no node \"C9\"")]
    [InlineData("GND", "one node other than the reference")]
    [InlineData("C1,C1", "two different nodes")]
    public async Task A_pair_that_cannot_be_looked_into_is_said(string pair, string words)
    {
        Assert.Equal(2, await line.Run("predict", board, "--looking-in", pair));
        Assert.Contains(words, line.Error, StringComparison.Ordinal);
        Assert.Empty(line.Output);
    }

    [Fact]
    public async Task Small_signals_are_predicted_with_the_sign_of_the_gain()
    {
        var amplifier = line.File("amplifier.toml", WorkshopFiles.Board + """

            [conditions.powered]
            [conditions.signal]
            kind = "small-signal"
            operating_point = "powered"
            drive = { at = "B1" }
            """);
        Assert.Equal(0, await line.Run("predict", amplifier));
        Assert.Matches(@"OUT over B1 gain\s+-2\.\d", line.Output);
        Assert.Matches(@"B1 input resistance\s+\d+\.\d+ kΩ", line.Output);
    }

    [Fact]
    public async Task Monte_Carlo_bands_repeat_with_their_seed()
    {
        await line.Run("predict", board, "--bands", "monte-carlo", "--draws", "300", "--seed", "5");
        var first = line.Output;
        await line.Run("predict", board, "--bands", "monte-carlo", "--draws", "300", "--seed", "5");
        Assert.Equal(first, line.Output);
        await line.Run("predict", board, "--bands", "monte-carlo", "--draws", "300", "--seed", "6");
        Assert.NotEqual(first, line.Output);
    }

    public void Dispose() => line.Dispose();
}
