using BenchCheck.Benchmarks.Scoreboard.Faults;
using BenchCheck.Core.Boards;
using BenchCheck.Core.Diagnosis;

namespace BenchCheck.Benchmarks.Scoreboard.Scoring;

/// <summary>When two names mean one and the same thing done to the board.</summary>
/// <remarks>
/// A short by any name is the two nodes that it joins. A two-pin part is open whichever of its joints is. A bad joint of a resistor is a resistance
/// of another value. An open base-emitter junction is an emitter that leads nowhere.
/// </remarks>
public static class FaultIdentity
{
    /// <summary>Same kind and place, to the letter.</summary>
    public static bool IsExact(TruthFault a, TruthFault b)
    {
        ArgumentNullException.ThrowIfNull(a);
        ArgumentNullException.ThrowIfNull(b);
        return a.Kind == b.Kind && a.Row == b.Row && a.Parts.ToHashSet().SetEquals(b.Parts) && a.Nodes.ToHashSet().SetEquals(b.Nodes) && PinsAgree(a, b);
    }

    /// <summary>The same alteration of the board.</summary>
    public static bool IsSame(Board board, TruthFault a, TruthFault b) => Key(board, a) == Key(board, b) && (a.Kind != FaultKind.PinsExchanged || PinsAgree(a, b));

    /// <summary>True when either does not say which pins.</summary>
    private static bool PinsAgree(TruthFault a, TruthFault b) => a.Pins.IsEmpty || b.Pins.IsEmpty || a.Pins.ToHashSet().SetEquals(b.Pins);

    private static string Key(Board board, TruthFault fault)
    {
        var part = fault.Parts.IsEmpty ? null : board.Find(fault.Parts[0]);
        return (fault.Kind, part) switch
        {
            (FaultKind.ReadingError, _) => $"row {fault.Row}",
            (FaultKind.Bridge, _) => Join(fault.Nodes[0], fault.Nodes[1]),
            (FaultKind.Shorted, { Nodes.Length: 2 }) => Join(part.Nodes[0], part.Nodes[1]),
            (FaultKind.BaseEmitterShort, { }) => Join(part.Nodes[1], part.Nodes[2]),
            (FaultKind.CollectorEmitterShort, { }) => Join(part.Nodes[0], part.Nodes[2]),
            (FaultKind.CollectorBaseShort, { }) => Join(part.Nodes[0], part.Nodes[1]),
            (FaultKind.BaseEmitterOpen, Transistor q) => $"open {q.JointName(Transistor.Emitter)}",
            (FaultKind.Open, { Nodes.Length: 2 }) => $"open {part.Designator}",
            (FaultKind.Open, { }) => $"open {string.Join(' ', fault.Pins)}",
            (FaultKind.HighResistanceJoint, Resistor or Inductor or Jumper) => $"value {part.Designator}",
            (FaultKind.HighResistanceJoint, { Nodes.Length: 2 }) => $"joint {part.Designator}",
            (FaultKind.HighResistanceJoint, { }) => $"joint {string.Join(' ', fault.Pins)}",
            (FaultKind.WrongValue, { }) => $"value {part.Designator}",
            _ => $"{fault.Kind} {string.Join(' ', fault.Parts.Order(StringComparer.Ordinal))}",
        };
    }

    private static string Join(string a, string b) => string.CompareOrdinal(a, b) < 0 ? $"join {a} {b}" : $"join {b} {a}";
}
