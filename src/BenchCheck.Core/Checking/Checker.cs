using System.Collections.Immutable;
using BenchCheck.Core.Boards;
using BenchCheck.Core.Equations;
using BenchCheck.Core.Fitting;
using BenchCheck.Core.Metering;
using BenchCheck.Core.Quantities;
using MathNet.Numerics.Distributions;

namespace BenchCheck.Core.Checking;

/// <summary>Compares the readings with the prediction: bands, En, verdicts, estimates, states, power. Suspects are not its concern.</summary>
internal static class Checker
{
    /// <param name="model">the healthy board, read where the readings were taken</param>
    public static (CheckResult Result, BoardFit Fit) Check(Bench bench, ReadingSet readings, ReadingPlan plan, BoardModel model, EvidenceFit workspace, CheckSettings settings)
    {
        var fit = BoardFit.Of(model, plan, workspace);
        var alpha = 1 - settings.Confidence;
        var unknowns = model.Parameters.Count(p => p.IsUnknown);
        var degrees = Math.Max(0, plan.Measured.Length - unknowns);
        var informative = fit.NormalisedResiduals.Concat(fit.PriorScores.Take(model.BoardParameterCount).Where(s => s != 0));
        var pValue = VerdictRule.PValue(fit.ChiSquared, degrees, informative);
        var verdict = degrees == 0 ? BoardVerdict.Undecided : VerdictRule.Verdict(pValue, alpha);
        var results = ReadingResults(readings, plan, fit, settings);
        var estimates = Estimates.Of(fit, settings.Confidence);
        var conditions = bench.Board.Conditions.Where(c => !c.IsSmallSignal && plan.Probes.Any(p => p.Condition == c.Name)).ToArray();
        var points = conditions.Select(c => model.Operate(fit.Phi, c)).ToArray();
        var (volts, place) = Highest(bench.Board, points, readings);
        var result = new CheckResult
        {
            BoardTitle = bench.Board.Title,
            Serial = readings.Serial,
            Verdict = verdict,
            Reason = Reason(verdict, degrees, pValue, settings.Confidence, results),
            ChiSquared = fit.ChiSquared,
            DegreesOfFreedom = degrees,
            PValue = pValue,
            Readings = results,
            Unmeasured = Unmeasured(bench, plan, fit, conditions, settings),
            Parameters = [.. estimates.Where(e => e.Kind.IsReported)],
            Correlated = Estimates.Correlated(fit, estimates),
            States = [.. points.SelectMany(p => States(bench.Board, p))],
            Dissipation = Dissipation(bench.Board, points),
            Cautions = Cautions.For(volts, place),
            Assumed = bench.Assumed,
            Remarks = fit.Summary.Converged ? [] : [$"The fit stopped before it stood still ({fit.Summary}): read the estimates with care."],
        };
        return (result, fit);
    }

    private static ImmutableArray<ReadingResult> ReadingResults(ReadingSet readings, ReadingPlan plan, BoardFit fit, CheckSettings settings)
    {
        var k = Normal.InvCDF(0, 1, (1 + settings.Confidence) / 2);
        var m = plan.Measured.Length;
        var limit = m == 0 ? 1 : VerdictRule.SidakLimit(1 - settings.Confidence, m) / k;
        var results = ImmutableArray.CreateBuilder<ReadingResult>(m);
        for (var i = 0; i < m; i++)
        {
            var tolerance = Math.Sqrt(fit.ToleranceVariance(i));
            var uncertainty = plan.StandardUncertainty(i);
            var difference = plan.Measured[i] - fit.Predicted[i];
            var en = difference / (k * Math.Sqrt(tolerance * tolerance + uncertainty * uncertainty));
            var size = Math.Abs(en);
            results.Add(new ReadingResult(
                readings.Readings[i], uncertainty, fit.Predicted[i], fit.Predicted[i] - k * tolerance, fit.Predicted[i] + k * tolerance, difference, en,
                size <= 1 ? ReadingVerdict.In : size <= limit ? ReadingVerdict.Doubtful : ReadingVerdict.Out, fit.Fitted[i], fit.NormalisedResiduals[i])
            {
                Influences = Influences(fit, i),
            });
        }

        return results.MoveToImmutable();
    }

    private static ImmutableArray<Influence> Influences(BoardFit fit, int reading)
    {
        var total = fit.ToleranceVariance(reading);
        if (!(total > 0)) return [];
        var p = fit.Model.Parameters.Length;
        return
        [
            .. Enumerable.Range(0, fit.Model.BoardParameterCount)
                .Where(i => !fit.Model.Parameters[i].IsUnknown)
                .Select(i => (Parameter: fit.Model.Parameters[i], Slope: fit.PriorJacobian[reading * p + i]))
                .Select(x => new Influence(
                    x.Parameter.Owner, x.Parameter.Kind, x.Slope * x.Slope * x.Parameter.Sigma * x.Parameter.Sigma / total, x.Slope * 0.01))
                .Where(x => x.Share > 1e-4)
                .OrderByDescending(x => x.Share),
        ];
    }

    private static ImmutableArray<UnmeasuredNode> Unmeasured(Bench bench, ReadingPlan plan, BoardFit fit, Condition[] conditions, CheckSettings settings)
    {
        var k = Normal.InvCDF(0, 1, (1 + settings.Confidence) / 2);
        var meter = bench.Meters[0];
        var places = conditions.Where(c => !c.SuppliesRemoved)
            .SelectMany(c => bench.Board.Nodes.Skip(1).Select(n => new Probe(c.Name, ReadingQuantity.Voltage, n, null, meter, 1)))
            .Where(p => !plan.Probes.Any(q => q.Quantity == p.Quantity && q.Condition == p.Condition && q.At == p.At && (q.Against ?? bench.Board.Reference) == bench.Board.Reference))
            .ToArray();
        if (places.Length == 0) return [];
        var model = new BoardModel(bench.Board, places, new bool[places.Length], fit.Model.Solver);
        var p = model.Parameters.Length;
        var (predicted, fitted, jacobian) = (new double[places.Length], new double[places.Length], new double[places.Length * p]);
        model.Predict(fit.Phi.AsSpan(0, p), fitted, []);
        model.Predict(fit.Start.AsSpan(0, p), predicted, jacobian);
        return [.. places.Select((place, i) =>
        {
            var variance = 0.0;
            for (var j = 0; j < p; j++)
            {
                if (!model.Parameters[j].IsUnknown) variance += Math.Pow(jacobian[i * p + j] * model.Parameters[j].Sigma, 2);
            }

            var half = k * Math.Sqrt(variance);
            return new UnmeasuredNode(place.Condition, place.At, predicted[i], predicted[i] - half, predicted[i] + half, fitted[i]);
        })];
    }

    private static IEnumerable<DeviceState> States(Board board, OperatingPoint point)
    {
        foreach (var part in board.Parts)
        {
            if (point.State(part) is not { } state) continue;
            string? remark = null;
            if (part is Transistor q && state == "saturated")
                remark = string.Create(System.Globalization.CultureInfo.InvariantCulture, $"its ratio of currents, {point.CurrentRatio(q):G2}, is only a lower bound of its gain");
            yield return new DeviceState(part.Designator, point.Condition.Name, state, remark);
        }
    }

    private static ImmutableArray<Dissipation> Dissipation(Board board, OperatingPoint[] points) => points.Length == 0 ? [] :
    [
        .. board.Parts.Where(p => p is not (Supply or CurrentSource or Capacitor)).Select(part =>
        {
            var worst = points.MaxBy(p => p.Watts(part))!;
            return new Dissipation(part.Designator, worst.Condition.Name, worst.Watts(part), part.RatedWatts);
        }),
    ];

    private static (double Volts, string Place) Highest(Board board, OperatingPoint[] points, ReadingSet readings)
    {
        var predicted = points.SelectMany(p => board.Nodes.Select(n => (Volts: Math.Abs(p.Volts(n)), Place: n)));
        var measured = readings.Readings.Where(r => r.Quantity == ReadingQuantity.Voltage).Select(r => (Volts: Math.Abs(r.Value), Place: r.At));
        return predicted.Concat(measured).DefaultIfEmpty((0, "")).MaxBy(x => x.Item1);
    }

    private static string Reason(BoardVerdict verdict, int degrees, double pValue, double confidence, ImmutableArray<ReadingResult> results)
    {
        if (degrees == 0) return "Too few readings to compare with the parts list.";
        var chance = pValue < 1e-4 ? "less than 1 in 10000" : string.Create(System.Globalization.CultureInfo.InvariantCulture, $"{100 * pValue:G2} %");
        var outside = results.Count(r => r.Verdict == ReadingVerdict.Out);
        return verdict switch
        {
            BoardVerdict.Agrees => $"The readings are what a healthy board may show (chance of worse: {chance}).",
            BoardVerdict.Undecided => $"The readings are at the edge of what a healthy board shows (chance of worse: {chance}).",
            _ when outside > 0 => $"{outside} of {results.Length} readings are out of tolerance (chance on a healthy board: {chance}).",
            _ => $"No reading alone is out of tolerance, but together they do not fit a healthy board (chance: {chance}).",
        };
    }
}
