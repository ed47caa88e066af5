using BenchCheck.Core.Diagnosis;
using BenchCheck.Core.Equations;
using BenchCheck.Core.Fitting;
using BenchCheck.Core.Metering;
using MathNet.Numerics.LinearAlgebra;

namespace BenchCheck.Core.Tests.Diagnosis;

/// <summary>
/// The slow way to score a fault, kept as an oracle: every reading of every trial solved by itself from a fresh factorisation of the whole
/// system with the meter in it, derivatives by central differences, all dense algebra by MathNet, nothing shared between hypotheses.
/// </summary>
internal sealed class FreshRefit(IReadOnlyList<Probe> probes)
{
    private const double Difference = 1e-5;

    /// <summary>Minimum of χ² and ln evidence from a start, by Gauss-Newton in the space of the readings.</summary>
    public (double ChiSquared, double LogEvidence) Score(FaultHypothesis hypothesis, double[] measured, double[] noise, double[] start)
    {
        // The model is only asked for its parameters, never for a prediction.
        var model = new BoardModel(hypothesis.Board, probes, new bool[probes.Count], new NetworkSolver(JunctionLaw.Exponential));
        var p = model.Parameters.Length;
        var mean = Vector<double>.Build.Dense(p, i => model.Parameters[i].Mean);
        var prior = Matrix<double>.Build.DenseDiagonal(p, p, i => model.Parameters[i].Sigma * model.Parameters[i].Sigma);
        var y = Vector<double>.Build.Dense(measured);
        var phi = Vector<double>.Build.Dense(start);
        var chi = double.PositiveInfinity;
        for (var step = 0; step < 60; step++)
        {
            var f = Predict(model, phi);
            var jacobian = Jacobian(model, phi);
            chi = Sum(y - f, noise) + Sum(phi - mean, prior.Diagonal().ToArray());
            var covariance = jacobian * prior * jacobian.Transpose() + Matrix<double>.Build.DenseOfDiagonalArray(noise);
            var innovation = y - f + jacobian * (phi - mean);
            var factor = covariance.Cholesky();
            var weighted = factor.Solve(innovation);
            var forecast = innovation * weighted;
            if (chi - forecast < 1e-12 * (1 + chi))
                return (chi, -0.5 * (chi + factor.DeterminantLn + measured.Length * Math.Log(2 * Math.PI)));
            var target = mean + prior * jacobian.Transpose() * weighted;
            var length = 1.0;
            while (length > 1e-4)
            {
                var trial = phi + length * (target - phi);
                var at = Sum(y - Predict(model, trial), noise) + Sum(trial - mean, prior.Diagonal().ToArray());
                if (at <= chi)
                {
                    phi = trial;
                    break;
                }

                length /= 3;
            }

            if (length <= 1e-4) break;
        }

        return (chi, double.NaN);
    }

    private Matrix<double> Jacobian(BoardModel model, Vector<double> phi)
    {
        var columns = new List<Vector<double>>();
        for (var k = 0; k < phi.Count; k++)
        {
            var up = phi.Clone();
            var down = phi.Clone();
            up[k] += Difference;
            down[k] -= Difference;
            columns.Add((Predict(model, up) - Predict(model, down)) / (2 * Difference));
        }

        return Matrix<double>.Build.DenseOfColumnVectors(columns);
    }

    private Vector<double> Predict(BoardModel model, Vector<double> phi) =>
        Vector<double>.Build.Dense(probes.Count, i => Read(model, phi, probes[i]));

    private static double Read(BoardModel model, Vector<double> phi, Probe probe)
    {
        double[] theta = [.. model.Table.Entries.Select(e => e.Nominal.Value)];
        for (var k = 0; k < model.BoardParameterCount; k++) theta[model.Parameters[k].ThetaIndex] = model.Parameters[k].Value(phi[k]);
        var network = NetworkCompiler.Compile(model.Board, model.Table, model.Board.FindCondition(probe.Condition)!);
        var (high, low) = (network.IndexOf(probe.At), network.IndexOf(probe.Against!));
        var (n, ports) = (network.Size, network.Ports.Length);
        var a = Matrix<double>.Build.Dense(n, n);
        var b = Vector<double>.Build.Dense(n);
        void Add(int row, int column, double value)
        {
            if (row >= 0 && column >= 0) a[row, column] += value;
        }
        void Conduct(int from, int to, double siemens)
        {
            Add(from, from, siemens);
            Add(to, to, siemens);
            Add(from, to, -siemens);
            Add(to, from, -siemens);
        }

        foreach (var e in network.Ties) Conduct(e.From, e.To, e.Leakage);
        foreach (var e in network.Conductors) Conduct(e.From, e.To, 1 / e.Ohms.Value(theta));
        Conduct(high, low, 1 / probe.Meter.InputOhms);
        foreach (var e in network.Voltages)
        {
            Add(e.Plus, e.Row, 1);
            Add(e.Minus, e.Row, -1);
            Add(e.Row, e.Plus, 1);
            Add(e.Row, e.Minus, -1);
            Add(e.Row, e.Row, -e.Ohms.Value(theta));
            b[e.Row] += e.Emf.Value(theta);
        }

        var c = Matrix<double>.Build.Dense(n, ports);
        var d = Matrix<double>.Build.Dense(ports, n);
        var curves = new JunctionCurve[ports];
        for (var k = 0; k < ports; k++)
        {
            var port = network.Ports[k];
            curves[k] = new JunctionCurve(port.Drop.Value(theta), port.ReferenceAmperes, port.Ideality.Value(theta) * network.ThermalVolts);
            void Column(int row, double value)
            {
                if (row >= 0) c[row, k] += value;
            }
            Column(port.High, 1 / port.Gain.Value(theta));
            Column(port.Low, -1 / port.Gain.Value(theta));
            Column(port.TransportFrom, 1);
            Column(port.TransportTo, -1);
            if (port.High >= 0) d[k, port.High] += 1;
            if (port.Low >= 0) d[k, port.Low] -= 1;
        }

        var z = Vector<double>.Build.Dense(Math.Max(1, ports));
        Vector<double> x = a.LU().Solve(b);
        for (var step = 0; ports > 0 && step < 400; step++)
        {
            // The whole system with every junction on its tangent, factored anew.
            var full = Matrix<double>.Build.Dense(n + ports, n + ports);
            full.SetSubMatrix(0, 0, a);
            full.SetSubMatrix(0, n, c);
            full.SetSubMatrix(n, 0, d);
            var right = Vector<double>.Build.Dense(n + ports);
            right.SetSubVector(0, n, b);
            for (var k = 0; k < ports; k++)
            {
                full[n + k, n + k] = -curves[k].SlopeOhms(z[k]) - network.Ports[k].SeriesOhms.Value(theta);
                right[n + k] = curves[k].Volts(z[k]) - curves[k].SlopeOhms(z[k]) * z[k];
            }

            var solution = full.LU().Solve(right);
            x = solution.SubVector(0, n);
            var worst = 0.0;
            for (var k = 0; k < ports; k++)
            {
                var amperes = solution[n + k];
                var volts = (d * x)[k] - network.Ports[k].SeriesOhms.Value(theta) * amperes;
                var next = amperes > z[k] ? amperes : curves[k].Amperes(volts);
                var miss = Math.Abs(volts - curves[k].Volts(amperes));
                worst = Math.Max(worst, amperes > z[k] ? miss : Math.Min(miss, Math.Abs(next - amperes) * 1e3));
                z[k] = next;
            }

            if (worst < 1e-12) break;
        }

        return (high < 0 ? 0 : x[high]) - (low < 0 ? 0 : x[low]);
    }

    private static double Sum(Vector<double> difference, double[] variance)
    {
        var sum = 0.0;
        for (var i = 0; i < variance.Length; i++) sum += difference[i] * difference[i] / variance[i];
        return sum;
    }
}
