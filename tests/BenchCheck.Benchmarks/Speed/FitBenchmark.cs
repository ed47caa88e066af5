using System.CommandLine;
using System.Diagnostics;
using BenchCheck.Core.Checking;
using BenchCheck.Core.Equations;
using BenchCheck.Core.Fitting;
using BenchCheck.Core.Metering;
using BenchCheck.Core.Tests;
using MathNet.Numerics.LinearAlgebra;
using MathNet.Numerics.Optimization;

namespace BenchCheck.Benchmarks.Speed;

/// <summary>One fit of a 12-reading, 9-part, one-transistor board beside the same residuals minimised by MathNet with numerical derivatives.</summary>
internal static class FitBenchmark
{
    private const int Rounds = 5;
    private const int OursPerRound = 200;
    private const int TheirsPerRound = 5;

    public static Command Command { get; } = Create();

    private static Command Create()
    {
        var command = new Command("fit", "Our fit beside MathNet's Levenberg-Marquardt on the same residuals.");
        command.SetAction(_ => Run());
        return command;
    }

    private static int Run()
    {
        var (model, plan) = Board();
        var p = model.Parameters.Length;
        double[] start = [.. model.Parameters.Select(x => x.Mean)];
        var phi = new double[p];
        var stacked = new StackedFit(model, plan.Measured, plan.Noise);
        var summary = default(LeastSquaresSummary);
        void Ours()
        {
            model.Forget();
            start.CopyTo(phi, 0);
            summary = stacked.Minimise(phi);
        }

        NonlinearMinimizationResult? found = null;
        void Theirs()
        {
            model.Forget();
            found = new LevenbergMarquardtMinimizer().FindMinimum(Objective(model, plan), Vector<double>.Build.Dense(start));
        }

        Ours();
        Theirs();
        var (ours, theirs) = (new List<double>(), new List<double>());
        var before = GC.GetAllocatedBytesForCurrentThread();
        Ours();
        var allocated = GC.GetAllocatedBytesForCurrentThread() - before;
        for (var round = 0; round < Rounds; round++)
        {
            ours.Add(Time(Ours, OursPerRound));
            theirs.Add(Time(Theirs, TheirsPerRound));
        }

        ours.Sort();
        theirs.Sort();
        var difference = Enumerable.Range(0, p).Max(i => Math.Abs(phi[i] - found!.MinimizingPoint[i]) / model.Parameters[i].Sigma);
        Console.WriteLine($"{plan.Measured.Length} readings, {model.Board.Parts.Length} parts, {p} parameters, {summary.Iterations} iterations");
        Console.WriteLine($"ours    {ours[Rounds / 2],10:F1} µs a fit, {allocated} bytes allocated, chi-squared {2 * summary.Cost:F9}");
        Console.WriteLine($"MathNet {theirs[Rounds / 2],10:F1} µs a fit, chi-squared {ChiSquared(model, plan, found!.MinimizingPoint):F9}, {found.Iterations} iterations");
        Console.WriteLine($"ratio {theirs[Rounds / 2] / ours[Rounds / 2]:F1} (floor 20); largest difference of a parameter {difference:E1} prior standard deviations");
        return 0;
    }

    private static double Time(Action action, int count)
    {
        var clock = Stopwatch.StartNew();
        for (var i = 0; i < count; i++) action();
        return clock.Elapsed.TotalMicroseconds / count;
    }

    private static (BoardModel Model, ReadingPlan Plan) Board()
    {
        var bench = WorkshopBoards.FanStage();
        var readings = WorkshopBoards.EveryNode(bench);
        var solver = new NetworkSolver(JunctionLaw.Exponential);
        var truth = BoardModel.AtPlaces(bench.Board, [.. readings.Select(r => Probe.Of(bench, r))], solver);
        var random = new Random(7);
        var values = new double[readings.Length];
        truth.Predict([.. truth.Parameters.Select(x => x.Mean + x.Sigma * (2 * random.NextDouble() - 1))], values, []);
        var plan = ReadingPlan.Of(bench, new ReadingSet(null, [.. readings.Select((r, i) => r with { Value = Math.Round(values[i], 3) })]));
        return (new BoardModel(bench.Board, plan.Probes, plan.HasScaleError, solver), plan);
    }

    /// <summary>The stacked system as a curve to be fitted: predictions over their uncertainties, then parameters over their tolerances.</summary>
    private static IObjectiveModel Objective(BoardModel model, ReadingPlan plan)
    {
        var (m, p) = (plan.Measured.Length, model.Parameters.Length);
        var f = new double[m];
        Vector<double> Stack(Vector<double> phi, Vector<double> x)
        {
            model.Predict(phi.AsArray() ?? phi.ToArray(), f, []);
            return Vector<double>.Build.Dense(m + p, i => i < m ? f[i] / Math.Sqrt(plan.Noise[i]) : phi[i - m] / model.Parameters[i - m].Sigma);
        }

        var y = Vector<double>.Build.Dense(m + p, i => i < m ? plan.Measured[i] / Math.Sqrt(plan.Noise[i]) : model.Parameters[i - m].Mean / model.Parameters[i - m].Sigma);
        return ObjectiveFunction.NonlinearModel(Stack, Vector<double>.Build.Dense(m + p, i => i), y, null, 2);
    }

    private static double ChiSquared(BoardModel model, ReadingPlan plan, Vector<double> phi)
    {
        var f = new double[plan.Measured.Length];
        model.Predict(phi.ToArray(), f, []);
        return f.Select((v, i) => Math.Pow(v - plan.Measured[i], 2) / plan.Noise[i]).Sum()
            + model.Parameters.Select((x, i) => Math.Pow((phi[i] - x.Mean) / x.Sigma, 2)).Sum();
    }
}
