using System.Globalization;
using BenchCheck.Core.Metering;
using BenchCheck.Core.Quantities;
using BenchCheck.Files;

namespace BenchCheck.Screens;

/// <summary>A reading as it is typed, cell by cell. It is understood exactly as a row of a readings file would be.</summary>
internal sealed record ReadingText(string Condition, string Quantity, string At, string Against, string Value)
{
    public string Meter { get; init; } = "";

    public string Range { get; init; } = "";

    public string Uncertainty { get; init; } = "";

    public string Note { get; init; } = "";

    public static ReadingText Typed(Place place, string value) => new(place.Condition, place.Quantity.Name(), place.At, place.Against ?? "", value);

    public static ReadingText Of(Reading reading) =>
        new(reading.Condition, reading.Quantity.Name(), reading.At, reading.Against ?? "", reading.Value.ToString("R", CultureInfo.InvariantCulture))
        {
            Meter = reading.Meter ?? "",
            Range = reading.Range?.ToString("R", CultureInfo.InvariantCulture) ?? "",
            Uncertainty = reading.StatedUncertainty?.ToString("R", CultureInfo.InvariantCulture) ?? "",
            Note = reading.Note ?? "",
        };

    /// <summary>The reading, or one sentence that says what is wrong.</summary>
    public Parsed<Reading> Read(Bench bench)
    {
        string[] cells = [Condition, Quantity, At, Against, Value, Meter, Range, Uncertainty, Note];
        var row = string.Join(',', cells.Select(c => $"\"{c.Replace("\"", "\"\"", StringComparison.Ordinal)}\""));
        var result = ReadingsFile.Parse($"condition,quantity,at,against,value,meter,range,uncertainty,note\n{row}\n", "typed", bench);
        if (result.IsUsable && result.Sets.FirstOrDefault() is { Readings: [var reading, ..] }) return reading with { Lines = [] };
        var problem = result.Problems.FirstOrDefault(p => p.IsError);
        return problem is null ? new TextFault("nothing that is a reading", "a value such as 6.42, 652m or 4k7") : new TextFault(problem.Read, problem.Expected ?? "", problem.Hint);
    }
}
