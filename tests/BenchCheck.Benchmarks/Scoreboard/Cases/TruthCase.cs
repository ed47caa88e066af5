using System.Collections.Immutable;
using BenchCheck.Benchmarks.Scoreboard.Boards;
using BenchCheck.Benchmarks.Scoreboard.Faults;
using BenchCheck.Benchmarks.Scoreboard.Physics;
using BenchCheck.Core.Metering;

namespace BenchCheck.Benchmarks.Scoreboard.Cases;

/// <summary>One board on the bench with known truth: a specimen, its faults, and what the meter showed. The seed alone makes it again.</summary>
/// <param name="Healthy">the specimen before the fault</param>
/// <param name="Faulty">the specimen as it lies on the bench; the same as <paramref name="Healthy"/> without a fault of the board</param>
/// <param name="Faults">what was put wrong: none, one or two</param>
/// <param name="Rows">where each reading of <paramref name="Readings"/> was taken</param>
/// <param name="Shown">what the meter shows at every place of the board, whether or not a reading was taken there</param>
/// <param name="Visibility">see <see cref="Cases.Visibility"/>; zero for a healthy board</param>
/// <param name="Failures">solutions in which Kirchhoff's law was not met</param>
public sealed record TruthCase(
    int Seed, Bench Bench, PhysicalBoard Healthy, PhysicalBoard Faulty, ImmutableArray<TruthFault> Faults, ImmutableArray<Place> Rows,
    ReadingSet Readings, ImmutableDictionary<Place, double> Shown, double Visibility, int Failures)
{
    /// <summary>The true gains I_C/I_B by transistor, geometric mean over the conditions with readings in which it is active.</summary>
    public ImmutableDictionary<string, double> Gains { get; init; } = ImmutableDictionary<string, double>.Empty;

    public static TruthCase From(int seed, FaultMix mix, TruthSolver solver)
    {
        ArgumentNullException.ThrowIfNull(mix);
        var random = new Random(seed);
        var bench = TruthBoards.All[random.Next(TruthBoards.All.Length)];
        var design = bench.Board;
        var healthy = PhysicalBoard.Of(design, Draw.From(random));
        var luck = random.NextDouble();
        var count = luck < mix.Healthy ? 0 : luck < 1 - mix.Twofold ? 1 : 2;
        var faults = Inject(healthy, count, mix, random);
        var faulty = faults.Aggregate(healthy, (board, fault) => Choose(FaultEffect.On(board, fault), random) ?? board);

        var meter = bench.Meters[0];
        var truth = new TruthBench(faulty, meter, solver);
        var display = new TruthMeter(meter, Draw.From(random));
        var shown = TruthBench.Places(design).ToDictionary(p => p, p => display.Shown(p.Quantity, truth.Value(p)));
        Place[] rows = [.. ReadingChoice.From(design, random).Where(p => !shown.TryGetValue(p, out var v) || double.IsFinite(v))];
        double[] values = [.. rows.Select(p => shown.TryGetValue(p, out var v) ? v : display.Shown(p.Quantity, truth.Value(p)))];
        if (faults.Any(f => f.Kind == Core.Diagnosis.FaultKind.ReadingError)) faults = Misread(rows, values, faults, meter, random);

        var seen = new Visibility(bench, solver);
        var readings = new ReadingSet(null, [.. rows.Select((p, i) => new Reading([i + 2], p.Condition, p.Quantity, p.At, p.Against, values[i]))]);
        return new TruthCase(seed, bench, healthy, faulty, faults, [.. rows], readings, shown.ToImmutableDictionary(), seen.Of(rows, healthy, values, faults, truth), truth.Failures)
        {
            Gains = GainsOf(faulty, rows, truth),
        };
    }

    /// <summary>Two faults are of different parts and at most one of them is a misread row.</summary>
    private static ImmutableArray<TruthFault> Inject(PhysicalBoard board, int count, FaultMix mix, Random random)
    {
        var faults = new List<TruthFault>();
        while (faults.Count < count)
        {
            var fault = FaultDraw.From(board.Design, mix, random);
            if (faults.Any(f => f.Kind == fault.Kind || f.Parts.Intersect(fault.Parts).Any())) continue;
            faults.Add(fault);
        }

        return [.. faults];
    }

    private static PhysicalBoard? Choose(IEnumerable<PhysicalBoard> boards, Random random)
    {
        var all = boards.ToArray();
        return all.Length == 0 ? null : all[random.Next(all.Length)];
    }

    private static ImmutableArray<TruthFault> Misread(Place[] rows, double[] values, ImmutableArray<TruthFault> faults, Meter meter, Random random)
    {
        double[] resolutions = [.. rows.Select((p, i) => meter.FunctionFor(p.Quantity)!.RangeFor(values[i]) / meter.FullScaleCounts)];
        var slip = ReadingSlip.From(values, resolutions, random);
        if (slip is { } s) values[s.Row] = s.Value;
        return [.. faults.Where(f => f.Kind != Core.Diagnosis.FaultKind.ReadingError || slip is not null)
            .Select(f => f.Kind == Core.Diagnosis.FaultKind.ReadingError ? f with { Row = slip!.Value.Row, How = slip.Value.How } : f)];
    }

    private static ImmutableDictionary<string, double> GainsOf(PhysicalBoard board, Place[] rows, TruthBench truth)
    {
        var conditions = rows.Where(r => r.Quantity == ReadingQuantity.Voltage).Select(r => r.Condition).Distinct().ToArray();
        var gains = ImmutableDictionary.CreateBuilder<string, double>();
        foreach (var q in board.Parts.OfType<PhysicalTransistor>())
        {
            var active = conditions.Select(c => truth.Bare(c).ActiveGain(q.Designator)).OfType<double>().Where(g => g > 0).ToArray();
            if (active.Length > 0) gains[q.Designator] = Math.Exp(active.Average(Math.Log));
        }

        return gains.ToImmutable();
    }
}
