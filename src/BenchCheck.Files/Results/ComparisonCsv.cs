using System.Globalization;
using BenchCheck.Core.Checking;
using BenchCheck.Core.Metering;

namespace BenchCheck.Files;

/// <summary>Writes the comparison of readings with their predictions as CSV (RFC 4180), one row a reading, SI units, for spreadsheets.</summary>
/// <remarks>Text that a spreadsheet would take for a formula is protected by an apostrophe; a number that is not known is an empty cell.</remarks>
public static class ComparisonCsv
{
    private static readonly string[] Header =
    [
        "serial", "line", "condition", "quantity", "at", "against", "unit", "measured", "standard_uncertainty", "predicted", "band_low", "band_high",
        "difference", "en", "verdict", "fitted", "normalised_residual", "note",
    ];

    public static string Text(CheckResult result)
    {
        using var text = new StringWriter(CultureInfo.InvariantCulture);
        Write(text, [result]);
        return text.ToString();
    }

    /// <param name="target">receives the rows; stays open</param>
    /// <param name="results">boards in their order; streamed</param>
    public static void Write(TextWriter target, IEnumerable<CheckResult> results)
    {
        ArgumentNullException.ThrowIfNull(results);
        using var csv = CsvTarget.Open(target);
        csv.WriteRecord(Header);
        foreach (var result in results)
        {
            foreach (var row in result.Readings) csv.WriteRecord(Cells(result.Serial, row));
        }
    }

    private static string[] Cells(string? serial, ReadingResult row) =>
    [
        CellText.Protect(serial ?? ""), row.Reading.Lines.IsDefaultOrEmpty ? "" : row.Reading.Lines[0].ToString(CultureInfo.InvariantCulture),
        CellText.Protect(row.Reading.Condition), row.Reading.Quantity.Name(), CellText.Protect(row.Reading.At), CellText.Protect(row.Reading.Against ?? ""),
        row.Reading.Quantity.Unit().Symbol, Digits(row.Reading.Value), Digits(row.StandardUncertainty), Digits(row.Predicted), Digits(row.BandLow),
        Digits(row.BandHigh), Digits(row.Difference), Digits(row.En), ResultWords.Of(row.Verdict), Digits(row.Fitted), Digits(row.NormalisedResidual),
        CellText.Protect(row.Reading.Note ?? ""),
    ];

    private static string Digits(double value) => double.IsFinite(value) ? value.ToString("R", CultureInfo.InvariantCulture) : "";
}
