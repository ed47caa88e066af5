using System.Collections.Immutable;
using BenchCheck.Benchmarks.Scoreboard.Cases;
using BenchCheck.Benchmarks.Scoreboard.Faults;
using BenchCheck.Benchmarks.Scoreboard.Physics;
using BenchCheck.Core.Diagnosis;
using BenchCheck.Core.Metering;

namespace BenchCheck.Benchmarks.Scoreboard.Scoring;

/// <summary>Which suspects cannot be told from the truth by given readings, whatever they are called.</summary>
/// <remarks>
/// Rule: on the board of middle values, solved by the truth solver, the suspect makes every reading come out within one standard uncertainty
/// of the meter of what the true fault makes of it. A suspect's free number may move within a factor three of what was found for it, since
/// it was found on a specimen whose other parts were off too. A misread row is only ever equal to the same misread row.
/// </remarks>
public sealed class Equivalence
{
    private const double Span = 3;
    private const int Trials = 14;

    private static readonly double Golden = (Math.Sqrt(5) - 1) / 2;

    private readonly Bench bench;
    private readonly ImmutableArray<Place> places;
    private readonly ImmutableArray<TruthFault> truth;
    private readonly TruthSolver solver;
    private readonly PhysicalBoard middle;
    private readonly int[] misread;
    private readonly List<double[]> expected;

    public Equivalence(Bench bench, ImmutableArray<Place> places, ImmutableArray<TruthFault> truth, TruthSolver solver)
    {
        ArgumentNullException.ThrowIfNull(bench);
        (this.bench, this.places, this.truth, this.solver) = (bench, places, truth, solver);
        middle = PhysicalBoard.Of(bench.Board, Draw.Middle);
        misread = Misread(truth);
        expected = [.. Boards(truth).Select(Predict)];
    }

    /// <summary>True for the truth itself and for everything that looks the same.</summary>
    public bool Holds(ImmutableArray<TruthFault> suspect)
    {
        if (!Misread(suspect).SequenceEqual(misread)) return false;
        if (suspect.Any(f => f.Kind == FaultKind.Unexplained)) return false;
        var free = suspect.Select((f, i) => (f, i)).FirstOrDefault(x => x.f.Value is > 0, (null!, -1)).i;
        if (Distance(suspect) <= 1) return true;
        return free >= 0 && Least(suspect, free) <= 1;
    }

    private double Least(ImmutableArray<TruthFault> suspect, int free)
    {
        var found = Math.Log(suspect[free].Value!.Value);
        var (low, high) = (found - Math.Log(Span), found + Math.Log(Span));
        var (a, b) = (high - Golden * (high - low), low + Golden * (high - low));
        var (atA, atB) = (At(a), At(b));
        for (var trial = 2; trial < Trials && Math.Min(atA, atB) > 1; trial++)
        {
            if (atA < atB)
            {
                (high, b, atB) = (b, a, atA);
                a = high - Golden * (high - low);
                atA = At(a);
            }
            else
            {
                (low, a, atA) = (a, b, atB);
                b = low + Golden * (high - low);
                atB = At(b);
            }
        }

        return Math.Min(atA, atB);

        double At(double logarithm) => Distance(suspect.SetItem(free, suspect[free] with { Value = Math.Exp(logarithm) }));
    }

    /// <summary>Largest difference from the truth in standard uncertainties of the meter, over the readings that are not misread; the best of the meanings of either.</summary>
    private double Distance(ImmutableArray<TruthFault> suspect)
    {
        var best = double.PositiveInfinity;
        foreach (var values in Boards(suspect).Select(Predict))
        {
            foreach (var target in expected) best = Math.Min(best, Distance(values, target));
        }

        return best;
    }

    private double Distance(double[] values, double[] target)
    {
        var worst = 0.0;
        for (var i = 0; i < values.Length; i++)
        {
            if (misread.Contains(i) || values[i].Equals(target[i])) continue;
            if (!double.IsFinite(target[i]) || !double.IsFinite(values[i])) return double.PositiveInfinity;
            worst = Math.Max(worst, Math.Abs(values[i] - target[i]) / Visibility.MeterUncertainty(bench.Meters[0], places[i].Quantity, target[i]));
        }

        return worst;
    }

    private IEnumerable<PhysicalBoard> Boards(ImmutableArray<TruthFault> faults) => faults
        .Where(f => f.Kind is not (FaultKind.ReadingError or FaultKind.None))
        .Aggregate((IEnumerable<PhysicalBoard>)[middle], (boards, fault) => boards.SelectMany(b => FaultEffect.On(b, fault)));

    private double[] Predict(PhysicalBoard board)
    {
        var truthBench = new TruthBench(board, bench.Meters[0], solver);
        return [.. places.Select(truthBench.Value)];
    }

    private static int[] Misread(ImmutableArray<TruthFault> faults) => [.. faults.Where(f => f.Row >= 0).Select(f => f.Row).Order()];
}
