using System.Buffers;
using System.Collections.Immutable;
using System.Globalization;
using System.Text;
using System.Text.Encodings.Web;
using System.Text.Json;
using System.Text.Unicode;
using BenchCheck.Core.Checking;
using BenchCheck.Core.Metering;

namespace BenchCheck.Files;

/// <summary>Writes a <see cref="CheckResult"/> as JSON for other programs: format 1, SI units.</summary>
/// <remarks>
/// Fields are only ever added within a format. A number that is not known or has no end is null, since JSON has no such numbers. Letters of all
/// scripts stand as they are; control characters and those that HTML gives a meaning are escaped.
/// </remarks>
public static class ResultJson
{
    public const int Format = 1;

    private static readonly JavaScriptEncoder Encoder = MakeEncoder();

    /// <summary>One object on one line, without a line break at its end.</summary>
    public static string Line(CheckResult result) => Text(result, new JsonWriterOptions { Encoder = Encoder });

    /// <summary>One object over several lines, indented.</summary>
    public static string Indented(CheckResult result) => Text(result, new JsonWriterOptions { Encoder = Encoder, Indented = true, NewLine = "\n" });

    /// <summary>Leaves letters readable; invisible characters, which can turn the direction of a line around, are escaped as control characters are.</summary>
    private static JavaScriptEncoder MakeEncoder()
    {
        var settings = new TextEncoderSettings(UnicodeRanges.All);
        settings.ForbidCharacters([.. Enumerable.Range(0, char.MaxValue + 1).Select(c => (char)c).Where(c => char.GetUnicodeCategory(c) == UnicodeCategory.Format)]);
        return JavaScriptEncoder.Create(settings);
    }

    private static string Text(CheckResult result, JsonWriterOptions options)
    {
        ArgumentNullException.ThrowIfNull(result);
        var buffer = new ArrayBufferWriter<byte>(4096);
        using (var json = new Utf8JsonWriter(buffer, options)) Write(json, result);
        return Encoding.UTF8.GetString(buffer.WrittenSpan);
    }

    private static void Write(Utf8JsonWriter json, CheckResult result)
    {
        json.WriteStartObject();
        json.WriteNumber("format", Format);
        json.WriteString("board", result.BoardTitle);
        json.WriteString("reference", result.Reference);
        json.WriteString("serial", result.Serial);
        json.WriteString("verdict", ResultWords.Of(result.Verdict));
        json.WriteString("reason", result.Reason);
        Number(json, "chiSquared", result.ChiSquared);
        json.WriteNumber("degreesOfFreedom", result.DegreesOfFreedom);
        Number(json, "pValue", result.PValue);
        Array(json, "readings", result.Readings, Reading);
        Array(json, "parameters", result.Parameters, Parameter);
        Array(json, "states", result.States, State);
        Array(json, "suspects", result.Suspects, Suspect);
        Array(json, "next", result.Next, Next);
        Array(json, "dissipation", result.Dissipation, Dissipation);
        Strings(json, "cautions", result.Cautions);
        Strings(json, "assumed", result.Assumed);
        Strings(json, "remarks", result.Remarks);
        json.WriteEndObject();
    }

    private static void Reading(Utf8JsonWriter json, ReadingResult row)
    {
        var reading = row.Reading;
        if (reading.Lines.IsDefaultOrEmpty) json.WriteNull("line");
        else json.WriteNumber("line", reading.Lines[0]);
        Array(json, "lines", reading.Lines);
        Place(json, reading.Condition, reading.Quantity, reading.At, reading.Against);
        json.WriteString("unit", reading.Quantity.Unit().Symbol);
        Number(json, "measured", reading.Value);
        json.WriteNumber("repeats", reading.Repeats);
        Number(json, "standardUncertainty", row.StandardUncertainty);
        Number(json, "predicted", row.Predicted);
        Number(json, "bandLow", row.BandLow);
        Number(json, "bandHigh", row.BandHigh);
        Number(json, "difference", row.Difference);
        Number(json, "en", row.En);
        json.WriteString("verdict", ResultWords.Of(row.Verdict));
        Number(json, "fitted", row.Fitted);
        Number(json, "normalisedResidual", row.NormalisedResidual);
        json.WriteString("note", reading.Note);
    }

    private static void Parameter(Utf8JsonWriter json, Estimate estimate)
    {
        json.WriteString("part", estimate.Part);
        json.WriteString("parameter", estimate.Kind.Name);
        json.WriteString("condition", estimate.Condition);
        json.WriteString("unit", estimate.Kind.Unit.Symbol);
        Number(json, "nominal", estimate.Nominal);
        Number(json, "nominalLow", estimate.NominalLow);
        Number(json, "nominalHigh", estimate.NominalHigh);
        Number(json, "estimate", estimate.Value);
        Number(json, "standardUncertainty", estimate.StandardUncertainty);
        Number(json, "low", estimate.Low);
        Number(json, "high", estimate.High);
        json.WriteString("determined", ResultWords.Of(estimate.Determined));
        if (estimate.WithLot is not { } together) return;
        json.WriteStartObject("withLot");
        Number(json, "estimate", together.Value);
        Number(json, "standardUncertainty", together.StandardUncertainty);
        json.WriteEndObject();
    }

    private static void State(Utf8JsonWriter json, DeviceState state)
    {
        json.WriteString("part", state.Part);
        json.WriteString("condition", state.Condition);
        json.WriteString("state", state.State);
        json.WriteString("remark", state.Remark);
    }

    private static void Suspect(Utf8JsonWriter json, Suspect suspect)
    {
        Number(json, "probability", suspect.Probability);
        Fault(json, suspect.Fault, suspect.Text);
        Number(json, "chiSquared", suspect.ChiSquared);
        Number(json, "pValue", suspect.PValue);
        Array(json, "alike", suspect.Alike, (inner, fault) => Fault(inner, fault, fault.Text));
    }

    private static void Fault(Utf8JsonWriter json, NamedFault fault, string text)
    {
        json.WriteString("fault", fault.Fault);
        Strings(json, "parts", fault.Parts);
        Strings(json, "pins", fault.Pins);
        Strings(json, "nodes", fault.Nodes);
        Array(json, "lines", fault.Lines);
        Number(json, "value", fault.Value);
        json.WriteString("unit", fault.Unit?.Symbol);
        Number(json, "nearestPreferred", fault.NearestPreferred);
        json.WriteString("text", text);
        if (fault.With is not { } second) return;
        json.WriteStartObject("with");
        Fault(json, second, second.Text);
        json.WriteEndObject();
    }

    private static void Next(Utf8JsonWriter json, NextReading next)
    {
        Place(json, next.Condition, next.Quantity, next.At, next.Against);
        Number(json, "bits", next.Bits);
        Array(json, "expect", next.Expect, (inner, expectation) =>
        {
            inner.WriteNumber("suspect", expectation.Suspect);
            Number(inner, "value", expectation.Value);
            Number(inner, "standardUncertainty", expectation.StandardUncertainty);
        });
        json.WriteString("caution", next.Caution);
        json.WriteString("text", next.Text);
    }

    private static void Dissipation(Utf8JsonWriter json, Dissipation heat)
    {
        json.WriteString("part", heat.Part);
        json.WriteString("condition", heat.Condition);
        Number(json, "watts", heat.Watts);
        Number(json, "rating", heat.RatedWatts);
        json.WriteBoolean("over", heat.IsOver);
    }

    private static void Place(Utf8JsonWriter json, string condition, ReadingQuantity quantity, string at, string? against)
    {
        json.WriteString("condition", condition);
        json.WriteString("quantity", quantity.Name());
        json.WriteString("at", at);
        json.WriteString("against", against);
    }

    private static void Number(Utf8JsonWriter json, string name, double? value)
    {
        if (value is { } number && double.IsFinite(number)) json.WriteNumber(name, number);
        else json.WriteNull(name);
    }

    private static void Array<T>(Utf8JsonWriter json, string name, ImmutableArray<T> items, Action<Utf8JsonWriter, T> write)
    {
        json.WriteStartArray(name);
        foreach (var item in items.IsDefault ? [] : items)
        {
            json.WriteStartObject();
            write(json, item);
            json.WriteEndObject();
        }

        json.WriteEndArray();
    }

    private static void Array(Utf8JsonWriter json, string name, ImmutableArray<int> numbers)
    {
        json.WriteStartArray(name);
        foreach (var number in numbers.IsDefault ? [] : numbers) json.WriteNumberValue(number);
        json.WriteEndArray();
    }

    private static void Strings(Utf8JsonWriter json, string name, ImmutableArray<string> texts)
    {
        json.WriteStartArray(name);
        foreach (var text in texts.IsDefault ? [] : texts) json.WriteStringValue(text);
        json.WriteEndArray();
    }
}
