using BenchCheck.Core.Boards;
using BenchCheck.Core.Equations;
using BenchCheck.Core.Fitting;
using BenchCheck.Core.Metering;
using BenchCheck.Core.Quantities;
using Xunit;

namespace BenchCheck.Core.Tests.Diagnosis;

/// <summary>The evidence of a fit against integrals that need no approximation.</summary>
public class EvidenceTests
{
    [Fact]
    public void Evidence_equals_the_integral_over_a_resistance_by_quadrature()
    {
        // A divider with one toleranced resistor: p(y) = ∫ N(y; f(φ), u²) N(φ; φ0, σ²) dφ, by the trapezoidal rule on 40,001 points over ±10 σ.
        var board = new BoardSketch().Supply("V1", "A", 10).Resistor("R1", "A", "B", 10e3, 5).Resistor("R2", "B", "0", 10e3).Board;
        var meter = new Meter("ideal", double.PositiveInfinity, 6000, new MeterFunction(0, 2, [60]));
        var probe = new Probe(Condition.DefaultName, ReadingQuantity.Voltage, "B", "0", meter, 60);
        var model = new BoardModel(board, [probe], [false], new NetworkSolver(JunctionLaw.ConstantDrop));
        const double measured = 5.08;
        const double noise = 0.02 * 0.02;
        var evidence = new EvidenceFit().Fit(model, [measured], [noise]);

        var parameter = Assert.Single(model.Parameters);
        const int points = 40_001;
        var integral = 0.0;
        for (var i = 0; i < points; i++)
        {
            var t = -10 + 20.0 * i / (points - 1);
            var volts = 10 * 10e3 / (10e3 + Math.Exp(parameter.Mean + t * parameter.Sigma));
            integral += Density(measured - volts, noise) * Density(t, 1) * 20 / (points - 1);
        }

        Assert.Equal(Math.Log(integral), evidence.LogEvidence, 2e-3);
    }

    [Fact]
    public void Evidence_of_a_linear_board_is_the_normal_density_of_its_readings()
    {
        // Supplies enter linearly, so Laplace's approximation is exact: y ~ N(f, R + J Σ Jᵀ), here the 2×2 density written out.
        var board = new BoardSketch().Supply("V1", "A", 10, percent: 2).Supply("V2", "C", 5, percent: 4).Resistor("R1", "A", "B", 1e3).Resistor("R2", "B", "C", 1e3).Board;
        var meter = new Meter("ideal", double.PositiveInfinity, 6000, new MeterFunction(0, 2, [60]));
        Probe At(string node) => new(Condition.DefaultName, ReadingQuantity.Voltage, node, "0", meter, 60);
        var model = new BoardModel(board, [At("A"), At("B")], [false, false], new NetworkSolver(JunctionLaw.ConstantDrop));
        double[] y = [10.1, 7.43];
        double[] r = [1e-4, 4e-4];
        var evidence = new EvidenceFit().Fit(model, y, r);

        var (s1, s2) = (0.2 * 0.2 / 3, 0.2 * 0.2 / 3);
        var (a, b, c) = (s1 + r[0], s1 / 2, (s1 + s2) / 4 + r[1]);
        var determinant = a * c - b * b;
        var (d1, d2) = (y[0] - 10, y[1] - 7.5);
        var chi = (c * d1 * d1 - 2 * b * d1 * d2 + a * d2 * d2) / determinant;
        Assert.Equal(chi, evidence.ChiSquared, 1e-6);
        Assert.Equal(-0.5 * (chi + Math.Log(determinant)) - Math.Log(2 * Math.PI), evidence.LogEvidence, 1e-6);
    }

    private static double Density(double x, double variance) => Math.Exp(-x * x / (2 * variance)) / Math.Sqrt(2 * Math.PI * variance);
}
