using BenchCheck.Core.Quantities;
using CsCheck;
using Xunit;

namespace BenchCheck.Core.Tests.Quantities;

public class MarkingSlipTests
{
    /// <summary>Bands from the colour code of IEC 60062: 4.7 kΩ yellow violet red, 22 kΩ red red orange, 10 kΩ brown black orange, 13 Ω brown orange black.</summary>
    [Theory]
    [InlineData(4700, 47.3e3, "47.0 kΩ for 4.70 kΩ: a decade slip (factor 10, multiplier band red read as orange or the reverse)")]
    [InlineData(47e3, 462, "470 Ω for 47.0 kΩ: a decade slip (factor 0.01, multiplier band orange read as brown or the reverse)")]
    [InlineData(15e3, 50.2e3, "51.0 kΩ for 15.0 kΩ: two digits exchanged")]
    [InlineData(10e3, 13.1, "13.0 Ω for 10.0 kΩ: a digit band and the multiplier band exchanged (brown, orange, black for brown, black, orange)")]
    [InlineData(120, 120.1e3, "120 kΩ for 120 Ω: a decade slip (factor 1000, multiplier band brown read as yellow or the reverse)")]
    [InlineData(12e3, 22.2e3, "22.0 kΩ for 12.0 kΩ: colour band 1 red taken for brown")]
    [InlineData(510, 1.08e6, "1.10 MΩ for 510 Ω: the same colour bands read from the wrong end (green, brown, brown)")]
    [InlineData(4700, 5150, "5.10 kΩ is the next value of the series to 4.70 kΩ")]
    public void A_value_far_off_is_explained_by_the_slip_that_leads_to_it(double wanted, double found, string words) =>
        Assert.Equal(words, MarkingSlip.Explain(wanted, found));

    [Theory]
    [InlineData(4700, 4800)]
    [InlineData(4700, 130e3)]
    [InlineData(4700, double.NaN)]
    [InlineData(0, 4700)]
    [InlineData(4700, double.PositiveInfinity)]
    public void Nothing_is_said_of_a_value_that_is_right_or_that_no_slip_explains(double wanted, double found) => Assert.Null(MarkingSlip.Explain(wanted, found));

    [Fact]
    public void A_slip_of_a_whole_decade_is_always_named() =>
        Gen.Select(Gen.OneOf(PreferredSeries.E24.Values.ToArray()), Gen.Int[-1, 5], Gen.OneOf(-2, -1, 1, 2), Gen.Double[-0.04, 0.04]).Sample((mantissa, exponent, slip, off) =>
        {
            var wanted = mantissa * Math.Pow(10, exponent);
            Assert.Contains("decade slip", MarkingSlip.Explain(wanted, wanted * Math.Pow(10, slip) * (1 + off))!, StringComparison.Ordinal);
        });

    [Fact]
    public void Whatever_the_values_the_answer_is_words_or_null() =>
        Gen.Select(Gen.Double, Gen.Double, Gen.Double, Gen.Double).Sample((wanted, found, spread, tolerance) =>
            MarkingSlip.Explain(wanted, found, spread, tolerance) is not "");
}
