using System.Collections.Immutable;
using BenchCheck.Core.Boards;
using BenchCheck.Core.Equations;
using BenchCheck.Core.Fitting;
using BenchCheck.Core.Metering;
using BenchCheck.Core.Quantities;

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
        var conditions = RestConditions(bench.Board, plan);
        var points = conditions.Select(c => AtRest(model, fit, c)).ToArray();
        var (volts, place) = Highest(bench.Board, points, readings);
        var result = new CheckResult
        {
            BoardTitle = bench.Board.Title,
            Reference = bench.Board.Reference,
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
            States = [.. points.SelectMany(p => OperatingReport.States(bench.Board, p))],
            Dissipation = OperatingReport.Dissipation(bench.Board, points),
            Cautions =
            [
                .. plan.Probes.Select((p, i) => p is { IsSmallSignal: true, Quantity: ReadingQuantity.Voltage } ? Cautions.ForSignal(plan.Measured[i], p.At) : null)
                    .OfType<string>().Take(1),
                .. Cautions.For(volts, place),
            ],
            Assumed =
            [
                .. bench.Assumed, .. plan.Probes.Any(p => p.IsSmallSignal) ? SmallSignalAssumptions.Of(bench.Board) : [],
                .. SmallSignalAssumptions.Of(readings.Readings),
            ],
            Remarks = fit.Summary.Converged ? [] : [$"The fit stopped before it stood still ({fit.Summary}): read the estimates with care."],
        };
        return (result, fit);
    }

    /// <summary>The board as fitted; as listed where readings that contradict it have led the fit to values at which it has no state.</summary>
    private static OperatingPoint AtRest(BoardModel model, BoardFit fit, Condition condition)
    {
        try
        {
            return model.Operate(fit.Phi, condition);
        }
        catch (NoOperatingStateException)
        {
            return model.Operate(fit.Start, condition);
        }
    }

    /// <summary>The DC conditions that were read, at rest or with small signals on top.</summary>
    private static Condition[] RestConditions(Board board, ReadingPlan plan)
    {
        var read = plan.Probes.Select(p => board.FindCondition(p.Condition)!).Select(c => c.OperatingPoint ?? c.Name).ToHashSet(StringComparer.Ordinal);
        return [.. board.Conditions.Where(c => read.Contains(c.Name))];
    }

    private static ImmutableArray<ReadingResult> ReadingResults(ReadingSet readings, ReadingPlan plan, BoardFit fit, CheckSettings settings)
    {
        var k = CoverageFactor.Normal(settings.Confidence);
        var m = plan.Measured.Length;
        var limit = m == 0 ? 1 : LargestResidualTest.Limit(m, 1 - settings.Confidence) / k;
        var p = fit.Model.Parameters.Length;
        var bands = PredictedBand.Of(fit.Model, fit.Start, fit.Predicted, fit.PriorJacobian, settings);
        var results = ImmutableArray.CreateBuilder<ReadingResult>(m);
        for (var i = 0; i < m; i++)
        {
            var tolerance = Math.Sqrt(PredictedBand.Variance(fit.Model, fit.PriorJacobian.AsSpan(i * p, p)));
            var uncertainty = plan.StandardUncertainty(i);
            var difference = plan.Measured[i] - fit.Predicted[i];
            var expanded = k * Math.Sqrt(tolerance * tolerance + uncertainty * uncertainty);
            var en = difference / expanded;
            var size = Math.Abs(en);
            results.Add(new ReadingResult(
                readings.Readings[i], uncertainty, fit.Predicted[i], bands[i].Low, bands[i].High, difference, en,
                size <= 1 ? ReadingVerdict.In : size <= limit ? ReadingVerdict.Doubtful : ReadingVerdict.Out, fit.Fitted[i], fit.NormalisedResiduals[i])
            {
                ExpandedUncertainty = expanded,
                Influences = Checking.Influences.Of(fit.Model, fit.PriorJacobian.AsSpan(i * p, p)),
            });
        }

        return results.MoveToImmutable();
    }

    private static ImmutableArray<UnmeasuredNode> Unmeasured(Bench bench, ReadingPlan plan, BoardFit fit, Condition[] conditions, CheckSettings settings)
    {
        var meter = bench.Meters[0];
        var places = conditions.Where(c => !c.SuppliesRemoved)
            .SelectMany(c => bench.Board.Nodes.Skip(1).Select(n => new Probe(c.Name, ReadingQuantity.Voltage, n, null, meter, 1)))
            .Where(p => !plan.Probes.Any(q => q.Quantity == p.Quantity && q.Condition == p.Condition && q.At == p.At && (q.Against ?? bench.Board.Reference) == bench.Board.Reference))
            .ToArray();
        if (places.Length == 0) return [];
        var model = BoardModel.AtPlaces(bench.Board, places, fit.Model.Solver);
        var p = model.Parameters.Length;
        var (predicted, fitted, jacobian) = (new double[places.Length], new double[places.Length], new double[places.Length * p]);
        model.Predict(fit.Start.AsSpan(0, p), predicted, jacobian);
        try
        {
            model.Predict(fit.Phi.AsSpan(0, p), fitted, []);
        }
        catch (NoOperatingStateException)
        {
            predicted.CopyTo(fitted, 0);
        }

        var bands = PredictedBand.Of(model, fit.Start.AsSpan(0, p), predicted, jacobian, settings);
        return [.. places.Select((place, i) => new UnmeasuredNode(place.Condition, place.At, predicted[i], bands[i].Low, bands[i].High, fitted[i]))];
    }

    private static (double Volts, string Place) Highest(Board board, OperatingPoint[] points, ReadingSet readings)
    {
        var predicted = points.SelectMany(p => board.Nodes.Select(n => (Volts: Math.Abs(p.Volts(n)), Place: n)));
        var measured = readings.Readings.Where(r => r.Quantity == ReadingQuantity.Voltage).Select(r => (Volts: Math.Abs(r.Value), Place: r.At));
        return predicted.Concat(measured).DefaultIfEmpty((0, "")).MaxBy(x => x.Item1);
    }

    private static string Reason(BoardVerdict verdict, int degrees, double pValue, double confidence, ImmutableArray<ReadingResult> results)
    {
        if (degrees == 0) return "Too few readings to compare with the parts list.";
        var chance = pValue < 1e-4 ? "less than 1 in 10000" : pValue > 0.99 ? "more than 99 %" : string.Create(System.Globalization.CultureInfo.InvariantCulture, $"{100 * pValue:G2} %");
        var outside = results.Count(r => r.Verdict == ReadingVerdict.Out);
        return verdict switch
        {
            BoardVerdict.Agrees => $"The readings are what a healthy board may show (chance of worse: {chance}).",
            BoardVerdict.Undecided => $"The readings are at the edge of what a healthy board shows (chance of worse: {chance}).",
            _ when outside > 0 => $"{outside} of {results.Length} readings {(outside == 1 ? "is" : "are")} out of tolerance (chance on a healthy board: {chance}).",
            _ => $"No reading alone is out of tolerance, but together they do not fit a healthy board (chance: {chance}).",
        };
    }
}
