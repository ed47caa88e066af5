using BenchCheck.Core.Boards;
using BenchCheck.Core.Metering;

namespace BenchCheck.Benchmarks.Scoreboard.Physics;

/// <summary>A place where a reading can be taken.</summary>
public readonly record struct Place(string Condition, ReadingQuantity Quantity, string At, string Against);

/// <summary>True values at the places of a board, with the meter on it; a condition is solved once without the meter and again, from there, with it.</summary>
public sealed class TruthBench(PhysicalBoard board, Meter meter, TruthSolver solver)
{
    /// <summary>An ohmmeter drives its current up to about this voltage into open leads, softly, and so far above full scale that it shows in no reading.</summary>
    private const double OpenVolts = 3;

    private const double OpenSlope = 0.05;
    private const double OpenOhms = 1;

    private readonly Dictionary<string, TruthSolution> bare = [];

    /// <summary>Places where the solver did not meet its limits.</summary>
    public int Failures { get; private set; }

    /// <summary>The value that an ideal meter with this one's loading would show; positive infinity beyond an ohmmeter's highest range.</summary>
    public double Value(Place place)
    {
        var unloaded = Bare(place.Condition);
        var circuit = unloaded.Circuit;
        var (a, b) = (circuit.Find(place.At)!.Value, circuit.Find(place.Against)!.Value);
        if (place.Quantity == ReadingQuantity.Voltage)
            return Counted(solver.Solve(circuit, new Load(a, b, 1 / meter.InputOhms, 0), unloaded)).Between(a, b);

        var function = meter.FunctionFor(place.Quantity)!;
        foreach (var range in function.Ranges)
        {
            var amperes = function.TestVolts / range;
            var driven = board.Circuit(board.Design.FindCondition(place.Condition)!);
            driven.AddDiode(a, b, new Junction(amperes, OpenVolts, OpenSlope), OpenOhms);
            var solution = solver.Solve(driven, new Load(a, b, 0, amperes));
            var ohms = solution.Between(a, b) / amperes;

            // Beyond full scale the range shows nothing, whether or not the board stands still there: two floating transistors can latch.
            if (Math.Abs(ohms) > range) continue;
            Counted(solution);
            return ohms;
        }

        return double.PositiveInfinity;
    }

    /// <summary>The condition solved without a meter.</summary>
    public TruthSolution Bare(string condition)
    {
        if (!bare.TryGetValue(condition, out var solution))
            bare[condition] = solution = Counted(solver.Solve(board.Circuit(board.Design.FindCondition(condition)!), Load.None));
        return solution;
    }

    private TruthSolution Counted(TruthSolution solution)
    {
        if (!solution.IsSolved) Failures++;
        return solution;
    }

    /// <summary>Every node against the reference in every DC condition with supplies; resistances between nodes that share a part in the others.</summary>
    public static IEnumerable<Place> Places(Board design)
    {
        foreach (var condition in design.Conditions.Where(c => !c.IsSmallSignal))
        {
            if (!condition.SuppliesRemoved)
            {
                foreach (var node in design.Nodes.Skip(1)) yield return new Place(condition.Name, ReadingQuantity.Voltage, node, design.Reference);
                continue;
            }

            foreach (var (a, b) in Neighbours(design)) yield return new Place(condition.Name, ReadingQuantity.Resistance, a, b);
        }
    }

    /// <summary>Pairs of nodes that share a part, the reference second.</summary>
    public static IEnumerable<(string A, string B)> Neighbours(Board design) =>
        design.Parts.Where(p => p is not (Supply or CurrentSource))
            .SelectMany(p => p.Nodes.SelectMany((a, i) => p.Nodes.Skip(i + 1).Select(b => (a, b)))).Where(x => x.a != x.b)
            .Select(x => string.CompareOrdinal(x.a, x.b) < 0 && x.a != design.Reference || x.b == design.Reference ? x : (a: x.b, b: x.a)).Distinct();
}
