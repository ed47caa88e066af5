using System.Collections.Immutable;
using System.Globalization;
using BenchCheck.Core.Boards;
using BenchCheck.Core.Metering;
using BenchCheck.Core.Quantities;
using CsvHelper;

namespace BenchCheck.Files;

/// <summary>Turns rows into readings, one reading a row in the long form, one a filled cell in the wide form.</summary>
internal sealed class RowReader(ReadingsHeader header, BoardNames names)
{
    private const int MostRepeats = 1_000_000;

    private readonly ReadingCheck check = new(names);
    private readonly Dictionary<string, Parsed<(double Factor, Unit? Unit)>> units = new(StringComparer.Ordinal);

    /// <summary>Reads a row; every call clears what the one before left in <see cref="Readings"/>, <see cref="Faults"/> and <see cref="Remarks"/>.</summary>
    public void Read(DelimitedRow row)
    {
        Readings.Clear();
        Faults.Clear();
        Remarks.Clear();
        Serial = header.Cell(row.Cells, "serial");
        if (row.Malformed is { } malformed) Faults.Add(Describe(malformed));
        else if (row.Cells.Length > header.ColumnCount && row.Cells.Skip(header.ColumnCount).Any(c => c.Length > 0)) Faults.Add(TooMany(row));
        else if (header.IsWide) ReadWide(row);
        else ReadLong(row);
    }

    /// <summary>Empty when the file or the row names none.</summary>
    public string Serial { get; private set; } = "";

    public List<Reading> Readings { get; } = [];

    public List<TextFault> Faults { get; } = [];

    public List<TextFault> Remarks { get; } = [];

    private static TextFault Describe(CsvMalformedReason reason) => reason == CsvMalformedReason.UnterminatedQuote
        ? new TextFault("a quotation mark that is never closed; the rest of the file was not read", "quotation marks in pairs")
        : new TextFault("text behind a closing quotation mark", "a delimiter behind it, quotation marks inside a text doubled");

    private TextFault TooMany(DelimitedRow row) => new(
        string.Create(CultureInfo.InvariantCulture, $"{row.Cells.Length} cells"),
        string.Create(CultureInfo.InvariantCulture, $"{header.ColumnCount}, as in the header"),
        "where a decimal comma meets comma as delimiter, part the columns by semicolons or put the number in quotation marks");

    private void ReadLong(DelimitedRow row)
    {
        string Cell(string field) => header.Cell(row.Cells, field);
        var (valueText, at) = (Cell("value"), Cell("at"));
        if (valueText.Length == 0)
        {
            if (at.Length > 0) Remarks.Add(new TextFault($"no value at {TextFault.Quote(at)}: reading not taken", "a value, or no row"));
            else Faults.Add(new TextFault("a row with neither place nor value", "at and value"));
            return;
        }

        var unitText = Cell("unit") is { Length: > 0 } own ? own : header.ValueUnit ?? "";
        var setting = SettingOf(row);
        if (QuantityOf(Cell("quantity"), unitText) is not { } quantity) return;
        if (Take(setting, quantity, at, Cell("against"), valueText, unitText) is not { } reading) return;
        var range = Optional(Cell("range"), "range", quantity, unitText);
        var uncertainty = Uncertainty(Cell("uncertainty"), quantity, unitText, reading.Value);
        var (repeats, scatter) = RepeatsOf(Cell("repeats"), Cell("scatter"), quantity, unitText);
        if (Faults.Count > 0) return;
        if (range is { } fullScale && Math.Abs(reading.Value) > 1.1 * fullScale)
            Remarks.Add(new TextFault($"a value above the range stated, {EngineeringNotation.Format(fullScale, quantity.Unit(), 3)}", "a range that shows it"));
        Finish(reading with { Range = range, StatedUncertainty = uncertainty, Repeats = repeats, RepeatUncertainty = scatter }, setting);
    }

    /// <summary>How many repeats a value already is the mean of, and the standard uncertainty of that mean from their scatter.</summary>
    private (int Repeats, double Scatter) RepeatsOf(string countText, string scatterText, ReadingQuantity quantity, string unitText)
    {
        var count = 1;
        if (countText.Length > 0 && (!int.TryParse(countText, NumberStyles.None, CultureInfo.InvariantCulture, out count) || count is < 1 or > MostRepeats))
            Faults.Add(new TextFault($"repeats {TextFault.Quote(countText)}", $"a whole number from 1 to {MostRepeats}"));
        if (scatterText.Length == 0) return (count, 0);
        var scatter = Quantity(scatterText, quantity.Unit(), unitText);
        if (scatter.Fault is { } fault) Faults.Add(fault with { Read = $"scatter: {fault.Read}" });
        else if (scatter.Value < 0 || count < 2) Faults.Add(new TextFault($"scatter {TextFault.Quote(scatterText)}", "zero or more, beside two repeats or more"));
        else return (count, scatter.Value);
        return (count, 0);
    }

    private void ReadWide(DelimitedRow row)
    {
        var setting = SettingOf(row);
        foreach (var place in header.Places)
        {
            var cell = place.Index < row.Cells.Length ? CellText.Restore(row.Cells[place.Index]) : "";
            if (cell.Length > 0 && Take(setting, place.Quantity, place.At, place.Against ?? "", cell, place.UnitText ?? "") is { } reading) Finish(reading, setting);
        }

        if (Faults.Count > 0) Readings.Clear();
        else if (Readings.Count == 0) Remarks.Add(new TextFault("a row without any value: no reading taken", "values, or no row"));
    }

    /// <summary>What all readings of a row have in common; what is wrong with it is among the faults once, however many readings follow.</summary>
    private Setting SettingOf(DelimitedRow row)
    {
        var condition = names.Condition(header.Cell(row.Cells, "condition"));
        if (condition.Fault is { } unknown) Faults.Add(unknown);
        var meterName = header.Cell(row.Cells, "meter");
        var meter = names.Meter(meterName);
        if (meter.Fault is { } noMeter) Faults.Add(noMeter);
        var note = header.Cell(row.Cells, "note");
        return new Setting(
            [row.Line], condition.IsValue ? condition.Value : null, meter.IsValue ? meter.Value : null, meterName.Length > 0,
            TimeOf(header.Cell(row.Cells, "time")), note.Length == 0 ? null : note);
    }

    private Reading? Take(Setting setting, ReadingQuantity quantity, string at, string against, string valueText, string unitText)
    {
        var before = Faults.Count;
        var place = check.Place(quantity, at, against);
        if (place.Fault is { } misplaced) Faults.Add(misplaced);
        if (setting.Condition is not null && check.Condition(quantity, setting.Condition) is { } unsuited) Faults.Add(unsuited);
        if (setting.Condition is not null && place.IsValue && check.Input(quantity, place.Value.Against, setting.Condition) is { } uncounted) Faults.Add(uncounted);
        var value = Value(valueText, quantity, unitText);
        if (Faults.Count > before || setting.Condition is null) return null;
        return new Reading(setting.Lines, setting.Condition.Name, quantity, place.Value.At, place.Value.Against, value)
        {
            Meter = setting.IsMeterNamed ? setting.Meter?.Name : null,
            Time = setting.Time,
            Note = setting.Note,
        };
    }

    private void Finish(Reading reading, Setting setting)
    {
        if (setting.Meter is null || setting.Condition is null) return;
        if (ReadingCheck.Meter(reading.Quantity, setting.Condition, setting.Meter, reading.StatedUncertainty) is { } fault) Faults.Add(fault);
        else Readings.Add(reading);
    }

    /// <summary>The quantity that the row names or, where it names none, that its unit tells.</summary>
    private ReadingQuantity? QuantityOf(string text, string unitText)
    {
        if (text.Length == 0)
        {
            var unit = unitText.Length > 0 && UnitOf(unitText) is { IsValue: true } read ? read.Value.Unit : null;
            return unit == Unit.Ampere ? ReadingQuantity.Current : unit == Unit.Ohm ? ReadingQuantity.Resistance : ReadingQuantity.Voltage;
        }

        var name = text.Replace('_', ' ').ToLowerInvariant();
        foreach (var quantity in Enum.GetValues<ReadingQuantity>())
        {
            if (quantity.Name() == name) return quantity;
        }

        var known = Enum.GetValues<ReadingQuantity>().Select(q => q.Name()).ToList();
        Faults.Add(new TextFault($"quantity {TextFault.Quote(text)}", string.Join(", ", known), NearMiss.Suggest(name, known)));
        return null;
    }

    private double Value(string text, ReadingQuantity quantity, string unitText)
    {
        if (IsOverRange(text))
        {
            Faults.Add(new TextFault($"{TextFault.Quote(text)}, the meter's over-range mark", "a number",
                "read again on a higher range, or leave the row out: an over-range display is no value"));
            return double.NaN;
        }

        var value = Quantity(text, quantity.Unit(), unitText);
        if (value.Fault is { } fault) Faults.Add(fault);
        else if (ReadingCheck.Size(quantity, value.Value) is { } absurd) Faults.Add(absurd);
        else return value.Value;
        return double.NaN;
    }

    private double? Optional(string text, string field, ReadingQuantity quantity, string unitText)
    {
        if (text.Length == 0) return null;
        var value = Quantity(text, quantity.Unit(), unitText);
        if (value.Fault is { } fault) Faults.Add(fault with { Read = $"{field}: {fault.Read}" });
        else if (!(value.Value > 0)) Faults.Add(new TextFault($"{field} {TextFault.Quote(text)}", "a value above zero"));
        else return value.Value;
        return null;
    }

    private double? Uncertainty(string text, ReadingQuantity quantity, string unitText, double value)
    {
        if (!text.EndsWith('%')) return Optional(text.TrimStart('\u00B1').Trim(), "uncertainty", quantity, unitText);
        var share = QuantityText.Number(text[..^1].TrimStart('\u00B1'), Unit.One);
        if (share.Fault is { } fault) Faults.Add(fault with { Read = $"uncertainty: {fault.Read}" });
        else if (!(share.Value > 0 && share.Value < 100 && value != 0)) Faults.Add(new TextFault($"uncertainty {TextFault.Quote(text)}", "more than 0 % and less than 100 % of a value that is not zero"));
        else return Math.Abs(value) * share.Value / 100;
        return null;
    }

    /// <summary>A quantity whose unit may stand in the cell, which then counts, or in the unit column or header.</summary>
    private Parsed<double> Quantity(string text, Unit unit, string unitText)
    {
        if (unitText.Length == 0) return QuantityText.Number(text, unit);
        var column = UnitOf(unitText);
        if (column.Fault is not null) return column.Fault;
        if (column.Value.Unit is { } other && other != unit) return new TextFault($"unit {TextFault.Quote(unitText)}", $"a unit in {unit.Symbol}");
        var together = QuantityText.Number($"{text} {unitText}", unit);
        return together.IsValue ? together : QuantityText.Number(text, unit) is { IsValue: true } alone ? alone : together;
    }

    private Parsed<(double Factor, Unit? Unit)> UnitOf(string text)
    {
        if (units.TryGetValue(text, out var known)) return known;
        var read = text is "1" or "-" ? (1, Unit.One) : QuantityText.UnitWithPrefix(text);
        if (units.Count < 1000) units[text] = read;
        return read;
    }

    private DateTimeOffset? TimeOf(string text)
    {
        if (text.Length == 0) return null;
        const DateTimeStyles styles = DateTimeStyles.AssumeUniversal | DateTimeStyles.AllowWhiteSpaces;
        if (DateTimeOffset.TryParse(text, CultureInfo.InvariantCulture, styles, out var time)) return time;
        Remarks.Add(new TextFault($"time {TextFault.Quote(text)} is not kept", "a time such as 2026-03-14 09:26"));
        return null;
    }

    private static bool IsOverRange(string text)
    {
        var mark = text.TrimStart('+', '-', '\u2212').Trim().TrimEnd('.').Replace(" ", "", StringComparison.Ordinal).ToUpperInvariant();
        return mark is "OL" or "O.L" or "0L" or "0.L" or ".OL" or "OVL" or "OVLD" or "OVER" or "OVERLOAD" or "OVERRANGE" or "OVERFLOW" or "OVRNG" or "OVF"
            || (text.Length >= 2 && text.All(c => c is '-' or '\u2212' or '_')) || text is "1---" or "1 ---" or "-1---";
    }

    private sealed record Setting(ImmutableArray<int> Lines, Condition? Condition, Meter? Meter, bool IsMeterNamed, DateTimeOffset? Time, string? Note);
}
