using System.Collections.Immutable;
using BenchCheck.Benchmarks.Scoreboard.Physics;
using BenchCheck.Core.Diagnosis;

namespace BenchCheck.Benchmarks.Scoreboard.Faults;

/// <summary>What a fault of the board does to a specimen.</summary>
public static class FaultEffect
{
    /// <summary>Resistance of a short or a bridge on a board of middle values.</summary>
    private const double ShortOhms = 0.05;

    private static readonly (int, int)[] PinPairs = [(0, 2), (1, 2), (0, 1)];

    /// <summary>
    /// Every specimen that the fault may mean: one, or several where its name leaves open which pins are exchanged or how a supply is missing.
    /// Empty for a fault that is none of the board (a reading error, "none", "unexplained").
    /// </summary>
    public static IEnumerable<PhysicalBoard> On(PhysicalBoard board, TruthFault fault)
    {
        switch (fault.Kind)
        {
            case FaultKind.Open when fault.Pins.IsEmpty:
                return [Lifted(board, fault.Parts[0], 0)];
            case FaultKind.Open:
                return [Lifted(board, PinOf(board, fault.Pins[0]))];
            case FaultKind.HighResistanceJoint when fault.Value is { } ohms:
                return [Jointed(board, fault.Pins.IsEmpty ? (fault.Parts[0], 0) : PinOf(board, fault.Pins[0]), ohms)];
            case FaultKind.Shorted:
                return PairsOf(board.Find(fault.Parts[0])).Select(p => Joined(board, fault.Parts[0], p.Item1, p.Item2));
            case FaultKind.BaseEmitterShort:
                return [Joined(board, fault.Parts[0], 1, 2)];
            case FaultKind.CollectorEmitterShort:
                return [Joined(board, fault.Parts[0], 0, 2)];
            case FaultKind.CollectorBaseShort:
                return [Joined(board, fault.Parts[0], 0, 1)];
            case FaultKind.Bridge:
                return [Joined(board, fault.Nodes[0], fault.Nodes[1])];
            case FaultKind.BaseEmitterOpen:
                return [Lifted(board, fault.Parts[0], 2)];
            case FaultKind.Reversed:
                return [board.With(board.Find(fault.Parts[0]).Exchanged(0, 1))];
            case FaultKind.PinsExchanged:
                return ExchangedPairs(board, fault).Select(p => board.With(board.Find(fault.Parts[0]).Exchanged(p.Item1, p.Item2)));
            case FaultKind.Swapped:
                return Swapped(board, fault);
            case FaultKind.Leaky when fault.Value is { } ohms:
                return [board.Add(new PhysicalResistor($"leak {fault.Parts[0]}", board.Find(fault.Parts[0]).Nodes, ohms))];
            case FaultKind.SupplyMissing:
                return Missing(board, fault.Parts[0]);
            default:
                return Altered(board, fault) is { } part ? [board.With(part)] : [];
        }
    }

    /// <summary>The part as it sits there with the fault, for faults that only change a part's own numbers.</summary>
    private static PhysicalPart? Altered(PhysicalBoard board, TruthFault fault) => (fault.Kind, fault.Parts.IsEmpty ? null : board.Find(fault.Parts[0])) switch
    {
        (FaultKind.WrongValue, PhysicalResistor r) when fault.Value is { } ohms => r with { Ohms = ohms },
        (FaultKind.WrongValue, PhysicalPotentiometer p) when fault.Value is { } ohms => p with { Ohms = ohms },
        (FaultKind.WrongValue, PhysicalDiode { Knee: { } knee } d) when fault.Value is { } volts => d with { Knee = knee with { Volts = volts } },
        (FaultKind.WrongType, PhysicalTransistor q) => q with { IsNpn = !q.IsNpn },
        (FaultKind.GainFarOff, PhysicalTransistor q) when fault.Value is { } gain => q with { ForwardGain = gain },
        (FaultKind.SupplyWrong, PhysicalSource s) when fault.Value is { } volts => s.Changed(v => s.Volts != 0 ? v * volts / s.Volts : volts),
        (FaultKind.SupplyReversed, { } part) => part.Exchanged(0, 1),
        (FaultKind.SwitchPosition, PhysicalSwitch s) => s with { IsFlipped = true },
        _ => null,
    };

    private static IEnumerable<PhysicalBoard> Missing(PhysicalBoard board, string designator) => board.Find(designator) switch
    {
        PhysicalSource source => [Lifted(board, designator, 0), board.With(source.Changed(_ => 0))],
        PhysicalCurrentSource source => [board.With(source with { Amperes = 0 })],
        _ => [],
    };

    private static IEnumerable<PhysicalBoard> Swapped(PhysicalBoard board, TruthFault fault) =>
        (board.Find(fault.Parts[0]), board.Find(fault.Parts[1])) switch
        {
            (PhysicalResistor a, PhysicalResistor b) => [board.With(a with { Ohms = b.Ohms }).With(b with { Ohms = a.Ohms })],
            (PhysicalTransistor a, PhysicalTransistor b) =>
                [board.With(b with { Designator = a.Designator, Nodes = a.Nodes }).With(a with { Designator = b.Designator, Nodes = b.Nodes })],
            _ => [],
        };

    private static PhysicalBoard Joined(PhysicalBoard board, string designator, int pin, int other)
    {
        var nodes = board.Find(designator).Nodes;
        return Joined(board, nodes[pin], nodes[other]);
    }

    private static PhysicalBoard Joined(PhysicalBoard board, string a, string b) =>
        board.Add(new PhysicalResistor($"short {a} {b}", [a, b], ShortOhms));

    private static PhysicalBoard Lifted(PhysicalBoard board, (string Designator, int Pin) joint) => Lifted(board, joint.Designator, joint.Pin);

    private static PhysicalBoard Lifted(PhysicalBoard board, string designator, int pin) =>
        board.With(board.Find(designator).Moved(pin, $"lifted {designator}.{pin}"));

    private static PhysicalBoard Jointed(PhysicalBoard board, (string Designator, int Pin) joint, double ohms)
    {
        var node = board.Find(joint.Designator).Nodes[joint.Pin];
        var lifted = $"lifted {joint.Designator}.{joint.Pin}";
        return Lifted(board, joint).Add(new PhysicalResistor($"joint {joint.Designator}.{joint.Pin}", [node, lifted], ohms));
    }

    private static (int, int)[] PairsOf(PhysicalPart part) => part.Nodes.Length == 2 ? [(0, 1)] : PinPairs;

    private static (int, int)[] ExchangedPairs(PhysicalBoard board, TruthFault fault) =>
        fault.Pins is [var first, var second] ? [(PinOf(board, first).Pin, PinOf(board, second).Pin)] : PairsOf(board.Find(fault.Parts[0]));

    /// <summary>"Q1.base" as part and pin number.</summary>
    private static (string Designator, int Pin) PinOf(PhysicalBoard board, string joint)
    {
        var dot = joint.LastIndexOf('.');
        var designator = joint[..dot];
        return (designator, board.Design.Find(designator)!.Kind.Pins.IndexOf(joint[(dot + 1)..]));
    }
}
