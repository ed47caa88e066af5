using System.Collections.Immutable;
using System.Globalization;
using System.Text.RegularExpressions;
using BenchCheck.Core.Metering;
using BenchCheck.Core.Quantities;

namespace BenchCheck.Files;

/// <summary>Reads the meters of a board file.</summary>
internal sealed partial class MeterReader(ProblemList problems, Assumptions assumptions)
{
    private const string AccuracyForm = "accuracy = \"0.5% + 2 counts\"";

    public ImmutableArray<Meter> Read(TomlTable meters)
    {
        var read = ImmutableArray.CreateBuilder<Meter>();
        foreach (var entry in meters.Entries)
        {
            if (entry.Value is TomlTable inner && entry.Key.Trim().Length > 0 && TextFault.Quote(entry.Key).Length == entry.Key.Length + 2)
                read.Add(ReadOne(new TableReader(inner, $"meter {entry.Key}", problems), entry.Key));
            else
                problems.Error(entry.Place, $"meter {TextFault.Quote(entry.Key)} is {entry.Value.Describe}", "a table with a printable name: [meters.handheld]");
        }

        return read.ToImmutable();
    }

    private Meter ReadOne(TableReader table, string name)
    {
        var input = ReadInput(table, name);
        var counts = ReadCounts(table, name);
        var voltage = ReadFunction(table, "voltage", Unit.Volt, Limits.PositiveVolts);
        var alternating = ReadFunction(table, "ac_voltage", Unit.Volt, Limits.PositiveVolts);
        var current = ReadFunction(table, "current", Unit.Ampere, new Limits(1e-12, 1e4, Unit.Ampere, true));
        var resistance = ReadFunction(table, "resistance", Unit.Ohm, new Limits(1e-3, 1e15, Unit.Ohm, true));
        table.Take("note");
        table.Finish();
        if (voltage is null && alternating is null && current is null && resistance is null && !table.Problems.HasErrors)
            problems.Warning(table.Place, $"meter {name} has no function", "voltage, ac_voltage, current or resistance with its accuracy");
        return new Meter(name, input, counts, voltage, current, resistance) { AlternatingVoltage = alternating };
    }

    private double ReadInput(TableReader table, string name)
    {
        const double usual = 10e6;
        if (table.Take("input_resistance") is not { } entry)
        {
            assumptions.Add($"meter {name}", "no input resistance stated, 10 MΩ taken");
            return usual;
        }

        if (entry.Value is TomlText { Text: "infinite" or "inf" or "Infinity" or "\u221E" }) return double.PositiveInfinity;
        return table.TakeNumber("input_resistance", Unit.Ohm, Limits.InputResistance with { Hint = "\"infinite\" for a meter that does not load" }) ?? usual;
    }

    private int ReadCounts(TableReader table, string name)
    {
        if (table.Take("counts") is null)
        {
            assumptions.Add($"meter {name}", string.Create(CultureInfo.InvariantCulture, $"no counts stated, {Meter.Usual.FullScaleCounts} taken"));
            return Meter.Usual.FullScaleCounts;
        }

        var counts = table.TakeNumber("counts", Unit.One, new Limits(100, 1e9, Unit.One, true, "counts at full scale: 6000 for a display to 5.999"));
        return counts is { } stated ? (int)Math.Round(stated) : Meter.Usual.FullScaleCounts;
    }

    private MeterFunction? ReadFunction(TableReader table, string key, Unit unit, Limits limits)
    {
        if (table.TakeTable(key) is not { } inner) return null;
        var reader = new TableReader(inner, $"{table.Subject}: {key}", problems);
        var accuracy = ReadAccuracy(reader);
        var ranges = ReadRanges(reader, unit, limits);
        var burden = unit == Unit.Ampere ? reader.TakeNumber("burden", Unit.Volt, new Limits(0, 50, Unit.Volt, false, "the voltage across the meter at full scale")) : null;
        var test = unit == Unit.Ohm ? reader.TakeNumber("test_voltage", Unit.Volt, new Limits(1e-4, 1e3, Unit.Volt, true)) : null;
        reader.Finish();
        if (accuracy is not { } stated) return null;
        var function = new MeterFunction(stated.Fraction, stated.Counts, ranges) { BurdenVolts = burden ?? 0 };
        return test is { } volts ? function with { TestVolts = volts } : function;
    }

    private (double Fraction, double Counts)? ReadAccuracy(TableReader table)
    {
        if (table.TakeText("accuracy") is not { } text)
        {
            if (table.Take("accuracy") is null) problems.Error(table.Place, $"{table.Subject} has no accuracy", AccuracyForm);
            return null;
        }

        var match = Accuracy().Match(text.Text.Trim().Replace(',', '.'));
        double Part(string group) => match.Groups[group].Success ? double.Parse(match.Groups[group].Value, NumberStyles.Float, CultureInfo.InvariantCulture) : 0;
        var (percent, counts) = (Part("percent"), Part("counts"));
        if (match.Success && match.Length > 0 && percent is >= 0 and < 50 && counts is >= 0 and < 1e6 && percent + counts > 0) return (percent / 100, counts);
        problems.Error(text.Place, $"{table.Subject}: accuracy {TextFault.Quote(text.Text)}", AccuracyForm, "per cent of reading plus counts of the last digit");
        return null;
    }

    private ImmutableArray<double> ReadRanges(TableReader table, Unit unit, Limits limits)
    {
        if (table.TakeTexts("ranges") is not { } texts)
        {
            if (table.Take("ranges") is null) assumptions.Add(table.Subject, "no ranges stated, the resolution is taken as if each reading were at full scale");
            return [];
        }

        var ranges = new List<double>();
        foreach (var text in texts)
        {
            var parsed = QuantityText.Number(text.Text, unit);
            if (parsed.Fault is { } fault) problems.Error(text.Place, $"{table.Subject}: range", fault);
            else if (limits.Check(parsed.Value, parsed.Value, parsed.Value) is { } expected)
                problems.Error(text.Place, $"{table.Subject}: range {TextFault.Quote(text.Text)}", expected, limits.Hint);
            else ranges.Add(parsed.Value);
        }

        return [.. ranges.Distinct().Order()];
    }

    [GeneratedRegex("""^\s*(?:(?:\u00B1|\+/-|\+-)\s*)?\(?\s*(?:(?<percent>\d{1,6}(?:\.\d{1,9})?)\s*%(?:\s*(?:of\s+)?(?:reading|rdg))?)?\s*(?:(?:^|\+|(?<=\())\s*(?<counts>\d{1,6}(?:\.\d{1,3})?)\s*(?:counts?|digits?|dgts?)?)?\s*\)?\s*$""", RegexOptions.IgnoreCase | RegexOptions.CultureInvariant)]
    private static partial Regex Accuracy();
}
