using System.Collections.Immutable;
using System.Text.Json;

namespace BenchCheck.Files;

/// <summary>A result as <see cref="ResultJson"/> wrote it, read back for showing and comparing; numbers that were not known are NaN.</summary>
public sealed record ResultSummary(
    string Board, string Reference, string? Serial, string Verdict, string Reason, double PValue, ImmutableArray<FiledReading> Readings,
    ImmutableArray<FiledEstimate> Parameters, ImmutableArray<FiledSuspect> Suspects)
{
    /// <summary>Null when the text is no result of format 1.</summary>
    public static ResultSummary? Parse(string json)
    {
        try
        {
            using var document = JsonDocument.Parse(json);
            var root = document.RootElement;
            if (root.ValueKind != JsonValueKind.Object || !root.TryGetProperty("format", out var format) || format.GetInt32() != ResultJson.Format) return null;
            return new ResultSummary(
                Text(root, "board"), Text(root, "reference"), Optional(root, "serial"), Text(root, "verdict"), Text(root, "reason"), Number(root, "pValue"),
                [.. root.GetProperty("readings").EnumerateArray().Select(Reading)],
                [.. root.GetProperty("parameters").EnumerateArray().Select(Estimate)],
                [.. root.GetProperty("suspects").EnumerateArray().Select(s => new FiledSuspect(Number(s, "probability"), Text(s, "text")))]);
        }
        catch (Exception failure) when (failure is JsonException or InvalidOperationException or KeyNotFoundException or FormatException)
        {
            return null;
        }
    }

    private static FiledReading Reading(JsonElement row) => new(
        Text(row, "condition"), Text(row, "quantity"), Text(row, "at"), Optional(row, "against"), Text(row, "unit"), Number(row, "measured"),
        Number(row, "predicted"), Number(row, "bandLow"), Number(row, "bandHigh"), Number(row, "en"), Text(row, "verdict"), Number(row, "fitted"));

    private static FiledEstimate Estimate(JsonElement row) => new(
        Text(row, "part"), Text(row, "parameter"), Optional(row, "condition"), Text(row, "unit"), Number(row, "nominalLow"), Number(row, "nominalHigh"),
        Number(row, "estimate"), Number(row, "standardUncertainty"), Text(row, "determined"))
    {
        Nominal = Number(row, "nominal"), Low = Number(row, "low"), High = Number(row, "high"),
    };

    private static string Text(JsonElement row, string name) => Optional(row, name) ?? "";

    private static string? Optional(JsonElement row, string name) => row.TryGetProperty(name, out var value) ? value.GetString() : null;

    private static double Number(JsonElement row, string name) =>
        row.TryGetProperty(name, out var value) && value.ValueKind == JsonValueKind.Number ? value.GetDouble() : double.NaN;
}

/// <summary>A reading of a filed result; the fields are those of the result file.</summary>
public sealed record FiledReading(
    string Condition, string Quantity, string At, string? Against, string Unit, double Measured, double Predicted, double BandLow, double BandHigh, double En,
    string Verdict, double Fitted);

/// <summary>An estimate of a filed result.</summary>
public sealed record FiledEstimate(
    string Part, string Parameter, string? Condition, string Unit, double NominalLow, double NominalHigh, double Value, double StandardUncertainty, string Determined)
{
    /// <summary>"Q1 gain", "V2 voltage (bright)".</summary>
    public string Name => Condition is null ? $"{Part} {Parameter}" : $"{Part} {Parameter} ({Condition})";

    public double Nominal { get; init; } = double.NaN;

    /// <summary>Lower end of the coverage interval.</summary>
    public double Low { get; init; } = double.NaN;

    public double High { get; init; } = double.NaN;
}

/// <summary>A suspect of a filed result.</summary>
public sealed record FiledSuspect(double Probability, string Text);
