using BenchCheck.Core.Boards;

namespace BenchCheck.Core.Diagnosis.Faults;

/// <summary>Two like parts in each other's place.</summary>
internal static class SwapFaults
{
    /// <summary>Resistors nearer to each other than this factor look alike once exchanged.</summary>
    private const double LeastRatio = 1.15;

    public static IEnumerable<FaultHypothesis> Of(Board board)
    {
        var resistors = board.Parts.OfType<Resistor>().Where(r => !r.Ohms.IsUnknown).ToArray();
        for (var i = 0; i < resistors.Length; i++)
        {
            for (var j = i + 1; j < resistors.Length; j++)
            {
                var (a, b) = (resistors[i], resistors[j]);
                var ratio = a.Ohms.Value / b.Ohms.Value;
                if (ratio < LeastRatio && ratio > 1 / LeastRatio) continue;
                yield return Swap(board, a, b, a with { Ohms = b.Ohms }, b with { Ohms = a.Ohms });
            }
        }

        var transistors = board.Parts.OfType<Transistor>().ToArray();
        for (var i = 0; i < transistors.Length; i++)
        {
            for (var j = i + 1; j < transistors.Length; j++)
            {
                var (a, b) = (transistors[i], transistors[j]);
                if (a.IsNpn == b.IsNpn) continue;
                yield return Swap(
                    board, a, b, new Transistor(b.Kind, a.Designator, a.Nodes, b.Gain, b.Drop, b.Saturation) { OutputOhms = b.OutputOhms },
                    new Transistor(a.Kind, b.Designator, b.Nodes, a.Gain, a.Drop, a.Saturation) { OutputOhms = a.OutputOhms });
            }
        }
    }

    private static FaultHypothesis Swap(Board board, Part a, Part b, Part first, Part second) => new(
        new FaultName(FaultKind.Swapped, $"{a.Designator} and {b.Designator} swapped") { Parts = [a.Designator, b.Designator] },
        board.With([first, second], []));
}
