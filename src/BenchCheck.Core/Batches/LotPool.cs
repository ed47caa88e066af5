using System.Collections.Immutable;
using BenchCheck.Core.Checking;
using BenchCheck.Core.Equations;
using BenchCheck.Core.Fitting;
using BenchCheck.Core.Metering;

namespace BenchCheck.Core.Batches;

/// <summary>Gathers the boards of a lot and finds what they have in common: the lot's own mean and spread of each parameter in place of the parts list's.</summary>
/// <remarks>
/// The readings are linearised at the parts list's values, and again at the lot's mean until that stands still. Memory stays bounded: of very many
/// boards a random sample is kept.
/// </remarks>
public sealed class LotPool
{
    /// <summary>Fewest boards of which a spread can be told.</summary>
    public const int FewestBoards = 3;

    /// <summary>Boards kept; beyond it a sample in which every board is as likely as any other (reservoir, Vitter 1985). Of so many a spread is known to 2 %.</summary>
    public const int MostKept = 1000;

    private const int MostRounds = 6;

    /// <summary>How far the mean may still move, in spreads, where it stands still.</summary>
    private const double StandsStill = 0.02;

    private readonly List<ReadingPlan> boards = [];
    private readonly Random draw = new(1);
    private readonly Bench bench;
    private readonly NetworkSolver solver;

    public LotPool(Bench bench, JunctionLaw law)
    {
        this.bench = bench;
        solver = new NetworkSolver(law);
    }

    /// <summary>Boards taken in.</summary>
    public long Count { get; private set; }

    /// <summary>The lot of those boards that agree; null where fewer than <see cref="FewestBoards"/> do.</summary>
    /// <param name="run">checks the boards; need not look for faults</param>
    /// <param name="done">told how many boards are done</param>
    /// <exception cref="OperationCanceledException">cancelled</exception>
    public Lot? LotOf(BatchRun run, IEnumerable<ReadingSet> sets, Action<int> done, CancellationToken cancel = default)
    {
        ArgumentNullException.ThrowIfNull(run);
        ArgumentNullException.ThrowIfNull(done);
        var count = 0;
        foreach (var plan in run.Run(sets, (result, fit) => result.Verdict == BoardVerdict.Agrees ? fit.Plan : null, (_, _) => null, cancel))
        {
            if (plan is not null) Add(plan);
            done(++count);
        }

        return Solve(cancel);
    }

    /// <summary>Takes a healthy board in: a faulty one would spread the lot.</summary>
    public void Add(ReadingPlan board)
    {
        Count++;
        if (boards.Count < MostKept)
        {
            boards.Add(board);
            return;
        }

        var place = draw.NextInt64(Count);
        if (place < MostKept) boards[(int)place] = board;
    }

    /// <summary>The lot; null for fewer than <see cref="FewestBoards"/> boards.</summary>
    public Lot? Solve(CancellationToken cancel = default)
    {
        if (boards.Count < FewestBoards) return null;
        var models = Models();
        var first = models[0];
        var shared = LotLikelihood.Shared(first);
        ImmutableArray<FitParameter> parameters = [.. shared.Select(i => first.Parameters[i])];
        double[] reference = [.. parameters.Select(p => p.Mean)];
        Lot? lot = null;
        for (var round = 0; round < MostRounds; round++)
        {
            cancel.ThrowIfCancellationRequested();
            var likelihoods = boards.Zip(models, (plan, model) => LotLikelihood.At(model, plan, reference)).OfType<LotLikelihood>().ToArray();
            if (likelihoods.Length < FewestBoards) break;
            lot = LotMaximum.Of(parameters, likelihoods, reference, Count, cancel);
            double[] mean = [.. lot.Parameters.Select(p => p.Mean)];
            var moved = lot.Parameters.Select((p, i) => Math.Abs(p.Mean - reference[i]) / p.Spread).Max();
            reference = mean;
            if (moved < StandsStill) break;
        }

        return lot;
    }

    /// <summary>A model for each board; those read at the same places share one.</summary>
    private List<BoardModel> Models()
    {
        var known = new List<(ReadingPlan Plan, BoardModel Model)>();
        var models = new List<BoardModel>();
        foreach (var plan in boards)
        {
            var index = known.FindIndex(k => k.Plan.Probes.SequenceEqual(plan.Probes) && k.Plan.HasScaleError.SequenceEqual(plan.HasScaleError));
            if (index < 0)
            {
                index = known.Count;
                known.Add((plan, new BoardModel(bench.Board, plan.Probes, plan.HasScaleError, solver)));
            }

            models.Add(known[index].Model);
        }

        return models;
    }
}
