using System.Globalization;
using System.Text;
using BenchCheck.Core.Boards;
using BenchCheck.Core.Metering;
using BenchCheck.Core.Quantities;

namespace BenchCheck.Benchmarks.Scoreboard.Cases;

/// <summary>Writes a bench down as a board file, so that a case of the scoreboard can be tried by the command line.</summary>
internal static class BoardText
{
    public static string Of(Bench bench)
    {
        var board = bench.Board;
        var text = new StringBuilder();
        text.AppendLine(CultureInfo.InvariantCulture, $"title = \"{board.Title}\"");
        text.AppendLine(CultureInfo.InvariantCulture, $"reference = \"{board.Reference}\"");
        text.AppendLine($"origin = \"{(board.Origin == BoardOrigin.Service ? "service" : "new build")}\"");
        text.AppendLine().AppendLine("[parts]");
        foreach (var part in board.Parts) text.AppendLine(CultureInfo.InvariantCulture, $"{part.Designator} = {{ kind = \"{part.Kind.Name}\", {Keys(part)}pins = {Pins(part)} }}");
        foreach (var condition in board.Conditions) Append(text, condition);
        foreach (var meter in bench.Meters) Append(text, meter);
        return text.ToString();
    }

    private static string Keys(Part part) => part switch
    {
        Resistor r => Key("value", r.Ohms, Unit.Ohm),
        Jumper j => Key("value", j.Ohms, Unit.Ohm),
        Potentiometer p => Key("value", p.Ohms, Unit.Ohm) + Key("position", p.Position, Unit.One),
        Inductor l => Key("value", l.Henries, Unit.Henry) + Key("resistance", l.WindingOhms, Unit.Ohm),
        Capacitor c => Key("value", c.Farads, Unit.Farad),
        Supply v => Key("value", v.Volts, Unit.Volt) + (v.SourceOhms is { } ohms ? Key("resistance", ohms, Unit.Ohm) : ""),
        CurrentSource i => Key("value", i.Amperes, Unit.Ampere),
        Switch s => $"state = \"{(s.IsClosed ? Switch.Closed : Switch.Open)}\", ",
        Diode d => Key("drop", d.Drop, Unit.Volt) + (d.Breakdown is { } breakdown ? Key("breakdown", breakdown, Unit.Volt) : ""),
        Transistor q => Key("gain", q.Gain, Unit.One) + Key("drop", q.Drop, Unit.Volt) + Key("saturation", q.Saturation, Unit.Volt),
        _ => throw new NotSupportedException($"{part.Designator}: no {part.Kind.Name} is written here"),
    };

    private static string Key(string key, Nominal nominal, Unit unit) => $"{key} = \"{Text(nominal, unit)}\", ";

    /// <summary>"4700 Ω ± 235 Ω", or "80..320" for a range.</summary>
    private static string Text(Nominal nominal, Unit unit)
    {
        if (nominal.IsUnknown) return "?";
        var symbol = unit == Unit.One ? "" : $" {unit.Symbol}";
        var isRange = Math.Abs(nominal.Value - (nominal.Low + nominal.High) / 2) > 1e-9 * Math.Abs(nominal.Value);
        return isRange ? $"{Number(nominal.Low)}..{Number(nominal.High)}{symbol}" : $"{Number(nominal.Value)}{symbol} ± {Number((nominal.High - nominal.Low) / 2)}{symbol}";
    }

    private static string Pins(Part part) => part.Kind.IsSymmetric
        ? $"[{string.Join(", ", part.Nodes.Select(n => $"\"{n}\""))}]"
        : $"{{ {string.Join(", ", part.Kind.Pins.Select((pin, i) => $"{pin} = \"{part.Nodes[i]}\""))} }}";

    private static void Append(StringBuilder text, Condition condition)
    {
        text.AppendLine().AppendLine(CultureInfo.InvariantCulture, $"[conditions.\"{condition.Name}\"]");
        if (condition.SuppliesRemoved) text.AppendLine("supplies = \"removed\"");
        if (!condition.Set.IsEmpty) text.AppendLine($"set = {{ {string.Join(", ", condition.Set.Select(s => $"{s.Key} = \"{Text(s.Value, Unit.Volt)}\""))} }}");
        if (!condition.Switches.IsEmpty) text.AppendLine($"switches = {{ {string.Join(", ", condition.Switches.Select(s => $"{s.Key} = \"{s.Value}\""))} }}");
    }

    private static void Append(StringBuilder text, Meter meter)
    {
        text.AppendLine().AppendLine(CultureInfo.InvariantCulture, $"[meters.\"{meter.Name}\"]");
        text.AppendLine($"input_resistance = \"{Number(meter.InputOhms)}\"").AppendLine(CultureInfo.InvariantCulture, $"counts = {meter.FullScaleCounts}");
        Append(text, "voltage", meter.Voltage, Unit.Volt);
        Append(text, "current", meter.Current, Unit.Ampere);
        Append(text, "resistance", meter.Resistance, Unit.Ohm);
    }

    private static void Append(StringBuilder text, string key, MeterFunction? function, Unit unit)
    {
        if (function is null) return;
        var ranges = string.Join(", ", function.Ranges.Select(r => $"\"{Number(r)} {unit.Symbol}\""));
        text.AppendLine($"{key} = {{ accuracy = \"{Number(function.ReadingFraction * 100)}% + {Number(function.Counts)} counts\", ranges = [{ranges}] }}");
    }

    /// <summary>Plain digits without an exponent, and without the last bits of binary arithmetic.</summary>
    private static string Number(double value) =>
        decimal.Parse(value.ToString("E9", CultureInfo.InvariantCulture), NumberStyles.Float, CultureInfo.InvariantCulture).ToString("0.####################", CultureInfo.InvariantCulture);
}
