using System.Collections.Concurrent;
using BenchCheck.Benchmarks.Scoreboard.Faults;
using BenchCheck.Benchmarks.Scoreboard.Physics;
using BenchCheck.Core.Metering;

namespace BenchCheck.Benchmarks.Scoreboard.Cases;

/// <summary>How plainly a fault shows in the readings that were taken.</summary>
/// <remarks>
/// max over the readings of |y − h| / u: y the reading with the fault (for a fault of the board the true value, for a misread row what was
/// written), h the true value of the same specimen without the fault, u² = u_meter² + u_tolerance², with u_meter the standard uncertainty of
/// the meter's specification at h and u_tolerance the standard deviation of that reading over healthy specimens of the design.
/// </remarks>
public sealed class Visibility(Bench bench, TruthSolver solver)
{
    private const int Specimens = 64;

    /// <summary>Standard deviations over healthy specimens, by design and place: the same whoever asks first.</summary>
    private static readonly ConcurrentDictionary<(Bench, Place), double> Spreads = new(new SameBench());

    /// <param name="rows">where the readings were taken</param>
    /// <param name="values">what was written down</param>
    /// <param name="faulty">the specimen with its fault</param>
    public double Of(Place[] rows, PhysicalBoard healthy, double[] values, IReadOnlyList<TruthFault> faults, TruthBench faulty)
    {
        ArgumentNullException.ThrowIfNull(rows);
        ArgumentNullException.ThrowIfNull(faulty);
        if (faults.Count == 0) return 0;
        var before = new TruthBench(healthy, bench.Meters[0], solver);
        var worst = 0.0;
        for (var i = 0; i < rows.Length; i++)
        {
            var (h, y) = (before.Value(rows[i]), faults.Any(f => f.Row == i) ? values[i] : faulty.Value(rows[i]));
            if (!double.IsFinite(h) || !double.IsFinite(y)) continue;
            var (meter, spread) = (MeterUncertainty(bench.Meters[0], rows[i].Quantity, h), Spread(rows[i]));
            worst = Math.Max(worst, Math.Abs(y - h) / Math.Sqrt(meter * meter + spread * spread));
        }

        return worst;
    }

    /// <summary>Standard uncertainty of the meter's specification at a value: both parts rectangular (JCGM 100:2008, 4.3.7).</summary>
    public static double MeterUncertainty(Meter meter, ReadingQuantity quantity, double value)
    {
        var function = meter.FunctionFor(quantity)!;
        var counts = function.Counts * function.RangeFor(value) / meter.FullScaleCounts;
        var scale = function.ReadingFraction * value;
        return Math.Sqrt((counts * counts + scale * scale) / 3);
    }

    private double Spread(Place place)
    {
        if (Spreads.TryGetValue((bench, place), out var known)) return known;
        var random = new Random(20);
        var values = Enumerable.Range(0, Specimens)
            .Select(_ => new TruthBench(PhysicalBoard.Of(bench.Board, Draw.From(random)), bench.Meters[0], solver).Value(place)).Where(double.IsFinite).ToArray();
        if (values.Length < 2) return Spreads[(bench, place)] = 0;
        var mean = values.Average();
        return Spreads[(bench, place)] = Math.Sqrt(values.Sum(v => (v - mean) * (v - mean)) / (values.Length - 1));
    }

    private sealed class SameBench : IEqualityComparer<(Bench Bench, Place Place)>
    {
        public bool Equals((Bench Bench, Place Place) x, (Bench Bench, Place Place) y) => ReferenceEquals(x.Bench, y.Bench) && x.Place == y.Place;

        public int GetHashCode((Bench Bench, Place Place) x) => HashCode.Combine(System.Runtime.CompilerServices.RuntimeHelpers.GetHashCode(x.Bench), x.Place);
    }
}
