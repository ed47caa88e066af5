using BenchCheck.Core.Boards;
using BenchCheck.Core.Checking;
using BenchCheck.Core.Equations;
using BenchCheck.Core.Fitting;
using BenchCheck.Core.Metering;
using Xunit;

namespace BenchCheck.Core.Tests.Checking;

/// <summary>
/// Do the 95 % intervals cover what they claim? Simulation of 2,000 healthy boards, seeded; parts drawn from the fit's own priors, and uniformly
/// within their tolerances. Counts of meter scale error and least digits drawn likewise. The verdict's false-alarm rate is counted on the same boards.
/// Likewise 1,000 two-stage amplifiers with gains and small-signal resistances among their readings.
/// </summary>
public class CoverageTests
{
    private const int Boards = 2000;

    [Fact]
    public void Intervals_cover_93_to_97_percent_when_parts_follow_the_priors_of_the_fit()
    {
        var (gain, resistance, alarms) = Simulate(WorkshopBoards.FanStage(), Boards, (random, parameter) => parameter.Mean + parameter.Sigma * Gaussian(random));
        Assert.InRange(gain, 0.93, 0.97);
        Assert.InRange(resistance, 0.93, 0.97);
        Assert.InRange(alarms, 0, 0.05);
    }

    [Fact]
    public void Intervals_cover_at_least_93_percent_when_parts_are_uniform_within_their_tolerances()
    {
        var (gain, resistance, alarms) = Simulate(WorkshopBoards.FanStage(), Boards, (random, parameter) => parameter.Mean + parameter.Sigma * Math.Sqrt(3) * (2 * random.NextDouble() - 1));
        Assert.InRange(gain, 0.93, 1);
        Assert.InRange(resistance, 0.93, 1);
        Assert.InRange(alarms, 0, 0.05);
    }

    [Fact]
    public void Intervals_cover_93_to_97_percent_with_small_signal_readings_too()
    {
        var (gain, resistance, alarms) = Simulate(WorkshopBoards.TwoStageAmplifier(), Boards / 2, (random, parameter) => parameter.Mean + parameter.Sigma * Gaussian(random));
        Assert.InRange(gain, 0.93, 0.97);
        Assert.InRange(resistance, 0.93, 0.97);
        Assert.InRange(alarms, 0, 0.05);
    }

    private static (double Gain, double Resistance, double Alarms) Simulate(Bench bench, int boards, Func<Random, FitParameter, double> draw)
    {
        var random = new Random(20260401);
        var solver = new NetworkSolver(JunctionLaw.Exponential);
        var fit = new EvidenceFit();
        var nominal = Read(bench, WorkshopBoards.Everything(bench));
        var truthModel = new BoardModel(bench.Board, nominal.Probes, nominal.HasScaleError, solver);
        var values = new double[nominal.Measured.Length];
        truthModel.Predict([.. truthModel.Parameters.Select(p => p.Mean)], values, []);
        int gainIn = 0, gains = 0, resistanceIn = 0, resistances = 0, alarms = 0;
        for (var board = 0; board < boards; board++)
        {
            // The ranges follow the nominal values, so that the meter's scale errors are the same parameters for truth and fit.
            var plan = Read(bench, [.. WorkshopBoards.Everything(bench).Select((r, i) => r with { Value = values[i] })]);
            var model = new BoardModel(bench.Board, plan.Probes, plan.HasScaleError, solver);
            double[] truth = [.. model.Parameters.Select(p => draw(random, p))];
            var measured = new double[values.Length];
            model.Predict(truth, measured, []);
            for (var i = 0; i < measured.Length; i++) plan.Measured[i] = measured[i] + Math.Sqrt(plan.Noise[i]) * Gaussian(random);
            var result = BoardFit.Of(model, plan, fit);
            var estimates = Estimates.Of(result, 0.95);
            for (var k = 0; k < estimates.Length; k++)
            {
                var actual = model.Parameters[k].Value(truth[k]);
                var covered = actual >= estimates[k].Low && actual <= estimates[k].High ? 1 : 0;
                if (estimates[k].Kind == ParameterKind.Gain) (gainIn, gains) = (gainIn + covered, gains + 1);
                if (estimates[k].Kind == ParameterKind.Resistance) (resistanceIn, resistances) = (resistanceIn + covered, resistances + 1);
            }

            var p = VerdictRule.PValue(
                result.ChiSquared, measured.Length, result.NormalisedResiduals.Concat(result.PriorScores.Take(model.BoardParameterCount).Where(s => s != 0)));
            if (VerdictRule.Verdict(p, 0.05) == BoardVerdict.Disagrees) alarms++;
        }

        return ((double)gainIn / gains, (double)resistanceIn / resistances, (double)alarms / boards);
    }

    private static ReadingPlan Read(Bench bench, System.Collections.Immutable.ImmutableArray<Reading> readings) => ReadingPlan.Of(bench, new ReadingSet(null, readings));

    private static double Gaussian(Random random) =>
        Math.Sqrt(-2 * Math.Log(1 - random.NextDouble())) * Math.Cos(2 * Math.PI * random.NextDouble());
}
