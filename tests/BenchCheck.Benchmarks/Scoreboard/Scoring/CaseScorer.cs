using System.Collections.Immutable;
using System.Diagnostics;
using BenchCheck.Benchmarks.Scoreboard.Cases;
using BenchCheck.Benchmarks.Scoreboard.Faults;
using BenchCheck.Benchmarks.Scoreboard.Physics;
using BenchCheck.Core.Boards;
using BenchCheck.Core.Checking;
using BenchCheck.Core.Diagnosis;
using BenchCheck.Core.Metering;

namespace BenchCheck.Benchmarks.Scoreboard.Scoring;

/// <summary>Runs the program on a case and holds its result against the truth.</summary>
public sealed class CaseScorer(TruthSolver solver, CheckSettings settings)
{
    /// <summary>Groups behind these are judged by their names only: no figure asks more of them.</summary>
    private const int JudgedByPhysics = 3;

    public CaseScore Score(KnownCase known)
    {
        ArgumentNullException.ThrowIfNull(known);
        var clock = Stopwatch.StartNew();
        try
        {
            var result = new Reconciliation(known.Bench, settings).Run(known.Readings);
            clock.Stop();
            return new CaseScore(known, result.Verdict, null, clock.Elapsed, Groups(known, result), known.IsHealthy ? Intervals(known, result) : []);
        }
#pragma warning disable CA1031 // whatever the program throws is a finding to be counted, not the end of the run
        catch (Exception failure)
#pragma warning restore CA1031
        {
            return new CaseScore(known, null, $"{failure.GetType().Name}: {failure.Message}", clock.Elapsed, [], []);
        }
    }

    /// <summary>The faults that a suspect, or an alternative in its group, names; the second where two are needed.</summary>
    public static ImmutableArray<TruthFault> FaultsOf(NamedFault named, ReadingSet readings)
    {
        ArgumentNullException.ThrowIfNull(named);
        var faults = ImmutableArray.CreateBuilder<TruthFault>();
        for (var fault = named; fault is not null; fault = fault.With) faults.Add(TruthFault.Of(fault) with { Row = RowOf(fault, readings) });
        return faults.ToImmutable();
    }

    private static int RowOf(NamedFault fault, ReadingSet readings) => fault.Fault != FaultKind.ReadingError || fault.Lines.IsEmpty
        ? -1
        : readings.Readings.ToList().FindIndex(r => r.Lines.Contains(fault.Lines[0]));

    private ImmutableArray<GroupScore> Groups(KnownCase known, CheckResult result)
    {
        var board = known.Bench.Board;
        ImmutableArray<Place> places = [.. known.Readings.Readings.Select(r => new Place(r.Condition, r.Quantity, r.At, r.Against ?? board.Reference))];
        var alike = new Lazy<Equivalence>(() => new Equivalence(known.Bench, places, known.Faults, solver));
        return [.. result.Suspects.Select((suspect, rank) =>
        {
            ImmutableArray<TruthFault>[] members = [.. suspect.Alike.Prepend(suspect.Fault).Select(f => FaultsOf(f, known.Readings))];
            var isNamed = members.Any(m => IsNamed(board, known.Faults, m));
            var isAlike = isNamed || (rank < JudgedByPhysics && members.Any(alike.Value.Holds));
            var isPartly = members.Any(m => m.Any(f => known.Faults.Any(t => FaultIdentity.IsSame(board, t, f))));
            return new GroupScore(suspect.Probability, suspect.Fault.Fault, suspect.Fault.Text, IsExact(known.Faults, members[0]), isNamed, isAlike, isPartly);
        })];
    }

    private static bool IsExact(ImmutableArray<TruthFault> truth, ImmutableArray<TruthFault> suspect) => truth.IsEmpty
        ? suspect[0].Kind == FaultKind.None
        : truth.Length == suspect.Length && truth.All(t => suspect.Any(s => FaultIdentity.IsExact(t, s)));

    private static bool IsNamed(Board board, ImmutableArray<TruthFault> truth, ImmutableArray<TruthFault> suspect) => truth.IsEmpty
        ? suspect[0].Kind == FaultKind.None
        : truth.Length == suspect.Length && truth.All(t => suspect.Any(s => FaultIdentity.IsSame(board, t, s)));

    private static ImmutableArray<Coverage> Intervals(KnownCase known, CheckResult result)
    {
        var intervals = ImmutableArray.CreateBuilder<Coverage>();
        foreach (var estimate in result.Parameters)
        {
            double? truth = estimate.Kind == ParameterKind.Gain ? Find(known.Gains, estimate.Part)
                : estimate.Kind == ParameterKind.Resistance || estimate.Kind == ParameterKind.Voltage ? Find(known.Values, (estimate.Part, estimate.Condition ?? ""))
                : null;
            if (truth is { } value) intervals.Add(new Coverage(estimate.Kind, estimate.Determined, value >= estimate.Low && value <= estimate.High));
        }

        return intervals.ToImmutable();
    }

    private static double? Find<TKey>(ImmutableDictionary<TKey, double> values, TKey key)
        where TKey : notnull => values.TryGetValue(key, out var value) ? value : null;
}
