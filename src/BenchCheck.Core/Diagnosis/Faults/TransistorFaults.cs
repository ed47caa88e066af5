using BenchCheck.Core.Boards;
using BenchCheck.Core.Quantities;

namespace BenchCheck.Core.Diagnosis.Faults;

/// <summary>Bipolar transistors: open pins and junctions, bad joints, exchanged pins, the other polarity, a gain far off.</summary>
internal static class TransistorFaults
{
    public static IEnumerable<FaultHypothesis> Of(Board board)
    {
        foreach (var q in board.Parts.OfType<Transistor>())
        {
            for (var pin = 0; pin < 3; pin++)
            {
                yield return new FaultHypothesis(
                    Name(FaultKind.Open, $"{q.Designator}'s {q.Kind.Pins[pin]} joint open", q, pin), Alteration.OpenPin(board, q, pin));
                var (altered, free) = Alteration.BadJoint(board, q, pin);
                yield return new FaultHypothesis(
                    Name(FaultKind.HighResistanceJoint, $"{q.JointName(pin)} joint of high resistance", q, pin), altered, free);
            }

            // What is left of the transistor is its base-collector diode.
            yield return new FaultHypothesis(
                Name(FaultKind.BaseEmitterOpen, $"{q.Designator} base-emitter open", q), Alteration.OpenPin(board, q, Transistor.Emitter));
            foreach (var (pin, other) in new[] { (Transistor.Collector, Transistor.Emitter), (Transistor.Base, Transistor.Emitter), (Transistor.Collector, Transistor.Base) })
            {
                yield return new FaultHypothesis(
                    Name(FaultKind.PinsExchanged, $"{q.Designator} with {q.Kind.Pins[pin]} and {q.Kind.Pins[other]} exchanged", q) with { Pins = [q.JointName(pin), q.JointName(other)] },
                    board.With([Alteration.Exchange(q, pin, other)], []));
            }

            var opposite = q.IsNpn ? Transistor.Pnp : Transistor.Npn;
            yield return new FaultHypothesis(
                Name(FaultKind.WrongType, $"{q.Designator} is {Article(opposite)} {opposite.Name} type", q),
                board.With([new Transistor(opposite, q.Designator, q.Nodes, q.Gain, q.Drop, q.Saturation) { OutputOhms = q.OutputOhms }], []));

            if (q.Gain.IsUnknown) continue;
            yield return FarOff(board, q, Nominal.Between(Math.Min(1, q.Gain.Low / 2), q.Gain.Low), "low");
            yield return FarOff(board, q, Nominal.Between(q.Gain.High, q.Gain.High * 10), "high");
        }
    }

    private static FaultHypothesis FarOff(Board board, Transistor q, Nominal gain, string side) => new(
        Name(FaultKind.GainFarOff, $"{q.Designator}'s gain far too {side}", q), board.With([q with { Gain = gain }], []),
        new FreeNumber(q.Designator, ParameterKind.Gain, q.Gain.Value));

    private static FaultName Name(string kind, string text, Transistor q, int pin = -1) =>
        new(kind, text) { Parts = [q.Designator], Pins = pin < 0 ? [] : [q.JointName(pin)] };

    private static string Article(PartKind kind) => ReferenceEquals(kind, Transistor.Npn) ? "an" : "a";
}
