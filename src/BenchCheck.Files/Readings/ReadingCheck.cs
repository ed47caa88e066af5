using BenchCheck.Core.Boards;
using BenchCheck.Core.Metering;
using BenchCheck.Core.Quantities;

namespace BenchCheck.Files;

/// <summary>Checks one reading against the bench: place, condition, meter and size must suit the quantity.</summary>
internal sealed class ReadingCheck(BoardNames names)
{
    /// <summary>Resolves where the reading was taken; for a current a part or pin, else two nodes.</summary>
    public Parsed<(string At, string? Against)> Place(ReadingQuantity quantity, string at, string against)
    {
        if (at.Length == 0) return new TextFault("no place in column at", quantity == ReadingQuantity.Current ? "a part (R3) or a pin (Q1.base)" : "a node");
        if (quantity is ReadingQuantity.Current or ReadingQuantity.CurrentGain)
        {
            var joint = names.Joint(at);
            if (joint.Fault is not null) return joint.Fault;
            if (against.Length == 0) return (joint.Value, null);
            if (quantity == ReadingQuantity.Current)
                return new TextFault($"a current against {TextFault.Quote(against)}", "no entry in column against", "a current is read at one part or pin");
            var input = names.Joint(against);
            return input.Fault is not null ? input.Fault : (joint.Value, input.Value);
        }

        var node = names.Node(at);
        if (node.Fault is { } unknown)
            return names.Joint(at).IsValue && quantity == ReadingQuantity.Voltage ? unknown with { Hint = "for a current through it write quantity current" } : unknown;
        if (quantity == ReadingQuantity.Gain && against.Length == 0) return new TextFault("a gain with nothing in column against", "the node that it is counted from");
        var other = against.Length == 0 ? names.Board.Reference : names.Node(against);
        if (other.Fault is not null) return other.Fault;
        return node.Value == other.Value
            ? new TextFault($"{node.Value} against itself", "two different nodes")
            : (node.Value, other.Value);
    }

    /// <summary>Why a quantity cannot be read in a condition; null when it can.</summary>
    public TextFault? Condition(ReadingQuantity quantity, Condition condition) => quantity switch
    {
        ReadingQuantity.Resistance when !condition.SuppliesRemoved =>
            new TextFault($"a resistance in condition {condition.Name}, in which the supplies are on", "a condition with supplies = \"removed\"",
                names.Board.Conditions.FirstOrDefault(c => c.SuppliesRemoved) is { } unpowered
                    ? $"write {unpowered.Name} in column condition, and take it with the supplies off and the capacitors discharged"
                    : "add [conditions.unpowered] with supplies = \"removed\" to the board file; ohmmeters are for boards without power"),
        ReadingQuantity.Gain or ReadingQuantity.CurrentGain or ReadingQuantity.InputResistance or ReadingQuantity.OutputResistance when !condition.IsSmallSignal =>
            new TextFault($"{quantity.Name()} in condition {condition.Name}", "a small-signal condition",
                names.Board.Conditions.FirstOrDefault(c => c.IsSmallSignal) is { } signal
                    ? $"write {signal.Name} in column condition"
                    : "add a condition with kind = \"small-signal\" and its operating_point to the board file"),
        ReadingQuantity.Voltage or ReadingQuantity.Current when condition is { IsSmallSignal: true, Drive: not { Volts: not null } } =>
            new TextFault($"{quantity.Name()} in the small-signal condition {condition.Name}", "a generator whose voltage is known",
                $"state it in the board file, drive = {{ at = \"…\", value = \"10 mV\" }}, or read a gain"),
        _ => null,
    };

    /// <summary>Why a gain cannot be counted from there; null when it can.</summary>
    public TextFault? Input(ReadingQuantity quantity, string? against, Condition condition)
    {
        if (quantity == ReadingQuantity.CurrentGain && against is null && condition.Drive is null)
            return new TextFault("a current gain with nothing in column against", "the part or pin that carries the input current",
                "or a drive in the condition, whose current is then meant");
        return quantity == ReadingQuantity.Gain && BoardStructure.AreStill(names.Board, against!, names.Board.Reference)
            ? new TextFault($"a gain counted from {against}", "a node that carries the signal", "supplies hold this one still")
            : null;
    }

    /// <summary>Why a meter cannot have given the reading; null when it can, or when the uncertainty is stated.</summary>
    public static TextFault? Meter(ReadingQuantity quantity, Condition condition, Meter meter, double? uncertainty) =>
        uncertainty is not null || (condition.IsSmallSignal && quantity == ReadingQuantity.Voltage ? meter.AlternatingVoltage : meter.FunctionFor(quantity)) is not null
            ? null
            : new TextFault($"{quantity.Name()} with meter {meter.Name}, whose accuracy for it is not stated", "a meter with that function",
                "describe it in the board file, or state the standard uncertainty in column uncertainty");

    /// <summary>Why a value is impossible at a bench; null when it is not.</summary>
    public static TextFault? Size(ReadingQuantity quantity, double value)
    {
        var (low, high) = quantity switch
        {
            ReadingQuantity.Voltage => (-10e3, 10e3),
            ReadingQuantity.Current => (-1e3, 1e3),
            ReadingQuantity.Gain or ReadingQuantity.CurrentGain => (-1e9, 1e9),

            // An ohmmeter zeroed with other leads may show a little less than nothing.
            _ => (-1, 1e12),
        };
        var unit = quantity.Unit();
        return value >= low && value <= high
            ? null
            : new TextFault($"{quantity.Name()} of {EngineeringNotation.Format(value, unit)}", EngineeringNotation.Range(low, high, unit), "M is mega, m is milli");
    }
}
