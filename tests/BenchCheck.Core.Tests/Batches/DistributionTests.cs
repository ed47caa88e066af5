using BenchCheck.Core.Batches;
using Xunit;

namespace BenchCheck.Core.Tests.Batches;

/// <summary>
/// Summary statistics against the univariate sets of the NIST Statistical Reference Datasets. Data and certified values of
/// Michelso, Mavro, Lew, Lottery and NumAcc4 as in mathnet/mathnet-numerics, data/NIST; the rules of NumAcc1 to 3 are from memory, and their values follow
/// from the rules by hand.
/// </summary>
public sealed class DistributionTests
{
    [Theory]
    [InlineData(10000001.0, 10000003.0, 10000002.0, 1, 1e-15)]
    [InlineData(1.2, 1.1, 1.3, 500, 1e-13)]
    [InlineData(1000000.2, 1000000.1, 1000000.3, 500, 1e-8)]
    [InlineData(10000000.2, 10000000.1, 10000000.3, 500, 1e-7)]
    public void Mean_and_spread_match_the_certified_values_of_NumAcc(double first, double low, double high, int pairs, double tolerance)
    {
        var builder = new DistributionBuilder();
        builder.Add(null, first);
        for (var i = 0; i < pairs; i++)
        {
            builder.Add(null, low);
            builder.Add(null, high);
        }

        var distribution = builder.Build()!;
        var (mean, spread) = pairs == 1 ? (10000002.0, 1.0) : (first, 0.1);
        Assert.Equal(mean, distribution.Mean, mean * 1e-14);
        Assert.Equal(spread, distribution.Spread, spread * tolerance);
    }

    [Theory]
    [InlineData("nist-strd-michelso", 100, 299.852400000000, 0.0790105478190518)]
    [InlineData("nist-strd-mavro", 50, 2.00185600000000, 0.000429123454003053)]
    [InlineData("nist-strd-lew", 200, -177.435000000000, 277.332168044316)]
    [InlineData("nist-strd-lottery", 218, 518.958715596330, 291.699727470969)]
    public void Mean_and_spread_match_the_certified_values_of_measured_sets(string set, int count, double mean, double spread)
    {
        var builder = new DistributionBuilder();
        foreach (var row in ReferenceData.Numbers(set)) builder.Add(null, row[0]);
        var distribution = builder.Build()!;
        Assert.Equal(count, distribution.Count);
        Assert.True(ReferenceData.Digits(distribution.Mean, mean) >= 14, $"{distribution.Mean:R}");
        Assert.True(ReferenceData.Digits(distribution.Spread, spread) >= 12, $"{distribution.Spread:R}");
    }

    [Fact]
    public void Percentiles_follow_the_example_of_the_NIST_handbook()
    {
        // NIST/SEMATECH e-Handbook of Statistical Methods, 7.2.6.2: twelve gauge readings, 90th percentile 95.1981; from memory, recomputed by p(n + 1).
        double[] values = [95.1772, 95.1567, 95.1937, 95.1959, 95.1442, 95.0610, 95.1591, 95.1195, 95.1065, 95.0925, 95.1990, 95.1682];
        var builder = new DistributionBuilder();
        foreach (var value in values) builder.Add(null, value);
        var sorted = values.Order().ToArray();
        // p(n + 1) = 0.75 · 13 = 9.75: between the ninth and the tenth.
        Assert.Equal(sorted[8] + 0.75 * (sorted[9] - sorted[8]), builder.Build()!.Percentiles[3], 1e-12);
        Assert.Equal((sorted[5] + sorted[6]) / 2, builder.Build()!.Median, 1e-12);
    }

    [Fact]
    public void A_board_far_from_all_others_is_named_and_an_ordinary_one_is_not()
    {
        var builder = new DistributionBuilder();
        for (var i = 0; i < 100; i++) builder.Add($"S{i}", Math.Sin(i));
        builder.Add("odd one", 9);
        Assert.Equal("odd one", Assert.Single(builder.Build()!.Outliers).Serial);
    }

    [Fact]
    public void Beyond_what_is_kept_percentiles_come_from_a_fair_sample_and_the_mean_from_all()
    {
        var builder = new DistributionBuilder();
        const int Count = 3 * DistributionBuilder.MostKept;
        for (var i = 0; i < Count; i++) builder.Add(null, i);
        var distribution = builder.Build()!;
        Assert.True(distribution.IsSampled);
        Assert.Equal((Count - 1) / 2.0, distribution.Mean, 1e-3);
        // Standard error of the median of the sample: half of Count over √kept, 0.11 %; five of them.
        Assert.Equal(0.5, distribution.Median / Count, 0.006);
    }
}
