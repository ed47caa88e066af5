using System.Collections.Immutable;
using BenchCheck.Core.Checking;
using BenchCheck.Core.Equations;
using BenchCheck.Core.Fitting;
using BenchCheck.Core.Metering;

namespace BenchCheck.Core.Diagnosis;

/// <summary>
/// The whole job for one board: readings in, <see cref="CheckResult"/> out. Holds what is computed once for a board, so one instance serves
/// many reading sets; instances are not shared between threads.
/// </summary>
public sealed class Reconciliation
{
    /// <summary>Probability of the unexplained above which pairs of faults are searched.</summary>
    private const double PairsWorthSeeking = 0.05;

    private const double LeastShown = 0.002;
    private const int MostSuspects = 12;

    /// <summary>How many sets of places are kept: boards of a shelf differ in them where a reading lies near the end of a meter's range.</summary>
    private const int MostKept = 16;

    private readonly NetworkSolver solver;
    private readonly EvidenceFit workspace = new();
    private readonly FaultRates rates;
    private readonly List<Compiled> compiled = [];

    public Reconciliation(Bench bench, CheckSettings settings, FaultRates? rates = null)
    {
        ArgumentNullException.ThrowIfNull(bench);
        ArgumentNullException.ThrowIfNull(settings);
        Bench = bench;
        Settings = settings;
        solver = new NetworkSolver(settings.Law);
        this.rates = rates ?? FaultRates.For(bench.Board.Origin);
    }

    public Bench Bench { get; }

    public CheckSettings Settings { get; }

    /// <exception cref="NoOperatingStateException">no state of the devices satisfies the equations</exception>
    /// <exception cref="OperationCanceledException">cancelled</exception>
    public CheckResult Run(ReadingSet readings, CancellationToken cancel = default) => Fit(readings, null, cancel).Result;

    /// <param name="compared">told the result without suspects and next readings as soon as it is there, when these are still to be sought</param>
    /// <exception cref="NoOperatingStateException">no state of the devices satisfies the equations</exception>
    /// <exception cref="OperationCanceledException">cancelled</exception>
    public CheckResult Run(ReadingSet readings, Action<CheckResult>? compared, CancellationToken cancel = default) => Fit(readings, compared, cancel).Result;

    /// <summary>The result with the fit of the healthy board behind it.</summary>
    /// <exception cref="NoOperatingStateException">no state of the devices satisfies the equations</exception>
    /// <exception cref="OperationCanceledException">cancelled</exception>
    public (CheckResult Result, BoardFit Fit) Fit(ReadingSet readings, Action<CheckResult>? compared = null, CancellationToken cancel = default)
    {
        ArgumentNullException.ThrowIfNull(readings);
        var plan = ReadingPlan.Of(Bench, readings);
        if (!Settings.FindFaults)
        {
            var model = new BoardModel(Bench.Board, plan.Probes, plan.HasScaleError, solver);
            return Checker.Check(Bench, readings, plan, model, workspace, Settings);
        }

        var (search, next) = CompiledFor(plan);
        var (check, fit) = Checker.Check(Bench, readings, plan, search.Healthy, workspace, Settings);
        compared?.Invoke(check);
        int[] lines = [.. readings.Readings.Select(r => r.Lines.IsDefaultOrEmpty ? 0 : r.Lines[0])];
        var faults = search.Find(plan.Measured, plan.Noise, lines, cancel);
        var posterior = Posterior.Of(faults);
        if (posterior.Where(f => f.Fault.IsBroad).Sum(f => f.Probability) > PairsWorthSeeking)
        {
            faults.AddRange(search.FindPairs(faults, plan.Measured, plan.Noise, lines, cancel));
            posterior = Posterior.Of(faults);
        }

        double[] sigma = [.. Enumerable.Range(0, plan.Measured.Length).Select(plan.StandardUncertainty)];
        var groups = FaultGroup.Of(posterior.Where(f => f.Probability > 1e-6), sigma);
        var words = new SuspectWords(check, plan);
        var result = check with
        {
            Suspects = [.. groups.Where(g => g.Probability > LeastShown).Take(MostSuspects).Select(words.Suspect)],
            Next = next.Rank(plan, groups, cancel),
        };
        return (result, fit);
    }

    /// <summary>What is compiled for the places where a board is read; those used last are kept.</summary>
    private Compiled CompiledFor(ReadingPlan plan)
    {
        var index = compiled.FindIndex(c => c.Probes.SequenceEqual(plan.Probes) && c.HasScaleError.SequenceEqual(plan.HasScaleError));
        var found = index < 0
            ? new Compiled(plan.Probes, plan.HasScaleError, new FaultSearch(Bench.Board, plan.Probes, plan.HasScaleError, solver, rates), new NextReadings(Bench, plan.Probes, workspace, solver))
            : compiled[index];
        if (index >= 0) compiled.RemoveAt(index);
        else if (compiled.Count == MostKept) compiled.RemoveAt(0);
        compiled.Add(found);
        return found;
    }

    private sealed record Compiled(ImmutableArray<Probe> Probes, ImmutableArray<bool> HasScaleError, FaultSearch Search, NextReadings Next)
    {
        public void Deconstruct(out FaultSearch search, out NextReadings next) => (search, next) = (Search, Next);
    }
}
