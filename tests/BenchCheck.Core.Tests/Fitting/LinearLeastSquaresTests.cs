using BenchCheck.Core.Fitting;
using Xunit;

namespace BenchCheck.Core.Tests.Fitting;

public class LinearLeastSquaresTests(ITestOutputHelper output)
{
    /// <summary>NIST StRD linear regression, certified to 15 digits; difficulty as NIST grades it.</summary>
    [Theory]
    [InlineData("Norris", 12)] // lower
    [InlineData("Pontius", 12)] // lower
    [InlineData("NoInt1", 13)] // average
    [InlineData("Longley", 10)] // higher
    [InlineData("Wampler1", 9)] // higher
    [InlineData("Filip", 7)] // higher: the normal equations in double precision fail
    public void Certified_linear_estimates_and_deviations_are_met(string name, double leastDigits)
    {
        var set = CertifiedSet.Load(name);
        var fit = LinearLeastSquares.Fit(Design(set), set.Y, Ones(set.Rows));
        var digits = fit.Estimates.Zip(set.Estimates, ReferenceData.Digits).Min();
        var deviationDigits = set.Deviations.Select((sd, j) => ReferenceData.Digits(fit.Statistics.StandardDeviation(j), sd)).Min();
        var residualDigits = ReferenceData.Digits(fit.Statistics.ResidualDeviation, set.ResidualDeviation);
        output.WriteLine($"{name}: {digits:F1} digits, {deviationDigits:F1} of deviations, {residualDigits:F1} of the residuals");
        Assert.Equal(set.Columns, fit.Statistics.Rank);
        Assert.True(digits >= leastDigits, $"{digits:F1} digits");
        Assert.True(deviationDigits >= leastDigits - 1, $"{deviationDigits:F1} digits of the deviations");
        Assert.True(residualDigits >= leastDigits - 1, $"{residualDigits:F1} digits of the residual deviation");
    }

    private static double[] Ones(int count) => [.. Enumerable.Repeat(1.0, count)];

    private static double[] Design(CertifiedSet set)
    {
        Func<double[], IEnumerable<double>> row = set.Name switch
        {
            "Longley" => x => x.Prepend(1),
            "NoInt1" => x => x,
            _ => x => Enumerable.Range(0, set.Columns).Select(power => Math.Pow(x[0], power)),
        };
        return [.. set.X.SelectMany(row)];
    }

    /// <summary>
    /// A line through a thermometer's corrections, b = y₁ + y₂ (t − 20 °C). JCGM 100:2008, H.3, Tables H.6 and H.7; printed y₁, y₂, their
    /// deviations, r and b(30 °C) VERIFIED, s and H.3.5 from memory; the longer digits recomputed independently.
    /// </summary>
    [Fact]
    public void Thermometer_calibration_of_the_guide_is_reproduced()
    {
        var data = ReferenceData.Numbers("gum-h3-thermometer");
        double[] t = [.. data.Select(r => r[1])], b = [.. data.Select(r => r[2])];
        LinearFit LineAbout(double t0) => LinearLeastSquares.Fit([.. t.SelectMany(x => new[] { 1, x - t0 })], b, Ones(t.Length));

        var fit = LineAbout(20);
        var (y1, y2, statistics) = (fit.Estimates[0], fit.Estimates[1], fit.Statistics);
        Assert.Equal(-0.1712, y1, 5e-5);
        Assert.Equal(0.00218, y2, 5e-6);
        Assert.Equal(-0.17120379, y1, 5e-9);
        Assert.Equal(0.0021826977, y2, 5e-11);
        Assert.Equal(0.0028776, statistics.StandardDeviation(0), 5e-8);
        Assert.Equal(0.00066793877, statistics.StandardDeviation(1), 5e-12);
        Assert.Equal(-0.930429603, statistics.Correlation(0, 1), 5e-10);
        Assert.Equal(0.00349756396, statistics.ResidualDeviation, 5e-12);
        Assert.Equal(9, statistics.Redundancy);

        // b(30) with the covariance of both, JCGM 100:2008 eq. (H.15).
        double Predicted(LinearFit line, double dt) => line.Estimates[0] + line.Estimates[1] * dt;
        double Deviation(LinearFit line, double dt) => line.Statistics.ResidualDeviation
            * Math.Sqrt(line.Statistics.Covariance(0, 0) + 2 * dt * line.Statistics.Covariance(0, 1) + dt * dt * line.Statistics.Covariance(1, 1));
        Assert.Equal(-0.1494, Predicted(fit, 10), 5e-5);
        Assert.Equal(0.0041, Deviation(fit, 10), 5e-5);
        Assert.Equal(0.004138596, Deviation(fit, 10), 5e-10);

        // H.3.5: about the mean temperature the two are uncorrelated and the prediction is the same.
        var centred = LineAbout(t.Average());
        Assert.Equal(0, centred.Statistics.Correlation(0, 1), 1e-12);
        Assert.Equal(-0.16245455, centred.Estimates[0], 5e-9);
        Assert.Equal(0.00105456, centred.Statistics.StandardDeviation(0), 5e-9);
        Assert.Equal(Deviation(fit, 10), Deviation(centred, 30 - t.Average()), 1e-12);
    }
}
