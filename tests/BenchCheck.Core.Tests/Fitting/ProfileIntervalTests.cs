using BenchCheck.Core.Fitting;
using CsCheck;
using MathNet.Numerics.LinearAlgebra;
using Xunit;

namespace BenchCheck.Core.Tests.Fitting;

public class ProfileIntervalTests
{
    /// <summary>
    /// Reaction rate over concentration, f = V x/(K + x). Data VERIFIED (Montgomery, Peck and Vining, Introduction to Linear Regression Analysis,
    /// Table 12.2); estimates 212.7 and 0.06412, s 10.93 and the 95 % profile limits from memory of Bates and Watts, Nonlinear
    /// Regression Analysis (1988), App. 4; t(10) = 2.228139 as tabulated.
    /// </summary>
    [Fact]
    public void Puromycin_intervals_of_Bates_and_Watts_are_met()
    {
        double[] x = [0.02, 0.02, 0.06, 0.06, 0.11, 0.11, 0.22, 0.22, 0.56, 0.56, 1.10, 1.10];
        double[] y = [76, 47, 97, 107, 123, 139, 159, 152, 191, 201, 207, 200];
        Residuals model = (theta, r, j) =>
        {
            for (var i = 0; i < x.Length; i++)
            {
                var q = theta[1] + x[i];
                r[i] = theta[0] * x[i] / q - y[i];
                if (!j.IsEmpty) (j[2 * i], j[2 * i + 1]) = (x[i] / q, -theta[0] * x[i] / (q * q));
            }
        };
        double[] estimate = [205, 0.08];
        var workspace = new LeastSquaresWorkspace(12, 2);
        var summary = LevenbergMarquardt.Minimise(model, estimate, workspace, LeastSquaresTolerances.Tight);
        var covariance = new double[4];
        workspace.Covariance(covariance);
        var s = Math.Sqrt(2 * summary.Cost / 10);
        Assert.Equal(212.7, estimate[0], 0.05);
        Assert.Equal(0.06412, estimate[1], 5e-6);
        Assert.Equal(10.93, s, 0.005);

        var profile = new ProfileInterval(model, 12, estimate, summary.Cost, LeastSquaresTolerances.Usual);
        var v = profile.Find(0, s * Math.Sqrt(covariance[0]), 2.228139 * s, 0, 1000);
        var k = profile.Find(1, s * Math.Sqrt(covariance[3]), 2.228139 * s, 0, 10);
        Assert.Equal(197.30, v.Low, 0.005);
        Assert.Equal(229.29, v.High, 0.005);
        Assert.Equal(0.04692, k.Low, 1e-5);
        Assert.Equal(0.08616, k.High, 1e-5);
    }

    /// <summary>In a linear model the profile is the parabola of the covariance: θ̂ ± z u.</summary>
    [Fact]
    public void Linear_model_has_the_symmetric_interval() =>
        (from n in Gen.Int[1, 4] from a in Draw.Plain(-3, 3).Array[n * (n + 2)] from y in Draw.Plain(-3, 3).Array[n + 2] from z in Gen.Double[1, 3] select (n, a, y, z))
        .Sample(m =>
        {
            var rows = m.n + 2;
            if (!(Matrix<double>.Build.Dense(m.n, rows, m.a).ConditionNumber() <= 1e3)) return;
            Residuals model = (theta, r, j) =>
            {
                for (var i = 0; i < rows; i++)
                {
                    r[i] = -m.y[i];
                    for (var c = 0; c < m.n; c++) r[i] += m.a[i * m.n + c] * theta[c];
                }

                if (!j.IsEmpty) m.a.CopyTo(j);
            };
            var fit = LinearLeastSquares.Fit(m.a, m.y, [.. Enumerable.Repeat(1.0, rows)]);
            var profile = new ProfileInterval(model, rows, fit.Estimates, 0.5 * fit.Statistics.SumOfSquares, LeastSquaresTolerances.Usual);
            for (var c = 0; c < m.n; c++)
            {
                var u = fit.Statistics.StandardUncertainty(c);
                // A first step of another length than the right one must not matter.
                var interval = profile.Find(c, 0.3 * u, m.z, fit.Estimates[c] - 1e3 * u, fit.Estimates[c] + 1e3 * u);
                Assert.Equal(fit.Estimates[c] - m.z * u, interval.Low, 1e-4 * u);
                Assert.Equal(fit.Estimates[c] + m.z * u, interval.High, 1e-4 * u);
            }
        });

    /// <summary>
    /// The ratio of two measured quantities, θ = a/b: profiling over b gives (a − θ b)² = z² (u_a² + θ² u_b²), Fieller's limits, of which one
    /// or both vanish when b is not clearly off zero. Fieller, J. Roy. Statist. Soc. B 16 (1954) 175.
    /// </summary>
    [Fact]
    public void Ratio_of_two_readings_has_the_limits_of_Fieller() =>
        Gen.Select(Gen.Double[1, 20], Gen.Double[0.5, 10], Gen.Double[0.1, 1], Gen.Double[0.1, 1]).Sample((a, b, ua, ub) =>
        {
            const double z = 2;
            Residuals model = (theta, r, j) =>
            {
                (r[0], r[1]) = ((theta[0] * theta[1] - a) / ua, (theta[1] - b) / ub);
                if (!j.IsEmpty) (j[0], j[1], j[2], j[3]) = (theta[1] / ua, theta[0] / ua, 0, 1 / ub);
            };
            var g = b * b - z * z * ub * ub;
            if (Math.Abs(g) < 0.1 * b * b) return; // at the edge of being bounded
            var u = Math.Sqrt(ua * ua + a * a / (b * b) * ub * ub) / b;
            var interval = new ProfileInterval(model, 2, [a / b, b], 0, LeastSquaresTolerances.Usual).Find(0, u, z, -1e9, 1e9);
            if (g > 0)
            {
                var root = Math.Sqrt(a * a * b * b - g * (a * a - z * z * ua * ua));
                Assert.Equal((a * b + root) / g, interval.High, 1e-4 * interval.High);
                Assert.Equal((a * b - root) / g, interval.Low, 1e-4 * (u + Math.Abs(interval.Low)));
            }
            else
            {
                Assert.Equal(double.PositiveInfinity, interval.High);
            }
        });

    /// <summary>A divider that a huge resistance hardly loads: readings near full scale bound it from below only. Exact by inversion.</summary>
    [Fact]
    public void A_parameter_that_saturates_is_bounded_on_one_side_only()
    {
        const double read = 0.98, u = 0.02, z = 2;
        Residuals model = (theta, r, j) =>
        {
            var ohms = Math.Exp(theta[0]);
            r[0] = (ohms / (1 + ohms) - read) / u;
            if (!j.IsEmpty) j[0] = ohms / ((1 + ohms) * (1 + ohms)) / u;
        };
        var estimate = Math.Log(read / (1 - read));
        var interval = new ProfileInterval(model, 1, [estimate], 0, LeastSquaresTolerances.Usual).Find(0, 1, z, estimate - 30, estimate + 30);
        var least = read - z * u;
        Assert.Equal(Math.Log(least / (1 - least)), interval.Low, 1e-5);
        Assert.Equal(double.PositiveInfinity, interval.High);
    }

    [Fact]
    public void A_parameter_that_nothing_determines_has_no_bounds()
    {
        Residuals model = (theta, r, j) =>
        {
            r[0] = theta[0] + theta[1] - 1;
            if (!j.IsEmpty) (j[0], j[1]) = (1, 1);
        };
        var interval = new ProfileInterval(model, 1, [0.5, 0.5], 0, LeastSquaresTolerances.Usual).Find(0, double.PositiveInfinity, 2, -50, 50);
        Assert.Equal(new CoverageInterval(double.NegativeInfinity, double.PositiveInfinity), interval);
    }

    /// <summary>r = ln t − ln 3 with t &gt; 0 only: the search must turn back at zero. Exact: 3 e^(±z).</summary>
    [Fact]
    public void A_bound_near_the_edge_of_the_model_is_found()
    {
        Residuals model = (theta, r, j) =>
        {
            r[0] = Math.Log(theta[0] / 3);
            if (!j.IsEmpty) j[0] = 1 / theta[0];
        };
        var interval = new ProfileInterval(model, 1, [3], 0, LeastSquaresTolerances.Usual).Find(0, 3, 2, -100, 100);
        Assert.Equal(3 * Math.Exp(-2), interval.Low, 1e-5);
        Assert.Equal(3 * Math.Exp(2), interval.High, 1e-4);
    }
}
