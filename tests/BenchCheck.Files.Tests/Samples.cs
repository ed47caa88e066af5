using BenchCheck.Core.Metering;

namespace BenchCheck.Files.Tests;

/// <summary>A board of the invented workshop with two conditions and two meters, and short ways to read files for it.</summary>
internal static class Samples
{
    public const string BoardText = """
        title     = "Vent-motor driver, sensor stage"
        reference = "GND"
        origin    = "service"

        [parts]
        V1 = { kind = "supply", value = "12 V 1%", pins = { plus = "VCC", minus = "GND" } }
        R1 = { kind = "resistor", value = "47k 5%", pins = ["VCC", "B1"], rating = "0.25 W" }
        R2 = { kind = "resistor", value = "10k 5%", pins = ["B1", "GND"] }
        R3 = { kind = "resistor", value = "2k2 5%", pins = ["VCC", "C1"] }
        R4 = { kind = "resistor", value = "470 5%", pins = ["E1", "GND"] }
        Q1 = { kind = "npn", gain = "80..320", drop = "0.65 V ± 0.1 V", saturation = "0.1 V ± 0.08 V", pins = { collector = "C1", base = "B1", emitter = "E1" } }

        [conditions.powered]
        [conditions.unpowered]
        supplies = "removed"

        [meters.handheld]
        input_resistance = "10M"
        counts = 6000
        voltage = { accuracy = "0.5% + 2 counts", ranges = ["600 mV", "6 V", "60 V"] }
        current = { accuracy = "1% + 3 counts", ranges = ["6 mA", "60 mA"], burden = "0.2 V" }
        resistance = { accuracy = "0.8% + 2 counts", ranges = ["600", "6k", "60k"] }

        [meters.bench]
        input_resistance = "infinite"
        counts = 200000
        voltage = { accuracy = "0.01% + 5 counts", ranges = ["2 V", "20 V"] }
        """;

    public static Bench Bench { get; } = BoardFile.Parse(BoardText, "board.toml").Bench!;

    public static BoardFileResult Board(string text) => BoardFile.Parse(text, "board.toml");

    /// <summary>A board of a supply and a divider with these lines among its parts.</summary>
    public static BoardFileResult WithParts(string lines, string rest = "") => Board($$"""
        title = "Divider"
        reference = "GND"
        origin = "new build"
        [parts]
        V1 = { kind = "supply", value = "12 V 1%", pins = { plus = "VCC", minus = "GND" } }
        R1 = { kind = "resistor", value = "10k 5%", pins = ["VCC", "OUT"] }
        R2 = { kind = "resistor", value = "10k 5%", pins = ["OUT", "GND"] }
        {{lines}}
        {{rest}}
        """);

    public static ReadingsFileResult Readings(string text, bool skipBadRows = false) =>
        ReadingsFile.Parse(text, "readings.csv", Bench, new ReadingsOptions { SkipBadRows = skipBadRows });

    /// <summary>The readings of the file's only board.</summary>
    public static Reading[] Only(string text)
    {
        var result = Readings(text);
        Xunit.Assert.DoesNotContain(result.Problems, p => p.IsError);
        return [.. Xunit.Assert.Single(result.Sets).Readings];
    }
}
