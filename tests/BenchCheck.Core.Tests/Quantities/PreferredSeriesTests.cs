using BenchCheck.Core.Quantities;
using CsCheck;
using Xunit;

namespace BenchCheck.Core.Tests.Quantities;

public class PreferredSeriesTests
{
    /// <summary>IEC 60063:2015 as the public lists print it; E6 to E96 (qsl.net/g4usp, component preferred values).</summary>
    [Theory]
    [InlineData("E6", "10 15 22 33 47 68")]
    [InlineData("E12", "10 12 15 18 22 27 33 39 47 56 68 82")]
    [InlineData("E24", "10 11 12 13 15 16 18 20 22 24 27 30 33 36 39 43 47 51 56 62 68 75 82 91")]
    [InlineData("E48", "100 105 110 115 121 127 133 140 147 154 162 169 178 187 196 205 215 226 237 249 261 274 287 301 316 332 348 365 383 402 422 442 464 487 511 536 562 590 619 649 681 715 750 787 825 866 909 953")]
    [InlineData("E96", "100 102 105 107 110 113 115 118 121 124 127 130 133 137 140 143 147 150 154 158 162 165 169 174 178 182 187 191 196 200 205 210 215 221 226 232 237 243 249 255 261 267 274 280 287 294 301 309 316 324 332 340 348 357 365 374 383 392 402 412 422 432 442 453 464 475 487 499 511 523 536 549 562 576 590 604 619 634 649 665 681 698 715 732 750 768 787 806 825 845 866 887 909 931 953 976")]
    public void A_series_is_the_printed_one(string name, string values) =>
        Assert.Equal(values, string.Join(' ', PreferredSeries.All.Single(s => s.Name == name).Values));

    [Fact]
    public void E192_holds_all_of_E96_and_920_in_place_of_919()
    {
        Assert.Equal(192, PreferredSeries.E192.Values.Distinct().Count());
        Assert.Superset(PreferredSeries.E96.Values.ToHashSet(), PreferredSeries.E192.Values.ToHashSet());
        Assert.Contains(920, PreferredSeries.E192.Values);
        Assert.DoesNotContain(919, PreferredSeries.E192.Values);
    }

    [Fact]
    public void Eight_values_of_E24_depart_from_the_rule_of_even_ratios()
    {
        var departing = PreferredSeries.E24.Values.Where((v, n) => v != (int)Math.Round(10 * Math.Pow(10, n / 24.0)));
        Assert.Equal([27, 30, 33, 36, 39, 43, 47, 82], departing);
    }

    [Theory]
    [InlineData("E24", 4702, 4700)]
    [InlineData("E24", 9.6, 10)]
    [InlineData("E24", 0.0095, 0.0091)]
    [InlineData("E96", 4702, 4750)]
    [InlineData("E3", 1e6, 1e6)]
    [InlineData("E12", 1e-12, 1e-12)]
    public void The_nearest_value_is_nearest_by_ratio_and_exact_in_its_digits(string series, double value, double nearest) =>
        Assert.Equal(nearest, PreferredSeries.All.Single(s => s.Name == series).Nearest(value));

    [Theory]
    [InlineData(4700, 4300, 5100)]
    [InlineData(10e3, 9100, 11e3)]
    [InlineData(9100, 8200, 10e3)]
    [InlineData(4800, 4700, 5100)]
    public void Neighbours_are_the_values_beside_also_across_decades(double value, double below, double above) =>
        Assert.Equal((below, above), PreferredSeries.E24.Neighbours(value));

    [Theory]
    [InlineData(20, "E6")]
    [InlineData(10, "E12")]
    [InlineData(5, "E24")]
    [InlineData(2, "E48")]
    [InlineData(1, "E96")]
    [InlineData(0.5, "E192")]
    [InlineData(0.1, "E192")]
    public void The_series_follows_the_tolerance(double percent, string series) => Assert.Equal(series, PreferredSeries.ForTolerance(percent).Name);

    [Fact]
    public void No_value_of_a_series_is_nearer_than_the_one_named() =>
        Gen.Select(Gen.Double[-9, 9], Gen.Int[0, PreferredSeries.All.Length - 1]).Sample((log, index) =>
        {
            var (series, value) = (PreferredSeries.All[index], Math.Pow(10, log));
            var nearest = series.Nearest(value);
            Assert.True(series.Contains(nearest));
            var (below, above) = series.Neighbours(nearest);
            Assert.InRange(value, Math.Sqrt(below * nearest) * (1 - 1e-9), Math.Sqrt(nearest * above) * (1 + 1e-9));
        });

    [Theory]
    [InlineData(0)]
    [InlineData(-1)]
    [InlineData(double.NaN)]
    [InlineData(double.PositiveInfinity)]
    public void Values_that_no_part_has_are_refused(double value)
    {
        Assert.Throws<ArgumentOutOfRangeException>(() => PreferredSeries.E24.Nearest(value));
        Assert.False(PreferredSeries.E24.Contains(value));
    }
}
