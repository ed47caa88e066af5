using BenchCheck.Core.Boards;
using BenchCheck.Core.Quantities;

namespace BenchCheck.Core.Diagnosis.Faults;

/// <summary>Potentiometers and op-amps.</summary>
internal static class OtherPartFaults
{
    public static IEnumerable<FaultHypothesis> Of(Board board)
    {
        foreach (var pot in board.Parts.OfType<Potentiometer>())
        {
            for (var pin = 0; pin < 3; pin++)
            {
                yield return new FaultHypothesis(
                    new FaultName(FaultKind.Open, $"{pot.Designator}'s {pot.Kind.Pins[pin]} joint open") { Parts = [pot.Designator], Pins = [pot.JointName(pin)] },
                    Alteration.OpenPin(board, pot, pin));
            }

            yield return new FaultHypothesis(
                new FaultName(FaultKind.PinsExchanged, $"{pot.Designator} with its ends exchanged") { Parts = [pot.Designator], Pins = [pot.JointName(0), pot.JointName(2)] },
                board.With([Alteration.Exchange(pot, 0, 2)], []));
            if (pot.Ohms.IsUnknown) continue;
            yield return new FaultHypothesis(
                new FaultName(FaultKind.WrongValue, $"{pot.Designator} of another value") { Parts = [pot.Designator] },
                board.With([pot with { Ohms = Nominal.Between(pot.Ohms.Value / 20, pot.Ohms.Value * 20) }], []),
                new FreeNumber(pot.Designator, ParameterKind.Resistance, pot.Ohms.Value));
        }

        foreach (var amp in board.Parts.OfType<OpAmp>())
        {
            yield return Stuck(board, amp, 3, "high");
            yield return Stuck(board, amp, 4, "low");
            for (var pin = 0; pin < 3; pin++)
            {
                yield return new FaultHypothesis(
                    new FaultName(FaultKind.Open, $"{amp.Designator}'s {amp.Kind.Pins[pin]} joint open") { Parts = [amp.Designator], Pins = [amp.JointName(pin)] },
                    Alteration.OpenPin(board, amp, pin));
            }

            yield return new FaultHypothesis(
                new FaultName(FaultKind.PinsExchanged, $"{amp.Designator} with its inputs exchanged") { Parts = [amp.Designator], Pins = [amp.JointName(0), amp.JointName(1)] },
                board.With([Alteration.Exchange(amp, 0, 1)], []));
        }
    }

    /// <summary>The output hangs near one supply pin, through a few tens of ohms, whatever the inputs do.</summary>
    private static FaultHypothesis Stuck(Board board, OpAmp amp, int pin, string side)
    {
        var output = new Supply(amp.Designator, [amp.Nodes[2], amp.Nodes[pin]], Nominal.Within(pin == 3 ? -0.7 : 0.7, Tolerance.Absolute(0.8)), Nominal.Exactly(50));
        return new FaultHypothesis(
            new FaultName(FaultKind.StuckOutput, $"{amp.Designator}'s output stuck {side}") { Parts = [amp.Designator] }, board.With([output], []));
    }
}
