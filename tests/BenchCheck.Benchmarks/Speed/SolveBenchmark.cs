using System.CommandLine;
using BenchCheck.Core.Boards;
using BenchCheck.Core.Checking;
using BenchCheck.Core.Equations;
using BenchCheck.Core.Fitting;
using BenchCheck.Core.Metering;
using BenchCheck.Core.Quantities;
using MathNet.Numerics;
using MathNet.Numerics.LinearAlgebra;

namespace BenchCheck.Benchmarks.Speed;

/// <summary>Prediction of every node with all its sensitivities on boards of 10 to 300 nodes, beside the same prediction differenced by MathNet's dense solve.</summary>
internal static class SolveBenchmark
{
    private static readonly int[] Nodes = [10, 30, 100, 300];

    /// <summary>Processor time that each size may take, so that small boards are repeated often enough.</summary>
    private static readonly TimeSpan Share = TimeSpan.FromSeconds(1.5);

    public static Command Command { get; } = Create();

    private static Command Create()
    {
        var command = new Command("solve", "Prediction and all sensitivities for 10, 30, 100, 300 nodes, beside MathNet's dense solve with differences.");
        command.SetAction(_ => Run());
        return command;
    }

    private static int Run()
    {
        var (sizes, ours) = (new List<double>(), new List<double>());
        Console.WriteLine("nodes  parameters     ours, ms   bytes   MathNet LU, ms   ratio");
        foreach (var nodes in Nodes)
        {
            var bench = Ladder(nodes);
            Probe[] probes = [.. bench.Board.Nodes.Skip(1).Select(n => new Probe(Condition.DefaultName, ReadingQuantity.Voltage, n, "GND", bench.Meters[0], 60))];
            var model = BoardModel.AtPlaces(bench.Board, probes, new NetworkSolver(JunctionLaw.Exponential));
            double[] phi = [.. model.Parameters.Select(p => p.Mean)];
            var predicted = new double[probes.Length];
            var jacobian = new double[probes.Length * phi.Length];
            model.Predict(phi, predicted, jacobian);
            var before = GC.GetAllocatedBytesForCurrentThread();
            model.Predict(phi, predicted, jacobian);
            var bytes = GC.GetAllocatedBytesForCurrentThread() - before;
            var fast = Milliseconds(() => model.Predict(phi, predicted, jacobian));

            // The other way: one dense factorisation of the nodal matrix a parameter, nothing else counted.
            var matrix = Matrix<double>.Build.Random(nodes, nodes, 1) + Matrix<double>.Build.DenseIdentity(nodes) * nodes;
            var right = Vector<double>.Build.Random(nodes, 2);
            var slow = Milliseconds(() => matrix.LU().Solve(right)) * (phi.Length + 1);
            Console.WriteLine($"{nodes,5}  {phi.Length,10}  {fast,11:F3}  {bytes,6}  {slow,15:F3}  {slow / fast,6:F1}");
            sizes.Add(Math.Log(nodes));
            ours.Add(Math.Log(fast));
        }

        Console.WriteLine($"time grows with the power {Fit.Line([.. sizes], [.. ours]).B:F2} of the nodes");
        return 0;
    }

    /// <summary>A ladder with cross links, a transistor every tenth rung.</summary>
    private static Bench Ladder(int nodes)
    {
        var random = new Random(nodes);
        var parts = new List<Part> { new Supply("V1", ["N1", "GND"], Nominal.Within(12, Tolerance.Percent(1))) };
        for (var i = 2; i <= nodes; i++)
        {
            parts.Add(R($"R{i}", $"N{i - 1}", $"N{i}", random));
            if (i % 3 == 0) parts.Add(R($"S{i}", $"N{i}", "GND", random));
            if (i % 5 == 0) parts.Add(R($"X{i}", $"N{i}", $"N{Math.Max(1, i - 7)}", random));
            if (i % 10 == 0)
                parts.Add(new Transistor(Transistor.Npn, $"Q{i}", [$"N{i - 4}", $"N{i - 1}", $"N{i}"], Nominal.Between(80, 320), Transistor.UsualDrop, Transistor.UsualSaturation));
        }

        return new Bench(new Board("ladder", "GND", BoardOrigin.NewBuild, [.. parts], []), [Meter.Usual], []);
    }

    private static Resistor R(string name, string a, string b, Random random) =>
        new(name, [a, b], Nominal.Within(Math.Pow(10, 2.5 + 2 * random.NextDouble()), Tolerance.Percent(5)));

    private static double Milliseconds(Action action)
    {
        action();
        var start = Environment.CpuUsage.TotalTime;
        var count = 0;
        while (Environment.CpuUsage.TotalTime - start < Share || count < 3)
        {
            action();
            count++;
        }

        return (Environment.CpuUsage.TotalTime - start).TotalMilliseconds / count;
    }
}
