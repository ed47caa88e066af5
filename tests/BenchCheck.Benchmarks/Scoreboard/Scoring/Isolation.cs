using System.Collections.Immutable;
using BenchCheck.Benchmarks.Scoreboard.Cases;
using BenchCheck.Benchmarks.Scoreboard.Faults;
using BenchCheck.Benchmarks.Scoreboard.Physics;
using BenchCheck.Core.Checking;
using BenchCheck.Core.Diagnosis;
using BenchCheck.Core.Metering;

namespace BenchCheck.Benchmarks.Scoreboard.Scoring;

/// <summary>How many further readings one board took from three starting readings: guided by the program, and at random.</summary>
public sealed record IsolationScore(TruthCase Case, IsolationRun Guided, IsolationRun AtRandom);

/// <summary>One run on one board; null for never.</summary>
/// <param name="Grouped">further readings until the leading group was more likely than 90 % and held the truth</param>
/// <param name="Settled">… and held nothing else that some reading of the board could tell from it</param>
/// <param name="Failure">what the program threw on the way, and after which readings</param>
public sealed record IsolationRun(int? Grouped, int? Settled, string? Failure);

/// <summary>Isolates a single fault reading by reading, as a person does who takes the reading that the program asks for.</summary>
/// <remarks>
/// A group holds the truth by name or by a member that no reading which the board offers could tell from it (<see cref="Equivalence"/> over
/// all places). A guided run that is offered nothing more has to stop; a run at random ends with the last place. The meter shows the same
/// value at a place whenever it is put there.
/// </remarks>
public sealed class Isolation(TruthSolver solver)
{
    private const int Starting = 3;
    private const double Sure = 0.9;

    /// <summary>Null when the drawn fault is not one to isolate: a misread row, too faint, or a board with too few places.</summary>
    public IsolationScore? Run(int seed, FaultMix mix)
    {
        var truth = TruthCase.From(seed, mix with { Healthy = 0, Twofold = 0 }, solver);
        var places = truth.Shown.Where(s => double.IsFinite(s.Value)).Select(s => s.Key)
            .OrderBy(p => p.Condition, StringComparer.Ordinal).ThenBy(p => p.At, StringComparer.Ordinal).ThenBy(p => p.Against, StringComparer.Ordinal).ToImmutableArray();
        var voltages = places.Where(p => p.Quantity == ReadingQuantity.Voltage).ToArray();
        if (truth.Faults[0].Kind == FaultKind.ReadingError || voltages.Length <= Starting) return null;
        Place[] all = [.. voltages];
        double[] shown = [.. all.Select(p => truth.Shown[p])];
        var faulty = new TruthBench(truth.Faulty, truth.Bench.Meters[0], solver);
        if (new Visibility(truth.Bench, solver).Of(all, truth.Healthy, shown, truth.Faults, faulty) <= ScoreSheet.Plain) return null;

        var alike = new Equivalence(truth.Bench, places, truth.Faults, solver);
        var random = new Random(seed);
        random.Shuffle(voltages);
        var start = voltages.Take(Starting).ToImmutableArray();
        var guided = Follow(truth, alike, start, (result, taken) => Asked(truth, result, taken));
        return new IsolationScore(truth, guided, Follow(truth, alike, start, (_, taken) => AnyOther(places, taken, random)));
    }

    private static IsolationRun Follow(TruthCase truth, Equivalence alike, ImmutableArray<Place> start, Func<CheckResult, ImmutableArray<Place>, Place?> next)
    {
        var program = new Reconciliation(truth.Bench, CheckSettings.Default);
        int? grouped = null;
        for (var taken = start; ;)
        {
            var readings = new ReadingSet(null, [.. taken.Select((p, i) => new Reading([i + 2], p.Condition, p.Quantity, p.At, p.Against, truth.Shown[p]))]);
            CheckResult result;
            try
            {
                result = program.Run(readings);
            }
#pragma warning disable CA1031 // whatever the program throws is a finding to be counted, not the end of the run
            catch (Exception failure)
#pragma warning restore CA1031
            {
                return new IsolationRun(grouped, null, $"{failure.GetType().Name}: {failure.Message} after {string.Join(", ", readings.Readings.Select(r => $"{r.Condition} {r.At}-{r.Against} = {r.Value:G5}"))}");
            }

            var further = taken.Length - start.Length;
            if (!result.Suspects.IsEmpty && result.Suspects[0].Probability > Sure)
            {
                var members = result.Suspects[0].Alike.Prepend(result.Suspects[0].Fault).Select(f => CaseScorer.FaultsOf(f, readings)).ToArray();
                if (grouped is null && members.Any(m => IsTrue(truth, alike, m))) grouped = further;
                if (members.All(m => IsTrue(truth, alike, m))) return new IsolationRun(grouped, further, null);
            }

            if (next(result, taken) is not { } place) return new IsolationRun(grouped, null, null);
            taken = taken.Add(place);
        }
    }

    private static bool IsTrue(TruthCase truth, Equivalence alike, ImmutableArray<TruthFault> suspect) =>
        (suspect.Length == 1 && FaultIdentity.IsSame(truth.Bench.Board, suspect[0], truth.Faults[0])) || alike.Holds(suspect);

    /// <summary>The best reading asked for that the meter can show; null when nothing is asked for.</summary>
    private static Place? Asked(TruthCase truth, CheckResult result, ImmutableArray<Place> taken)
    {
        foreach (var next in result.Next)
        {
            var place = new Place(next.Condition, next.Quantity, next.At, next.Against ?? truth.Bench.Board.Reference);
            if (!taken.Contains(place) && truth.Shown.TryGetValue(place, out var value) && double.IsFinite(value)) return place;
        }

        return null;
    }

    private static Place? AnyOther(ImmutableArray<Place> places, ImmutableArray<Place> taken, Random random)
    {
        var left = places.Except(taken).ToArray();
        return left.Length == 0 ? null : left[random.Next(left.Length)];
    }
}
