using System.Collections.Immutable;
using System.Runtime.CompilerServices;
using BenchCheck.Core.Boards;
using BenchCheck.Core.Checking;
using BenchCheck.Core.Equations;
using BenchCheck.Core.Fitting;
using BenchCheck.Core.Metering;
using BenchCheck.Core.Quantities;

namespace BenchCheck.Core.Diagnosis;

/// <summary>Ranks the readings not yet taken by what each is expected to tell about the suspects.</summary>
/// <remarks>
/// Each likely fault predicts each candidate with its own uncertainty: that of its fitted parameters, carried through the Jacobian, and
/// the meter's. Candidates are the node voltages of the DC conditions, resistances between nodes that share a part on the unpowered board and,
/// where a generator is connected, the gain to every node and the resistance that the generator meets. One instance serves every set of readings
/// that is taken at the same places.
/// </remarks>
/// <param name="taken">where the board is read already</param>
internal sealed class NextReadings(Bench bench, ImmutableArray<Probe> taken, EvidenceFit fit, NetworkSolver solver)
{
    /// <summary>Faults beyond this many, or less likely than this, do not change which reading is best.</summary>
    private const int MostFaults = 40;

    private const double LeastProbability = 2e-4;

    /// <summary>Below this many bits a reading is not worth the lead.</summary>
    private const double LeastBits = 0.02;

    private const int MostReadings = 8;

    /// <summary>How many different outcomes of a reading are put into words.</summary>
    private const int MostOutcomes = 4;

    private readonly Probe[] candidates = Candidates(bench, taken);

    /// <summary>Each faulty board read at the candidates, compiled once for as long as its fault is kept.</summary>
    private readonly ConditionalWeakTable<BoardModel, BoardModel> atCandidates = [];

    public ImmutableArray<NextReading> Rank(ReadingPlan plan, List<FaultGroup> groups, CancellationToken cancel)
    {
        var faults = groups.SelectMany((g, index) => g.Members.Select(m => (m.Fault, m.Probability, Group: index)))
            .Where(f => !f.Fault.IsBroad && f.Probability > LeastProbability).OrderByDescending(f => f.Probability).Take(MostFaults).ToArray();
        if (candidates.Length == 0 || faults.Length < 2) return [];

        var (count, kinds) = (candidates.Length, faults.Length);
        var mean = new double[count, kinds];
        var variance = new double[count, kinds];
        var usable = new bool[kinds];
        for (var h = 0; h < kinds; h++)
        {
            cancel.ThrowIfCancellationRequested();
            usable[h] = TryPredict(faults[h].Fault, plan, mean, variance, h);
        }

        var chosen = Enumerable.Range(0, kinds).Where(h => usable[h]).ToArray();
        var total = chosen.Sum(h => faults[h].Probability);
        double[] probability = [.. chosen.Select(h => faults[h].Probability / total)];
        var ranked = new List<(Probe Probe, double Bits, (Fault Fault, int Group, double Probability, double Value, double Sigma)[] Predictions)>();
        for (var c = 0; c < count; c++)
        {
            double[] m = [.. chosen.Select(h => mean[c, h])];
            double[] v = [.. chosen.Select(h => variance[c, h])];
            var bits = MixtureInformation.Bits(probability, m, v);
            if (bits >= LeastBits) ranked.Add((candidates[c], bits, [.. chosen.Select((h, i) => (faults[h].Fault, faults[h].Group, probability[i], m[i], Math.Sqrt(v[i])))]));
        }

        // Among readings that tell about the same, one that needs no change of the set-up comes first.
        return
        [
            .. ranked.OrderByDescending(r => Math.Round(r.Bits, 1)).ThenBy(r => r.Probe.Quantity == ReadingQuantity.Voltage && Caution(r.Probe, r.Predictions) is null ? 0 : 1)
                .ThenByDescending(r => r.Bits).Take(MostReadings).Select(r => Describe(r.Probe, r.Bits, r.Predictions)),
        ];
    }

    private static Probe[] Candidates(Bench bench, ImmutableArray<Probe> taken)
    {
        var board = bench.Board;
        var meter = bench.Meters[0];
        var result = new List<Probe>();
        foreach (var condition in board.Conditions)
        {
            if (condition.IsSmallSignal)
            {
                if (condition.Drive is not { } drive || drive.Against != board.Reference) continue;
                var gain = new Probe(condition.Name, ReadingQuantity.Gain, drive.At, drive.At, meter, 1) { IsSmallSignal = true };
                result.AddRange(board.Nodes.Skip(1).Where(n => n != drive.At).Select(n => gain with { At = n }));
                result.Add(gain with { Quantity = ReadingQuantity.InputResistance, Against = board.Reference });
            }
            else if (condition.SuppliesRemoved)
            {
                var pairs = board.Parts.Where(p => p is not (Supply or CurrentSource))
                    .SelectMany(p => p.Nodes.SelectMany((a, i) => p.Nodes.Skip(i + 1).Select(b => (a, b)))).Where(x => x.a != x.b)
                    .Select(x => string.CompareOrdinal(x.a, x.b) < 0 || x.b == board.Reference ? x : (a: x.b, b: x.a)).Distinct();
                result.AddRange(pairs.Select(x => new Probe(condition.Name, ReadingQuantity.Resistance, x.a, x.b, meter, OhmRange(meter))));
            }
            else
            {
                result.AddRange(board.Nodes.Skip(1).Select(n => new Probe(condition.Name, ReadingQuantity.Voltage, n, board.Reference, meter, 1)));
            }
        }

        return [.. result.Where(c => !taken.Any(p =>
            p.Condition == c.Condition && p.Quantity == c.Quantity && p.At == c.At && (p.Against ?? board.Reference) == c.Against))];
    }

    private static double OhmRange(Meter meter) => (meter.Resistance ?? Meter.Usual.Resistance!).RangeFor(50e3);

    private bool TryPredict(Fault fault, ReadingPlan plan, double[,] mean, double[,] variance, int h)
    {
        fault.Model.Forget();
        if (double.IsInfinity(fit.Polish(fault.Model, plan.Measured, fault.Noise, fault.Phi).ChiSquared)) return false;
        var p = fault.Model.BoardParameterCount;
        var covariance = new double[p * p];
        fit.Posterior(p, covariance);
        var model = atCandidates.GetValue(fault.Model, m => BoardModel.AtPlaces(m.Board, candidates, solver));
        model.Forget();
        var values = new double[candidates.Length];
        var jacobian = new double[candidates.Length * p];
        try
        {
            model.Predict(fit.Phi[..p], values, jacobian);
        }
        catch (NoOperatingStateException)
        {
            return false;
        }

        for (var c = 0; c < candidates.Length; c++)
        {
            var row = jacobian.AsSpan(c * p, p);
            var sum = 0.0;
            for (var k = 0; k < p; k++) sum += row[k] * LuFactor.Dot(covariance.AsSpan(k * p, p), row);
            var probe = candidates[c] with { Range = candidates[c].Function.RangeFor(values[c]) };
            var (own, scale) = (probe.OwnUncertainty, probe.ScaleUncertainty * values[c]);
            // Nothing is shown above the highest range: all such values are the same to the meter.
            if (Top(candidates[c]) is { } top && values[c] > top) (values[c], sum) = (top, 0);

            mean[c, h] = values[c];
            variance[c, h] = Math.Max(0, sum) + own * own + scale * scale;
        }

        return true;
    }

    /// <summary>The highest resistance that can be read; null for other quantities.</summary>
    private static double? Top(Probe probe) => probe.Quantity switch
    {
        ReadingQuantity.Resistance when !probe.Function.Ranges.IsEmpty => probe.Function.Ranges[^1],
        ReadingQuantity.InputResistance => 10 * probe.Meter.InputOhms,
        _ => null,
    };

    private NextReading Describe(Probe probe, double bits, (Fault Fault, int Group, double Probability, double Value, double Sigma)[] predictions)
    {
        var leaders = predictions.GroupBy(x => x.Group).Select(g => g.MaxBy(x => x.Probability)).OrderBy(x => x.Group).ToArray();
        var shown = Outcomes(predictions).Take(MostOutcomes).Select(x => $"{Shown(probe, x.Value)}: {x.Words}");
        var place = probe.Words(bench.Board.Reference);
        var isOhms = probe.Quantity == ReadingQuantity.Resistance;
        var condition = isOhms || probe.IsSmallSignal || bench.Board.Conditions.Count(c => !c.SuppliesRemoved && !c.IsSmallSignal) > 1 ? $" ({probe.Condition})" : "";
        return new NextReading(
            probe.Condition, probe.Quantity, probe.At, probe.Against, bits, [.. leaders.Select(x => new Expectation(x.Group, x.Value, x.Sigma))],
            Caution(probe, predictions),
            $"{place}{condition} {string.Join("; ", shown)}");
    }

    private static string? Caution(Probe probe, (Fault Fault, int Group, double Probability, double Value, double Sigma)[] predictions) => probe.Quantity switch
    {
        ReadingQuantity.Resistance => "Supplies off and removed, capacitors discharged first.",
        ReadingQuantity.Voltage when predictions.Any(x => Cautions.IsHazardous(x.Value)) => $"Hazardous voltage: above {Cautions.HazardousVoltsDc} V may stand here.",
        _ => null,
    };

    private static string Shown(Probe probe, double value)
    {
        var unit = probe.Quantity.Unit();
        return value >= Top(probe) ? $"above {EngineeringNotation.Format(value, unit, 3)}" : $"near {EngineeringNotation.Format(value, unit, 3)}";
    }

    /// <summary>What the meter may show, likeliest first, with the faults that would make it so; values that it could not tell apart are one.</summary>
    private static IEnumerable<(double Value, string Words)> Outcomes((Fault Fault, int Group, double Probability, double Value, double Sigma)[] predictions)
    {
        var left = predictions.OrderByDescending(x => x.Probability).ToList();
        while (left.Count > 0)
        {
            var first = left[0];
            var alike = left.Where(x => Math.Abs(x.Value - first.Value) < 2 * Math.Sqrt(x.Sigma * x.Sigma + first.Sigma * first.Sigma)).ToArray();
            var names = alike.Take(2).Select(x => x.Fault.Named[0].Text);
            yield return (first.Value, string.Join(" or ", names) + (alike.Length > 2 ? " or others" : ""));
            left.RemoveAll(x => Array.IndexOf(alike, x) >= 0);
        }
    }
}
