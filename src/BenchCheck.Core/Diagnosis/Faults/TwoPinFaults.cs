using System.Collections.Immutable;
using BenchCheck.Core.Boards;
using BenchCheck.Core.Quantities;

namespace BenchCheck.Core.Diagnosis.Faults;

/// <summary>Resistors, jumpers, inductors, diodes, capacitors, switches: open, of another value, the wrong way round, leaky.</summary>
/// <remarks>Shorts across them are found with the other shorts between nodes, in <see cref="ShortFaults"/>.</remarks>
internal static class TwoPinFaults
{
    /// <summary>How far off a wrong value may be: this factor either way covers a decade slip and a neighbour alike.</summary>
    private const double WrongValueSpan = 20;

    public static IEnumerable<FaultHypothesis> Of(Board board)
    {
        foreach (var part in board.Parts)
        {
            if (part.Kind.Pins.Length != 2 || part is Supply or CurrentSource or ControlledSource) continue;
            // An open capacitor shows only to small signals.
            if (part is not Switch { IsClosed: false } && (part is not Capacitor || board.Conditions.Any(c => c.IsSmallSignal)))
                yield return new FaultHypothesis(OpenNames(part), Alteration.OpenPin(board, part, 0));
            switch (part)
            {
                case Resistor { Ohms.IsUnknown: false } r:
                    yield return WrongValue(board, r, r.Ohms.Value);
                    break;
                case Diode diode:
                    yield return new FaultHypothesis(
                        new FaultName(FaultKind.Reversed, $"{part.Designator} the wrong way round") { Parts = [part.Designator] },
                        board.With([Alteration.Exchange(part, 0, 1)], []));
                    if (diode.Breakdown is { IsUnknown: false } breakdown)
                    {
                        var other = diode with { Breakdown = Nominal.Between(breakdown.Value / 4, breakdown.Value * 4) };
                        yield return new FaultHypothesis(
                            new FaultName(FaultKind.WrongValue, $"{part.Designator} of another breakdown voltage") { Parts = [part.Designator] },
                            board.With([other], []), new FreeNumber(part.Designator, ParameterKind.Breakdown, breakdown.Value));
                    }

                    break;
                case Capacitor capacitor:
                    if (!capacitor.Farads.IsUnknown && board.Conditions.Any(c => c.Hertz is not null)) yield return WrongCapacitance(board, capacitor);
                    var leak = new Resistor(Alteration.NewName(board, $"leak {part.Designator}"), part.Nodes, Nominal.Between(30, 3e6));
                    yield return new FaultHypothesis(
                        new FaultName(FaultKind.Leaky, $"{part.Designator} leaky") { Parts = [part.Designator] },
                        board.With([], [leak]), new FreeNumber(leak.Designator, ParameterKind.Resistance, double.NaN));
                    break;
                case Switch s:
                    yield return new FaultHypothesis(
                        new FaultName(FaultKind.SwitchPosition, $"{part.Designator} in the other position") { Parts = [part.Designator] },
                        Toggled(board, s));
                    break;
                default:
                    break;
            }

            if (part is Diode or Jumper or Inductor)
            {
                var (altered, free) = Alteration.BadJoint(board, part, 0);
                ImmutableArray<FaultName> names =
                [
                    .. Enumerable.Range(0, 2).Select(pin => new FaultName(FaultKind.HighResistanceJoint, $"{part.JointName(pin)} joint of high resistance")
                    {
                        Parts = [part.Designator], Pins = [part.JointName(pin)],
                    }),
                ];
                yield return new FaultHypothesis(names, altered, free);
            }
        }
    }

    private static ImmutableArray<FaultName> OpenNames(Part part) =>
    [
        new FaultName(FaultKind.Open, $"{part.Designator} open") { Parts = [part.Designator] },
        .. Enumerable.Range(0, 2).Select(pin => new FaultName(FaultKind.Open, $"{part.Designator}'s joint at {part.Nodes[pin]} open")
        {
            Parts = [part.Designator], Pins = [part.JointName(pin)],
        }),
    ];

    private static FaultHypothesis WrongValue(Board board, Resistor r, double ohms)
    {
        var other = r with { Ohms = Nominal.Between(ohms / WrongValueSpan, ohms * WrongValueSpan) };
        return new FaultHypothesis(
            new FaultName(FaultKind.WrongValue, $"{r.Designator} of another value") { Parts = [r.Designator] },
            board.With([other], []), new FreeNumber(r.Designator, ParameterKind.Resistance, ohms));
    }

    /// <summary>Dried out, or another part: it has lost up to all but a thousandth, or holds up to twenty times as much.</summary>
    private static FaultHypothesis WrongCapacitance(Board board, Capacitor c)
    {
        var farads = c.Farads.Value;
        return new FaultHypothesis(
            new FaultName(FaultKind.WrongValue, $"{c.Designator} of another capacitance") { Parts = [c.Designator] },
            board.With([c with { Farads = Nominal.Between(farads / 1000, farads * WrongValueSpan) }], []),
            new FreeNumber(c.Designator, ParameterKind.Capacitance, farads));
    }

    private static Board Toggled(Board board, Switch part)
    {
        var flipped = board.Conditions.Select(c => c.Switches.TryGetValue(part.Designator, out var position)
            ? c with { Switches = c.Switches.SetItem(part.Designator, position == Switch.Open ? Switch.Closed : Switch.Open) }
            : c);
        return board.With([part with { IsClosed = !part.IsClosed }], []).In([.. flipped]);
    }
}
