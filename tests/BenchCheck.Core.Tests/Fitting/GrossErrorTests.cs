using BenchCheck.Core.Fitting;
using CsCheck;
using MathNet.Numerics.LinearAlgebra;
using Xunit;

namespace BenchCheck.Core.Tests.Fitting;

/// <summary>
/// One bad reading among redundant ones, in published networks. A set of balances A x = 0 is fitted through a basis of its null space;
/// the normalised residual is then the measurement test of Mah and Tamhane (AIChE J. 28 (1982) 828) and ‖r‖² the global test.
/// </summary>
public class GrossErrorTests
{
    /// <summary>
    /// Two sources, five resistors of 1 Ω, two ammeters, two voltmeters. Grainger and Stevenson, Power System Analysis (1994), examples 15.1
    /// to 15.4: numbers from memory, every digit recomputed independently.
    /// </summary>
    [Fact]
    public void Direct_current_circuit_of_Grainger_and_Stevenson_is_estimated_and_its_bad_voltmeter_found()
    {
        double[] h = [0.625, -0.125, -0.125, 0.625, 0.375, 0.125, 0.125, 0.375];
        double[] u = [0.1, 0.1, Math.Sqrt(0.02), Math.Sqrt(0.02)];

        var good = LinearLeastSquares.Fit(h, [9.01, 3.02, 6.98, 5.01], u);
        Matches([16.007193, 8.026140], good.Estimates, 5e-7);
        Assert.Equal(0.0435088, good.Statistics.SumOfSquares, 5e-8);
        Assert.Equal(2, good.Statistics.Redundancy);
        Assert.Equal(0.147494, good.Statistics.StandardUncertainty(0), 5e-7);
        Assert.Equal(0.147494, good.Statistics.StandardUncertainty(1), 5e-7);
        Assert.True(good.Statistics.SumOfSquares < ChiSquaredTest.Limit(2, 0.01));

        var bad = LinearLeastSquares.Fit(h, [9.01, 3.02, 6.98, 4.40], u);
        Matches([15.868070, 7.758596], bad.Estimates, 5e-7);
        Assert.Equal(15.100877, bad.Statistics.SumOfSquares, 5e-7);
        Assert.Equal(9.2103, ChiSquaredTest.Limit(2, 0.01), 5e-5);
        Assert.True(bad.Statistics.SumOfSquares > ChiSquaredTest.Limit(2, 0.01));
        Matches([1.417733, 3.514381, 0.469513, -3.880386], bad.Statistics.NormalisedResiduals, 5e-7);
        Assert.Equal(3, Worst(bad.Statistics));

        var dropped = LinearLeastSquares.Fit(h.AsSpan(0, 6), [9.01, 3.02, 6.98], u.AsSpan(0, 3));
        Matches([16.007391, 8.026522], dropped.Estimates, 5e-7);
        Assert.Equal(0.0434783, dropped.Statistics.SumOfSquares, 5e-8);
        Assert.All(dropped.Statistics.NormalisedResiduals, r => Assert.Equal(0.208514, Math.Abs(r), 5e-7));
    }

    /// <summary>Three resistors of 1 Ω. Monticelli, State Estimation in Electric Power Systems (1999), ch. 2: inputs VERIFIED, result from memory, recomputed.</summary>
    [Fact]
    public void Direct_current_circuit_of_Monticelli_spreads_its_misfit_evenly()
    {
        double[] h = [1, -1, -1, -1, 0, 0, 0, 1, 0, 0, 0, 1];
        double[] z = [1.0, -3.2, 0.8, 1.1];
        var fit = LinearLeastSquares.Fit(h, z, [1, 1, 1, 1]);
        Matches([3.125, 0.875, 1.175], fit.Estimates, 1e-12);
        Assert.Equal(0.0225, fit.Statistics.SumOfSquares, 1e-12);
        Assert.All(fit.Statistics.NormalisedResiduals, r => Assert.Equal(-0.15, r, 1e-12));
    }

    /// <summary>Three line flows, two angles. Wood and Wollenberg, Power Generation, Operation and Control, ch. 12: inputs and subsets VERIFIED, result from memory, recomputed.</summary>
    [Fact]
    public void Three_bus_network_of_Wood_and_Wollenberg_is_estimated()
    {
        double[] h = [5, -5, 2.5, 0, 0, -4];
        var fit = LinearLeastSquares.Fit(h, [0.62, 0.06, 0.37], [0.01, 0.01, 0.01]);
        Matches([0.028571, -0.094286], fit.Estimates, 5e-7);
        Assert.Equal(2.142857, fit.Statistics.SumOfSquares, 5e-7);
        Assert.All(fit.Statistics.NormalisedResiduals, r => Assert.Equal(1.46385, Math.Abs(r), 5e-6));

        var fromTwo = LinearLeastSquares.Fit(h.AsSpan(2), [0.06, 0.37], [0.01, 0.01]);
        Assert.Equal(0.5825, 5 * fromTwo.Estimates[0] - 5 * fromTwo.Estimates[1], 1e-12);
        Assert.True(double.IsNaN(fromTwo.Statistics.ResidualDeviation));
        Assert.All(fromTwo.Statistics.NormalisedResiduals, r => Assert.True(double.IsNaN(r)));
    }

    /// <summary>
    /// Heat exchanger with bypass, six flows, four balances. Narasimhan and Jordache, Data Reconciliation and Gross Error Detection (2000),
    /// ch. 1: flows VERIFIED, reconciled flows from memory, statistics recomputed independently.
    /// </summary>
    [Fact]
    public void Bypass_of_Narasimhan_and_Jordache_is_reconciled()
    {
        var (fit, flows) = Reconcile("narasimhan-jordache-2000-bypass", 2);
        Matches([100.22, 64.50, 35.72, 64.50, 35.72, 100.22], flows, 1e-9);
        Assert.Equal(6.4075, fit.SumOfSquares, 1e-9);
        Assert.Equal(4, fit.Redundancy);
        Assert.True(fit.SumOfSquares < ChiSquaredTest.Limit(4, 0.05));
        Matches([2.069819, -0.061237, -1.310477, -0.367423, 0.881816, -1.641158], fit.NormalisedResiduals, 5e-7);
        Assert.Equal(2.631038, LargestResidualTest.Limit(6, 0.05), 5e-7);
    }

    /// <summary>As above with stream 2 read 4 too high (68.45, VERIFIED).</summary>
    [Fact]
    public void Bypass_with_one_flow_read_too_high_names_that_flow_and_the_error()
    {
        var (a, y, u) = Network("narasimhan-jordache-2000-bypass", 2);
        y[1] = 68.45;
        var (fit, flows) = Reconcile(a, y, u);
        Matches([100.886667, 65.833333, 35.053333, 65.833333, 35.053333, 100.886667], flows, 5e-7);
        Assert.Equal(16.674167, fit.SumOfSquares, 5e-7);
        Assert.True(fit.SumOfSquares > ChiSquaredTest.Limit(4, 0.05));
        Matches([1.253322, 3.204749, -0.493980, -2.000417, 1.698313, -2.457655], fit.NormalisedResiduals, 5e-7);
        Assert.Equal(1, Worst(fit));
        Assert.True(fit.NormalisedResiduals[1] > LargestResidualTest.Limit(6, 0.05));

        // The generalised likelihood ratio of a bias in each reading is its square, and the bias the residual over its redundancy
        // number (Narasimhan and Mah, AIChE J. 33 (1987) 1514).
        Matches([1.570817, 10.270417, 0.244017, 4.001667, 2.884267, 6.040067], [.. fit.NormalisedResiduals.Select(r => r * r)], 5e-6);
        Assert.Equal(3.925, (y[1] - flows[1]) / fit.RedundancyNumbers[1], 1e-9);

        // Without the suspected reading the rest agrees.
        var (rest, restFlows) = Reconcile(a, y, [u[0], 1e6, .. u[2..]]);
        Matches([100.2325, 64.525, 35.7075, 64.525, 35.7075, 100.2325], restFlows, 1e-6);
        Assert.Equal(6.403750, rest.SumOfSquares, 5e-7);
    }

    /// <summary>As above without a meter in stream 3, after Crowe, Garcia Campos and Hrymak, AIChE J. 29 (1983) 881.</summary>
    [Theory]
    [InlineData(64.45, 100.4875, 64.2325, 36.255, 4.690150)]
    [InlineData(68.45, 100.9875, 65.7325, 35.255, 16.430150)]
    public void Bypass_with_an_unmeasured_flow_is_reconciled_and_that_flow_found(double y2, double f1, double f2, double f3, double sum)
    {
        // Rows f1 f2 f4 f5 f6 over f2 and f3.
        var fit = LinearLeastSquares.Fit([1, 1, 1, 0, 1, 0, 0, 1, 1, 1], [101.91, y2, 64.20, 36.44, 98.88], [1, 1, 1, 1, 1]);
        Assert.Equal(f1, fit.Estimates[0] + fit.Estimates[1], 1e-9);
        Assert.Equal(f2, fit.Estimates[0], 1e-9);
        Assert.Equal(f3, fit.Estimates[1], 1e-9);
        Assert.Equal(sum, fit.Statistics.SumOfSquares, 5e-7);
        Assert.Equal(3, fit.Statistics.Redundancy);
        if (y2 > 68) Matches([1.166880, 3.437396, -1.938476, 1.675843, -2.665800], fit.Statistics.NormalisedResiduals, 5e-7);
    }

    /// <summary>Rosenberg, Mah, Iordache, Ind. Eng. Chem. Res. 26 (1987) 555: data VERIFIED, statistics recomputed independently.</summary>
    [Fact]
    public void Seven_flows_of_Rosenberg_Mah_and_Iordache_are_reconciled()
    {
        var (fit, flows) = Reconcile("rosenberg-mah-iordache-1987", 1);
        Matches([4.904952, 14.798619, 14.798619, 4.813762, 9.984857, 5.079905, 4.904952], flows, 5e-7);
        Assert.Equal(0.068480, fit.SumOfSquares, 5e-7);
        Assert.Equal(4, fit.Redundancy);
    }

    /// <summary>Serth and Heenan, AIChE J. 32 (1986) 733: 28 steam meters, data VERIFIED, statistics recomputed independently.</summary>
    [Fact]
    public void Steam_metering_of_Serth_and_Heenan_holds_no_gross_error()
    {
        var (fit, _) = Reconcile("serth-heenan-1986-steam-network", 2);
        Assert.Equal(10.685693, fit.SumOfSquares, 5e-7);
        Assert.Equal(11, fit.Redundancy);
        Assert.True(fit.SumOfSquares < ChiSquaredTest.Limit(11, 0.05));
        var worst = Worst(fit);
        Assert.Equal(6, worst);
        Assert.Equal(2.5125, Math.Abs(fit.NormalisedResiduals[worst]), 5e-5);
        Assert.Equal(2.1200, Math.Abs(fit.NormalisedResiduals[19]), 5e-5);
        Assert.Equal(3.116482, LargestResidualTest.Limit(28, 0.05), 5e-7);
    }

    /// <summary>Šidák limits at 5 %, computed independently.</summary>
    [Theory]
    [InlineData(1, 1.959964), InlineData(4, 2.490915), InlineData(7, 2.682801), InlineData(10, 2.799625)]
    public void Limit_of_the_largest_residual_grows_with_the_number_of_readings(int count, double limit)
    {
        Assert.Equal(limit, LargestResidualTest.Limit(count, 0.05), 5e-7);
        Assert.Equal(0.05, LargestResidualTest.PValue(-limit, count), 1e-7);
    }

    /// <summary>Two-sided normal tails: 4 standard deviations 6.3342484e-5 (40-digit arithmetic), and 30 far below what one minus a probability can hold (2 φ(30)/30 = 9.8e-198, the leading term of the tail).</summary>
    [Fact]
    public void Probability_of_a_far_residual_keeps_its_digits()
    {
        Assert.Equal(6.3342484e-5, LargestResidualTest.PValue(4, 1), 5e-13);
        Assert.Equal(3 * 6.3342484e-5, LargestResidualTest.PValue(4, 3), 2e-8);
        Assert.InRange(LargestResidualTest.PValue(30, 10), 1e-197, 1e-195);
    }

    [Fact]
    public void With_one_redundant_reading_all_normalised_residuals_are_equal_in_size() =>
        (from n in Gen.Int[1, 6] from a in Draw.Plain(-5, 5).Array[n * (n + 1)] from y in Draw.Plain(-5, 5).Array[n + 1] select (n, a, y)).Sample(m =>
        {
            if (!(Matrix<double>.Build.Dense(m.n, m.n + 1, m.a).ConditionNumber() <= 1e4)) return;
            var fit = LinearLeastSquares.Fit(m.a, m.y, [.. Enumerable.Range(1, m.n + 1).Select(i => 0.1 * i)]).Statistics;
            for (var i = 0; i <= m.n; i++)
            {
                // A reading that the others hardly check has none, or rounding only.
                if (fit.RedundancyNumbers[i] < 1e-6) continue;
                Assert.Equal(Math.Sqrt(fit.SumOfSquares), Math.Abs(fit.NormalisedResiduals[i]), 1e-6 * (1 + Math.Sqrt(fit.SumOfSquares)));
            }
        });

    /// <summary>rN_i² is what ‖r‖² falls by when reading i is left out, so it is the likelihood ratio of a bias in it.</summary>
    [Fact]
    public void Squared_normalised_residual_is_what_leaving_the_reading_out_gains() => Problems.Sample(m =>
    {
        if (!IsWellPosed(m)) return;
        var all = LinearLeastSquares.Fit(m.X, m.Y, m.U).Statistics;
        for (var i = 0; i < m.Y.Length; i++)
        {
            if (!(all.RedundancyNumbers[i] > 1e-3)) continue;
            var without = LinearLeastSquares.Fit(
                [.. m.X[..(i * m.Columns)], .. m.X[((i + 1) * m.Columns)..]], [.. m.Y[..i], .. m.Y[(i + 1)..]], [.. m.U[..i], .. m.U[(i + 1)..]]).Statistics;
            Assert.Equal(all.SumOfSquares - without.SumOfSquares, all.NormalisedResiduals[i] * all.NormalisedResiduals[i], 1e-6 * (1 + all.SumOfSquares));
        }
    });

    /// <summary>The residual covariance formed explicitly with MathNet.Numerics.</summary>
    [Fact]
    public void Redundancy_numbers_are_the_diagonal_of_the_residual_covariance_and_sum_to_the_redundancy() => Problems.Sample(m =>
    {
        if (!IsWellPosed(m)) return;
        var j = Matrix<double>.Build.Dense(m.Y.Length, m.Columns, (r, c) => m.X[r * m.Columns + c] / m.U[r]);
        var hat = j * j.TransposeThisAndMultiply(j).Inverse() * j.Transpose();
        var fit = LinearLeastSquares.Fit(m.X, m.Y, m.U).Statistics;
        for (var i = 0; i < m.Y.Length; i++) Assert.Equal(1 - hat[i, i], fit.RedundancyNumbers[i], 1e-6);
        Assert.Equal(fit.Redundancy, fit.RedundancyNumbers.Sum(), 1e-10);
    });

    private static readonly Gen<(int Columns, double[] X, double[] Y, double[] U)> Problems =
        from n in Gen.Int[1, 4]
        from extra in Gen.Int[1, 6]
        from x in Draw.Plain(-5, 5).Array[n * (n + extra)]
        from y in Draw.Plain(-5, 5).Array[n + extra]
        from u in Gen.Double[0.5, 2].Array[n + extra]
        select (n, x, y, u);

    private static bool IsWellPosed((int Columns, double[] X, double[] Y, double[] U) m) =>
        Matrix<double>.Build.Dense(m.Columns, m.Y.Length, m.X).ConditionNumber() <= 1e3;

    /// <summary>A set of balances: one column a stream, one row a node.</summary>
    private static (Matrix<double> A, double[] Y, double[] U) Network(string name, int measuredColumn)
    {
        var rows = ReferenceData.Numbers(name);
        return (Matrix<double>.Build.DenseOfColumnArrays(rows.Select(r => r[(measuredColumn + 2)..])),
            [.. rows.Select(r => r[measuredColumn])], [.. rows.Select(r => r[measuredColumn + 1])]);
    }

    private static (LeastSquaresStatistics Fit, double[] Flows) Reconcile(string name, int measuredColumn)
    {
        var (a, y, u) = Network(name, measuredColumn);
        return Reconcile(a, y, u);
    }

    private static (LeastSquaresStatistics Fit, double[] Flows) Reconcile(Matrix<double> a, double[] y, double[] u)
    {
        var basis = Matrix<double>.Build.DenseOfColumnVectors(a.Kernel());
        var fit = LinearLeastSquares.Fit(basis.ToRowMajorArray(), y, u);
        return (fit.Statistics, (basis * Vector<double>.Build.Dense(fit.Estimates)).ToArray());
    }

    private static int Worst(LeastSquaresStatistics fit) => fit.NormalisedResiduals.IndexOf(fit.NormalisedResiduals.MaxBy(Math.Abs));

    private static void Matches(IReadOnlyList<double> published, IReadOnlyList<double> values, double tolerance)
    {
        Assert.Equal(published.Count, values.Count);
        for (var i = 0; i < published.Count; i++) Assert.Equal(published[i], values[i], tolerance);
    }
}
