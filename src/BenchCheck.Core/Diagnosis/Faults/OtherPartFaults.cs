using BenchCheck.Core.Boards;
using BenchCheck.Core.Quantities;

namespace BenchCheck.Core.Diagnosis.Faults;

/// <summary>Potentiometers, op-amps, MOSFETs and regulators.</summary>
internal static class OtherPartFaults
{
    public static IEnumerable<FaultHypothesis> Of(Board board)
    {
        foreach (var pot in board.Parts.OfType<Potentiometer>())
        {
            foreach (var open in OpenJoints(board, pot)) yield return open;
            yield return new FaultHypothesis(
                new FaultName(FaultKind.PinsExchanged, $"{pot.Designator} with its ends exchanged") { Parts = [pot.Designator], Pins = [pot.JointName(0), pot.JointName(2)] },
                board.With([Alteration.Exchange(pot, 0, 2)], []));
            if (pot.Ohms.IsUnknown) continue;
            yield return new FaultHypothesis(
                new FaultName(FaultKind.WrongValue, $"{pot.Designator} of another value") { Parts = [pot.Designator] },
                board.With([pot with { Ohms = Nominal.Between(pot.Ohms.Value / 20, pot.Ohms.Value * 20) }], []),
                new FreeNumber(pot.Designator, ParameterKind.Resistance, pot.Ohms.Value));
        }

        foreach (var q in board.Parts.OfType<Mosfet>())
        {
            foreach (var open in OpenJoints(board, q)) yield return open;
            foreach (var (pin, other) in new[] { (Mosfet.Drain, Mosfet.Source), (Mosfet.Gate, Mosfet.Source), (Mosfet.Drain, Mosfet.Gate) })
            {
                yield return new FaultHypothesis(
                    new FaultName(FaultKind.PinsExchanged, $"{q.Designator} with {q.Kind.Pins[pin]} and {q.Kind.Pins[other]} exchanged")
                    {
                        Parts = [q.Designator], Pins = [q.JointName(pin), q.JointName(other)],
                    },
                    board.With([Alteration.Exchange(q, pin, other)], []));
            }

            var opposite = q.IsNChannel ? Mosfet.PChannel : Mosfet.NChannel;
            yield return new FaultHypothesis(
                new FaultName(FaultKind.WrongType, $"{q.Designator} is of the other channel, {opposite.Name}") { Parts = [q.Designator] },
                board.With([new Mosfet(opposite, q.Designator, q.Nodes, q.OnOhms, q.Threshold) { Siemens = q.Siemens }], []));
        }

        foreach (var u in board.Parts.OfType<Regulator>())
        {
            foreach (var open in OpenJoints(board, u)) yield return open;
            yield return new FaultHypothesis(
                new FaultName(FaultKind.PinsExchanged, $"{u.Designator} with input and output exchanged")
                {
                    Parts = [u.Designator], Pins = [u.JointName(Regulator.Input), u.JointName(Regulator.Output)],
                },
                board.With([Alteration.Exchange(u, Regulator.Input, Regulator.Output)], []));
            if (u.Volts.IsUnknown) continue;
            yield return new FaultHypothesis(
                new FaultName(FaultKind.WrongValue, $"{u.Designator} of another voltage") { Parts = [u.Designator] },
                board.With([u with { Volts = Nominal.Within(u.Volts.Value, Tolerance.Percent(80)) }], []),
                new FreeNumber(u.Designator, ParameterKind.Voltage, u.Volts.Value));
        }

        foreach (var amp in board.Parts.OfType<OpAmp>())
        {
            yield return Stuck(board, amp, 3, "high");
            yield return Stuck(board, amp, 4, "low");
            foreach (var open in OpenJoints(board, amp).Take(3)) yield return open;
            yield return new FaultHypothesis(
                new FaultName(FaultKind.PinsExchanged, $"{amp.Designator} with its inputs exchanged") { Parts = [amp.Designator], Pins = [amp.JointName(0), amp.JointName(1)] },
                board.With([Alteration.Exchange(amp, 0, 1)], []));
        }
    }

    private static IEnumerable<FaultHypothesis> OpenJoints(Board board, Part part) => Enumerable.Range(0, part.Nodes.Length).Select(pin => new FaultHypothesis(
        new FaultName(FaultKind.Open, $"{part.Designator}'s {part.Kind.Pins[pin]} joint open") { Parts = [part.Designator], Pins = [part.JointName(pin)] },
        Alteration.OpenPin(board, part, pin)));

    /// <summary>The output hangs near one supply pin, through a few tens of ohms, whatever the inputs do.</summary>
    private static FaultHypothesis Stuck(Board board, OpAmp amp, int pin, string side)
    {
        var output = new Supply(amp.Designator, [amp.Nodes[2], amp.Nodes[pin]], Nominal.Within(pin == 3 ? -0.7 : 0.7, Tolerance.Absolute(0.8)), Nominal.Exactly(50));
        return new FaultHypothesis(
            new FaultName(FaultKind.StuckOutput, $"{amp.Designator}'s output stuck {side}") { Parts = [amp.Designator] }, board.With([output], []));
    }
}
