using System.Text.Json;
using BenchCheck.Core.Boards;
using BenchCheck.Core.Checking;
using BenchCheck.Core.Metering;
using BenchCheck.Core.Quantities;
using CsCheck;
using Xunit;

namespace BenchCheck.Files.Tests.Results;

public class ResultFileTests
{
    private static CheckResult Result(string text = "warm", double number = 0.5) => new()
    {
        BoardTitle = text,
        Reference = "GND",
        Serial = text,
        Verdict = BoardVerdict.Disagrees,
        Reason = "C1 is out of tolerance.",
        ChiSquared = 12.5,
        DegreesOfFreedom = 3,
        PValue = 0.0058,
        Readings =
        [
            new ReadingResult(
                new Reading([2, 5], "powered", ReadingQuantity.Voltage, "C1", "GND", 5.212) { Note = text, Repeats = 2 },
                0.01, number, 4.9, 5.1, 0.212, 2.1, ReadingVerdict.Out, 5.2, double.NaN),
            new ReadingResult(new Reading([], "powered", ReadingQuantity.Current, "Q1.base", null, 12e-6), 1e-7, 11e-6, 1e-5, 2e-5, 1e-6, 0.1, ReadingVerdict.In, 12e-6, 0.3),
        ],
        Parameters = [new Estimate("Q1", ParameterKind.Gain, null, double.NaN, double.NegativeInfinity, double.PositiveInfinity, 173, 12, 150, double.PositiveInfinity, Determination.Partly)],
        States = [new DeviceState("Q1", "powered", "saturated", "the gain is at least 23")],
        Dissipation = [new Dissipation("R1", "powered", 0.3, 0.25), new Dissipation("R2", "powered", 0.1, null)],
        Suspects =
        [
            new Suspect(
                0.9, new NamedFault("wrong value", ["R3"], ["R3.1"], ["N"], [2], 47e3, Unit.Ohm, 47e3, "R3 wrong value"), 1.5, 0.7, "R3 is 47 kΩ",
                [new NamedFault("open", ["R4"], [], [], [], null, null, null, "R4 open") { With = new NamedFault("short", ["R5"], [], [], [], null, null, null, "R5 short") }]),
        ],
        Next = [new NextReading("powered", ReadingQuantity.Voltage, "E1", "GND", 0.8, [new Expectation(0, 1.2, 0.01)], null, "near 1.2 V: R3")],
        Cautions = ["One hand."],
        Assumed = ["R3: no tolerance stated, 5 % taken"],
    };

    [Fact]
    public void The_json_object_has_the_documented_fields_with_their_values()
    {
        using var json = JsonDocument.Parse(ResultJson.Line(Result()));
        var root = json.RootElement;
        Assert.Equal(1, root.GetProperty("format").GetInt32());
        Assert.Equal(("warm", "warm", "disagrees"), (root.GetProperty("board").GetString(), root.GetProperty("serial").GetString(), root.GetProperty("verdict").GetString()));
        Assert.Equal((12.5, 3, 0.0058), (root.GetProperty("chiSquared").GetDouble(), root.GetProperty("degreesOfFreedom").GetInt32(), root.GetProperty("pValue").GetDouble()));
        var reading = root.GetProperty("readings")[0];
        Assert.Equal((2, "powered", "voltage", "C1", "GND", "V"), (
            reading.GetProperty("line").GetInt32(), reading.GetProperty("condition").GetString(), reading.GetProperty("quantity").GetString(),
            reading.GetProperty("at").GetString(), reading.GetProperty("against").GetString(), reading.GetProperty("unit").GetString()));
        Assert.Equal([5.212, 0.01, 0.5, 4.9, 5.1, 0.212, 2.1, 5.2],
            new[] { "measured", "standardUncertainty", "predicted", "bandLow", "bandHigh", "difference", "en", "fitted" }.Select(n => reading.GetProperty(n).GetDouble()));
        Assert.Equal("out", reading.GetProperty("verdict").GetString());
        var parameter = root.GetProperty("parameters")[0];
        Assert.Equal(("Q1", "gain", "1", 173, 12, 150, "partly"), (
            parameter.GetProperty("part").GetString(), parameter.GetProperty("parameter").GetString(), parameter.GetProperty("unit").GetString(),
            parameter.GetProperty("estimate").GetDouble(), parameter.GetProperty("standardUncertainty").GetDouble(), parameter.GetProperty("low").GetDouble(),
            parameter.GetProperty("determined").GetString()));
        Assert.Equal("saturated", root.GetProperty("states")[0].GetProperty("state").GetString());
        var suspect = root.GetProperty("suspects")[0];
        Assert.Equal((0.9, "wrong value", "R3", "R3.1", 2, 47e3, "Ω", 47e3, 1.5, 0.7, "R3 is 47 kΩ"), (
            suspect.GetProperty("probability").GetDouble(), suspect.GetProperty("fault").GetString(), suspect.GetProperty("parts")[0].GetString(),
            suspect.GetProperty("pins")[0].GetString(), suspect.GetProperty("lines")[0].GetInt32(), suspect.GetProperty("value").GetDouble(), suspect.GetProperty("unit").GetString(),
            suspect.GetProperty("nearestPreferred").GetDouble(), suspect.GetProperty("chiSquared").GetDouble(), suspect.GetProperty("pValue").GetDouble(), suspect.GetProperty("text").GetString()));
        var alike = suspect.GetProperty("alike")[0];
        Assert.Equal(("open", "R4", "R4 open", "short"), (
            alike.GetProperty("fault").GetString(), alike.GetProperty("parts")[0].GetString(), alike.GetProperty("text").GetString(),
            alike.GetProperty("with").GetProperty("fault").GetString()));
        var next = root.GetProperty("next")[0];
        Assert.Equal(("E1", 0.8, 0, 1.2), (
            next.GetProperty("at").GetString(), next.GetProperty("bits").GetDouble(), next.GetProperty("expect")[0].GetProperty("suspect").GetInt32(),
            next.GetProperty("expect")[0].GetProperty("value").GetDouble()));
        var heat = root.GetProperty("dissipation")[0];
        Assert.Equal(("R1", 0.3, 0.25, true), (heat.GetProperty("part").GetString(), heat.GetProperty("watts").GetDouble(), heat.GetProperty("rating").GetDouble(), heat.GetProperty("over").GetBoolean()));
        Assert.Equal("One hand.", root.GetProperty("cautions")[0].GetString());
        Assert.Equal("R3: no tolerance stated, 5 % taken", root.GetProperty("assumed")[0].GetString());
    }

    [Fact]
    public void Numbers_that_are_not_known_or_have_no_end_are_null()
    {
        using var json = JsonDocument.Parse(ResultJson.Line(Result()));
        var root = json.RootElement;
        Assert.Equal(JsonValueKind.Null, root.GetProperty("readings")[0].GetProperty("normalisedResidual").ValueKind);
        Assert.Equal(JsonValueKind.Null, root.GetProperty("readings")[1].GetProperty("line").ValueKind);
        Assert.Equal(JsonValueKind.Null, root.GetProperty("readings")[1].GetProperty("against").ValueKind);
        Assert.Equal(JsonValueKind.Null, root.GetProperty("parameters")[0].GetProperty("nominal").ValueKind);
        Assert.Equal(JsonValueKind.Null, root.GetProperty("parameters")[0].GetProperty("high").ValueKind);
        Assert.Equal(JsonValueKind.Null, root.GetProperty("dissipation")[1].GetProperty("rating").ValueKind);
    }

    [Fact]
    public void Any_text_and_number_gives_one_line_of_valid_json_without_control_characters() =>
        Gen.Select(Gen.String, Gen.Double).Sample((text, number) =>
        {
            var line = ResultJson.Line(Result(text + "\u001b[31m\n\u2028\u202e<script>", number));
            Assert.DoesNotContain(line, c => char.IsControl(c) || c is '\u2028' or '\u202e' or '<');
            using var json = JsonDocument.Parse(line);
            using var indented = JsonDocument.Parse(ResultJson.Indented(Result(text, number)));
            if (double.IsFinite(number)) Assert.Equal(number, json.RootElement.GetProperty("readings")[0].GetProperty("predicted").GetDouble());
            if (!text.Any(char.IsSurrogate)) Assert.StartsWith(text, json.RootElement.GetProperty("board").GetString(), StringComparison.Ordinal);
        }, iter: 300);

    [Fact]
    public void The_comparison_table_is_rfc_4180_csv_with_formulas_protected_and_unknowns_empty()
    {
        var lines = ComparisonCsv.Text(Result("=1+2, \"quoted\"")).Split("\r\n");
        Assert.Equal("serial,line,condition,quantity,at,against,unit,measured,standard_uncertainty,predicted,band_low,band_high,difference,en,verdict,fitted,normalised_residual,note", lines[0]);
        Assert.Equal("\"'=1+2, \"\"quoted\"\"\",2,powered,voltage,C1,GND,V,5.212,0.01,0.5,4.9,5.1,0.212,2.1,out,5.2,,\"'=1+2, \"\"quoted\"\"\"", lines[1]);
        Assert.Equal("", lines[3]);
    }
}
