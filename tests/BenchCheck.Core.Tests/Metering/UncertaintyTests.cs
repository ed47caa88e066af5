using BenchCheck.Core.Metering;
using MathNet.Numerics.Statistics;
using Xunit;

namespace BenchCheck.Core.Tests.Metering;

/// <summary>Worked examples of the guides. "Guide" is JCGM 100:2008; VERIFIED marks numbers seen in a stored copy, memory those recalled and recomputed.</summary>
public class UncertaintyTests
{
    // Guide, H.2, Table H.2: five simultaneous readings of voltage, current and phase. VERIFIED.
    private static readonly double[] Volts = [5.007, 4.994, 5.005, 4.990, 4.999];
    private static readonly double[] Amperes = [19.663e-3, 19.639e-3, 19.640e-3, 19.685e-3, 19.678e-3];
    private static readonly double[] Radians = [1.0456, 1.0438, 1.0468, 1.0428, 1.0433];

    /// <summary>Guide, Table H.2, lower part. VERIFIED; more digits recomputed.</summary>
    [Fact]
    public void Means_and_deviations_of_the_five_simultaneous_readings_are_those_of_the_guide()
    {
        Matches(4.9990, 0.0032, 3.20936131e-3, Repeats.Of(Volts), 1);
        Matches(19.6610, 0.0095, 9.47100839e-3, Repeats.Of(Amperes), 1e3);
        Matches(1.04446, 0.00075, 7.52063827e-4, Repeats.Of(Radians), 1);
        Assert.Equal(4, Repeats.Of(Volts).DegreesOfFreedom);

        static void Matches(double mean, double printed, double recomputed, Repeats repeats, double scale)
        {
            Assert.Equal(mean, scale * repeats.Mean, 1e-9);
            Assert.Equal(printed, scale * repeats.Uncertainty, 5e-5);
            Assert.True(ReferenceData.Digits(scale * repeats.Uncertainty, recomputed) > 8);
        }
    }

    /// <summary>
    /// Guide, Tables H.3 and H.4: R = (V/I) cos φ, X = (V/I) sin φ, Z = V/I. VERIFIED: 127.732 Ω u 0.071, 219.847 Ω u 0.295, 254.260 Ω u 0.236. The
    /// printed u(X) is that of rounded inputs: at full precision it is 0.2956.
    /// </summary>
    [Fact]
    public void Resistance_reactance_and_impedance_of_the_guide_follow_from_correlated_readings()
    {
        var (v, i, phi) = (Repeats.Of(Volts), Repeats.Of(Amperes), Repeats.Of(Radians));
        double[] correlations = [.. new[] { Volts, Amperes, Radians }.SelectMany(a => new[] { Volts, Amperes, Radians }.Select(b => Correlation.Pearson(a, b)))];
        Assert.Equal(-0.36, correlations[1], 0.005);
        Assert.Equal(0.86, correlations[2], 0.005);
        Assert.Equal(-0.65, correlations[5], 0.0051);

        var z = v.Mean / i.Mean;
        var (r, x) = (z * Math.Cos(phi.Mean), z * Math.Sin(phi.Mean));
        double U(double perVolt, double perAmpere, double perRadian) =>
            UncertaintyPropagation.Correlated([perVolt * v.Uncertainty, perAmpere * i.Uncertainty, perRadian * phi.Uncertainty], correlations);
        Assert.Equal(127.732, r, 5e-4);
        Assert.Equal(219.847, x, 5e-4);
        Assert.Equal(254.260, z, 5e-4);
        Assert.Equal(0.071, U(r / v.Mean, -r / i.Mean, -x), 5e-4);
        Assert.Equal(0.295, U(x / v.Mean, -x / i.Mean, r), 1e-3);
        Assert.Equal(0.236, U(z / v.Mean, -z / i.Mean, 0), 5e-4);
        Assert.True(ReferenceData.Digits(U(r / v.Mean, -r / i.Mean, -x), 0.07107141) > 6);
        Assert.True(ReferenceData.Digits(U(x / v.Mean, -x / i.Mean, r), 0.29558168) > 6);
        Assert.True(ReferenceData.Digits(U(z / v.Mean, -z / i.Mean, 0), 0.23633613) > 6);
    }

    /// <summary>As above from the inputs as printed. VERIFIED: u(R) = 0.0699787279883717.</summary>
    [Fact]
    public void Rounded_inputs_of_the_guide_give_their_own_uncertainty()
    {
        double v = 4.999, i = 19.661e-3, phi = 1.04446;
        var (r, x) = (v / i * Math.Cos(phi), v / i * Math.Sin(phi));
        var u = UncertaintyPropagation.Correlated(
            [r / v * 0.0032, -r / i * 0.0095e-3, -x * 0.00075], [1, -0.36, 0.86, -0.36, 1, -0.65, 0.86, -0.65, 1]);
        Assert.True(ReferenceData.Digits(u, 0.0699787279883717) > 10);
    }

    /// <summary>Guide, H.1, end gauge of 50 mm, nm. Inputs and u_c 32 nm VERIFIED; ν_eff 16, t₉₉ 2.92 and U 93 nm from memory, recomputed.</summary>
    [Fact]
    public void End_gauge_of_the_guide_has_the_uncertainty_and_degrees_of_freedom_printed()
    {
        double[] difference = [5.8, 3.9, 6.7];
        Assert.Equal(9.7, UncertaintyPropagation.Independent(difference), 0.05);
        Assert.Equal(25.6, UncertaintyPropagation.EffectiveDegreesOfFreedom(difference, [24, 5, 8]), 0.2);

        double[] u = [25, 5.8, 3.9, 6.7, 2.88679, 16.599];
        var combined = UncertaintyPropagation.Independent(u);
        var degrees = UncertaintyPropagation.EffectiveDegreesOfFreedom(u, [18, 24, 5, 8, 50, 2]);
        Assert.Equal(32, combined, 0.5);
        Assert.Equal(16, Math.Floor(degrees));
        Assert.Equal(2.92, CoverageFactor.StudentT(0.99, 16), 0.005);
        // The guide multiplies the rounded 32 nm.
        Assert.Equal(93, CoverageFactor.StudentT(0.99, 16) * Math.Round(combined), 0.5);
    }

    /// <summary>
    /// Guide, G.4.1, example, percent: u_c 1.03, ν_eff 19.0 VERIFIED; t₉₅(19) 2.09 and U 2.15 from memory, recomputed. The guide rounds ν_eff to
    /// 19.0 before it truncates; at the fraction 18.9987 the factor is the same to the digits printed.
    /// </summary>
    [Fact]
    public void Effective_degrees_of_freedom_of_the_guide_are_met()
    {
        double[] u = [0.25, 0.57, 0.82];
        var degrees = UncertaintyPropagation.EffectiveDegreesOfFreedom(u, [9, 4, 14]);
        Assert.Equal(1.03, UncertaintyPropagation.Independent(u), 0.005);
        Assert.Equal(19.0, degrees, 0.05);
        Assert.Equal(18.99874, degrees, 5e-5);
        Assert.Equal(2.09, CoverageFactor.StudentT(0.95, degrees), 0.005);
        Assert.Equal(2.15, CoverageFactor.StudentT(0.95, degrees) * UncertaintyPropagation.Independent(u), 0.006);
    }

    [Fact]
    public void Inputs_that_are_known_leave_the_degrees_of_freedom_infinite() => Assert.Equal(
        double.PositiveInfinity, UncertaintyPropagation.EffectiveDegreesOfFreedom([1, 2], [double.PositiveInfinity, double.PositiveInfinity]));

    /// <summary>Guide, G.4.2: an uncertainty in doubt by 25 % has 8 degrees of freedom. Memory, exact.</summary>
    [Fact]
    public void Doubt_of_a_quarter_counts_as_eight_degrees_of_freedom() => Assert.Equal(8, UncertaintyPropagation.DegreesOfFreedomOfDoubt(0.25), 1e-12);

    /// <summary>Guide, 4.3.7, example 2, and 5.1.5: 14e-6 of reading + 2e-6 of the 1 V range at 0.928571 V, type A 12 µV. Memory, recomputed.</summary>
    [Fact]
    public void Voltmeter_of_the_guide_reads_within_fifteen_microvolts()
    {
        var half = 14e-6 * 0.928571 + 2e-6 * 1;
        Assert.Equal(15e-6, half, 0.5e-6);
        Assert.Equal(8.7e-6, StandardUncertainty.Rectangular(half), 0.05e-6);
        var combined = UncertaintyPropagation.Independent([StandardUncertainty.Rectangular(half), 12e-6]);
        Assert.Equal(15e-6, combined, 0.5e-6);
        Assert.Equal(16e-6, combined / 0.928571, 0.5e-6);
    }

    /// <summary>Guide, 4.3.7, example 1: half-width 0.40e-6 gives 0.23e-6. Memory, recomputed.</summary>
    [Fact]
    public void Half_width_of_a_copper_expansion_becomes_a_standard_uncertainty() =>
        Assert.Equal(0.230940e-6, StandardUncertainty.Rectangular(0.40e-6), 5e-13);

    /// <summary>Guide, 5.2.2: ten 1000 Ω resistors calibrated against one standard of u 0.1 Ω in series: 1.0 Ω, not 0.32 Ω. Memory, recomputed.</summary>
    [Fact]
    public void Ten_resistors_that_share_their_standard_add_their_uncertainties_plainly()
    {
        double[] u = [.. Enumerable.Repeat(0.1, 10)];
        Assert.Equal(1.0, UncertaintyPropagation.Correlated(u, [.. Enumerable.Repeat(1.0, 100)]), 1e-12);
        Assert.Equal(0.32, UncertaintyPropagation.Independent(u), 0.005);
    }

    [Fact]
    public void Fully_correlated_inputs_may_cancel() => Assert.Equal(0, UncertaintyPropagation.Correlated([0.3, -0.3], [1, 1, 1, 1]), 1e-9);

    /// <summary>EA-4/02, example S3, a 10 kΩ resistor by substitution: 10000.178 Ω ± 0.017 Ω. Result VERIFIED, list of inputs from memory, recomputed.</summary>
    [Fact]
    public void Ten_kilohm_calibration_of_EA_4_02_is_met()
    {
        var ratio = Repeats.Of([1.0000104, 1.0000107, 1.0000106, 1.0000103, 1.0000105]);
        var standard = 10000.053 + 0.020;
        double[] u =
        [
            0.005 / 2, StandardUncertainty.Rectangular(0.010), StandardUncertainty.Rectangular(0.00275), standard * StandardUncertainty.Triangular(1e-6),
            standard * ratio.Uncertainty, StandardUncertainty.Rectangular(0.0055),
        ];
        Assert.Equal(10000.1780008, standard * ratio.Mean, 5e-7);
        Assert.Equal(0.707107e-3, u[4], 5e-7);
        Assert.Equal(8.327915e-3, UncertaintyPropagation.Independent(u), 5e-8);
        Assert.Equal(0.017, 2 * UncertaintyPropagation.Independent(u), 5e-4);
    }

    /// <summary>Ten ohmmeter readings, Helfrick and Cooper, Modern Electronic Instrumentation (2009), ex. 1-11: mean 101.3, s 0.2. VERIFIED.</summary>
    [Fact]
    public void Ten_resistance_readings_of_Helfrick_and_Cooper_scatter_by_a_fifth_of_an_ohm()
    {
        var repeats = Repeats.Of([101.2, 101.7, 101.3, 101.0, 101.5, 101.3, 101.2, 101.4, 101.3, 101.1]);
        Assert.Equal(101.3, repeats.Mean, 1e-9);
        Assert.Equal(0.2, repeats.Deviation, 1e-9);
        Assert.Equal(0.0632456, repeats.Uncertainty, 5e-8);
    }

    [Fact]
    public void A_single_reading_has_no_scatter_and_no_readings_are_refused()
    {
        Assert.Equal(new Repeats(1, 3.3, 0), Repeats.Of([3.3]));
        Assert.Throws<ArgumentException>(() => Repeats.Of([]));
    }
}
