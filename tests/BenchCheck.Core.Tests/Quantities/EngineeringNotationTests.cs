using BenchCheck.Core.Quantities;
using CsCheck;
using Xunit;

namespace BenchCheck.Core.Tests.Quantities;

public class EngineeringNotationTests
{
    [Theory]
    [InlineData(4702, "Ω", "4.702 kΩ")]
    [InlineData(0.652, "V", "652.0 mV")]
    [InlineData(-12.02, "V", "-12.02 V")]
    [InlineData(999.96, "Ω", "1.000 kΩ")]
    [InlineData(999.94, "Ω", "999.9 Ω")]
    [InlineData(1e-6, "A", "1.000 µA")]
    [InlineData(0.00015, "A", "150.0 µA")]
    [InlineData(0, "V", "0.000 V")]
    [InlineData(173.4, "1", "173.4")]
    [InlineData(100e3, "1", "100000")]
    [InlineData(-5, "°C", "-5.000 °C")]
    [InlineData(1e15, "Ω", "1.000e15 Ω")]
    [InlineData(1e-17, "A", "1.000e-17 A")]
    [InlineData(double.NaN, "V", "unknown")]
    [InlineData(double.PositiveInfinity, "Ω", "∞ Ω")]
    [InlineData(double.NegativeInfinity, "1", "-∞")]
    public void A_value_has_a_three_step_prefix_and_four_digits(double value, string unit, string expected) =>
        Assert.Equal(expected, EngineeringNotation.Format(value, new Unit(unit)));

    [Fact]
    public void Negative_zero_is_zero()
    {
        Assert.Equal("0.000 V", EngineeringNotation.Format(-0.0, Unit.Volt));
    }

    /// <summary>
    /// JCGM 100:2008, 7.2.2 and 7.2.6: uncertainties to at most two digits, the estimate to match; m_S = 100.02147 g with u_c = 0.35 mg there
    /// prints as 100.02147(35). The other rows follow the same rule.
    /// </summary>
    [Theory]
    [InlineData(4702.2, 23.4, "Ω", "4.702 ± 0.023 kΩ")]
    [InlineData(100.02147, 0.00035, "V", "100.02147 ± 0.00035 V")]
    [InlineData(0.65, 0.0996, "V", "650 ± 100 mV")]
    [InlineData(0.65, 0.09949, "V", "650 ± 99 mV")]
    [InlineData(5, 200, "V", "0 ± 200 V")]
    [InlineData(-0.0001, 0.01, "V", "0 ± 10 mV")]
    [InlineData(12345, 1234, "Ω", "12.3 ± 1.2 kΩ")]
    [InlineData(173.4, 12, "1", "173 ± 12")]
    [InlineData(4700, 0, "Ω", "4.700 kΩ")]
    [InlineData(4700, double.NaN, "Ω", "4.700 kΩ")]
    [InlineData(4700, double.PositiveInfinity, "Ω", "4.700 kΩ")]
    [InlineData(double.NaN, 1, "Ω", "unknown")]
    public void An_uncertainty_has_two_digits_and_the_value_the_same_last_decimal(double value, double uncertainty, string unit, string expected) =>
        Assert.Equal(expected, EngineeringNotation.FormatWithUncertainty(value, uncertainty, new Unit(unit)));

    [Theory]
    [InlineData(4466, 4936, "Ω", "4.47..4.94 kΩ")]
    [InlineData(80, 320, "1", "80..320")]
    [InlineData(0.53, 0.77, "V", "530..770 mV")]
    [InlineData(-1, 1, "V", "-1..1 V")]
    [InlineData(40, double.PositiveInfinity, "1", "40.0 to ∞")]
    public void A_range_has_one_prefix_for_both_ends(double low, double high, string unit, string expected) =>
        Assert.Equal(expected, EngineeringNotation.Range(low, high, new Unit(unit)));

    private static readonly Gen<double> Values = Gen.Select(Gen.Double[1, 10], Gen.Int[-14, 13], Gen.Bool).Select((m, e, negative) => (negative ? -1 : 1) * m * Math.Pow(10, e));

    [Fact]
    public void What_is_written_is_read_back_to_the_digits_written() =>
        Gen.Select(Values, Gen.OneOf(Unit.Volt, Unit.Ohm, Unit.Ampere, Unit.One, Unit.Farad)).Sample((value, unit) =>
        {
            var read = QuantityText.Number(EngineeringNotation.Format(value, unit), unit);
            Assert.Null(read.Fault);
            Assert.InRange(read.Value / value, 1 - 5.01e-4, 1 + 5.01e-4);
        });

    [Fact]
    public void A_value_with_its_uncertainty_is_read_back_as_a_value_with_a_tolerance() =>
        Gen.Select(Values, Gen.Double[0.0001, 0.5]).Sample((value, share) =>
        {
            var uncertainty = Math.Abs(value) * share;
            var read = QuantityText.Nominal(EngineeringNotation.FormatWithUncertainty(value, uncertainty, Unit.Ohm), Unit.Ohm, default);
            Assert.Null(read.Fault);
            Assert.InRange(read.Value.Value, value - (0.051 * uncertainty), value + (0.051 * uncertainty));
            Assert.InRange((read.Value.High - read.Value.Low) / 2 / uncertainty, 0.949, 1.051);
        });
}
