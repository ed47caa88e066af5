using BenchCheck.Core.Quantities;
using CsCheck;
using Xunit;

namespace BenchCheck.Core.Tests.Quantities;

public class QuantityTextTests
{
    public static TheoryData<string, string, double> Plain => new()
    {
        { "5.12 V", "V", 5.12 }, { "652 mV", "V", 0.652 }, { "652m", "V", 0.652 }, { "-0", "V", 0 }, { "5,212", "V", 5.212 }, { "12V", "V", 12 },
        { "5V1", "V", 5.1 }, { "1.5e-3", "V", 0.0015 }, { "1E3 mV", "V", 1 }, { "\u22120.65", "V", -0.65 }, { "+3.3 volts", "V", 3.3 },
        { "4k7", "Ω", 4700 }, { "4K7", "Ω", 4700 }, { "R47", "Ω", 0.47 }, { "2M2", "Ω", 2.2e6 }, { "4,7k", "Ω", 4700 }, { "47 kΩ", "Ω", 47e3 },
        { "47 k\u2126", "Ω", 47e3 }, { "47 kohm", "Ω", 47e3 }, { "47K", "Ω", 47e3 }, { "470R", "Ω", 470 }, { "10M", "Ω", 10e6 }, { "10m", "Ω", 0.01 },
        { "4k7 Ω", "Ω", 4700 }, { "-4k7", "Ω", -4700 }, { "1,234.5", "Ω", 1234.5 }, { "1.234,5", "Ω", 1234.5 }, { "1,234,567", "Ω", 1234567 },
        { "1 234.5", "Ω", 1234.5 }, { "1'000'000", "Ω", 1e6 }, { ".5", "Ω", 0.5 },
        { "10 uF", "F", 10e-6 }, { "10 \u00B5F", "F", 10e-6 }, { "10 \u03BCF", "F", 10e-6 }, { "4n7", "F", 4.7e-9 }, { "100 pF", "F", 100e-12 }, { "47nF", "F", 47e-9 },
        { "600 uA", "A", 600e-6 }, { "1.5 mA", "A", 1.5e-3 }, { "25 °C", "°C", 25 }, { "25 C", "°C", 25 }, { "1 kHz", "Hz", 1000 }, { "0.25 W", "W", 0.25 },
        { "180", "1", 180 }, { "100k", "1", 100e3 }, { "2 mA/V", "S", 0.002 },
    };

    [Theory]
    [MemberData(nameof(Plain))]
    public void A_quantity_is_read_as_people_write_it(string text, string unit, double expected)
    {
        var read = QuantityText.Number(text, new Unit(unit));
        Assert.Null(read.Fault);
        Assert.Equal(expected, read.Value, Math.Abs(expected) * 1e-15);
    }

    [Theory]
    [InlineData("", "V")]
    [InlineData("abc", "V")]
    [InlineData("NaN", "V")]
    [InlineData("inf", "V")]
    [InlineData("1e999", "V")]
    [InlineData("1e16", "V")]
    [InlineData("5 kΩ", "V")]
    [InlineData("5 V", "Ω")]
    [InlineData("47x", "Ω")]
    [InlineData("1.2.3,4", "Ω")]
    [InlineData("1,5,5", "Ω")]
    [InlineData("12 V 1%", "V")]
    [InlineData("27KK", "Ω")]
    [InlineData("5 V 6 V", "V")]
    [InlineData("100 mA", "V")]
    [InlineData("--5", "V")]
    [InlineData("?", "V")]
    public void What_is_no_such_quantity_is_a_fault_that_says_what_was_read_and_expected(string text, string unit)
    {
        var fault = QuantityText.Number(text, new Unit(unit)).Fault;
        Assert.NotNull(fault);
        Assert.NotEmpty(fault.Read);
        Assert.NotEmpty(fault.Expected);
    }

    public static TheoryData<string, string, double, double, double> Toleranced => new()
    {
        { "12 V 1%", "V", 12, 11.88, 12.12 }, { "47k 5%", "Ω", 47e3, 44650, 49350 }, { "47k ± 5%", "Ω", 47e3, 44650, 49350 }, { "47k ±5 %", "Ω", 47e3, 44650, 49350 },
        { "220 5%", "Ω", 220, 209, 231 }, { "4,7k 5%", "Ω", 4700, 4465, 4935 }, { "4k7 5%", "Ω", 4700, 4465, 4935 }, { "10k/5%", "Ω", 10e3, 9500, 10500 },
        { "1.9 V ± 0.15 V", "V", 1.9, 1.75, 2.05 }, { "1.9 V +- 150 mV", "V", 1.9, 1.75, 2.05 }, { "1.9 V +/- 0.15", "V", 1.9, 1.75, 2.05 },
        { "4.702 ± 0.023 kΩ", "Ω", 4702, 4679, 4725 }, { "± 5 mV", "V", 0, -0.005, 0.005 }, { "0 V 1%", "V", 0, 0, 0 },
        { "27KK", "Ω", 27e3, 24.3e3, 29.7e3 }, { "1R8J", "Ω", 1.8, 1.71, 1.89 }, { "4K7F", "Ω", 4700, 4653, 4747 },
        { "80..320", "1", 160, 80, 320 }, { "80\u2026320", "1", 160, 80, 320 }, { "-1..1 V", "V", 0, -1, 1 }, { "10..1000 mV", "V", 0.1, 0.01, 1 },
        { "1k..4k", "Ω", 2000, 1000, 4000 }, { "160..1k", "Ω", 400, 160, 1000 }, { "50%", "1", 0.5, 0.45, 0.55 },
    };

    [Theory]
    [MemberData(nameof(Toleranced))]
    public void A_tolerance_is_read_as_a_percentage_a_half_width_a_code_letter_or_a_range(string text, string unit, double value, double low, double high)
    {
        var read = QuantityText.Nominal(text, new Unit(unit), Tolerance.Percent(20));
        Assert.Null(read.Fault);
        Assert.Equal(value, read.Value.Value, 1e-12 * Math.Abs(value));
        Assert.Equal(low, read.Value.Low, 1e-12 * Math.Abs(high));
        Assert.Equal(high, read.Value.High, 1e-12 * Math.Abs(high));
        Assert.Equal(text == "50%", read.Value.ToleranceAssumed);
    }

    [Theory]
    [InlineData("47k 100%")]
    [InlineData("47k -5%")]
    [InlineData("47k 5% 5%")]
    [InlineData("4k75%")]
    [InlineData("47k ± 5")]
    [InlineData("47k ± -5 Ω")]
    [InlineData("47k ±")]
    [InlineData("320..80")]
    [InlineData("1..2k")]
    [InlineData("..")]
    [InlineData("1..2..3")]
    [InlineData("27KK 5%")]
    [InlineData("5%")]
    [InlineData("%")]
    public void A_tolerance_that_is_impossible_or_could_mean_two_things_is_a_fault(string text) =>
        Assert.NotNull(QuantityText.Nominal(text, Unit.Ohm, default).Fault);

    [Fact]
    public void Without_a_tolerance_the_usual_one_is_taken_and_marked_as_assumed()
    {
        var read = QuantityText.Nominal("47k", Unit.Ohm, Tolerance.Percent(5)).Value;
        Assert.True(read.ToleranceAssumed);
        Assert.Equal(44650, read.Low, 1e-6);
    }

    [Fact]
    public void An_unknown_is_a_question_mark() => Assert.True(QuantityText.Nominal(" ? ", Unit.Ohm, default).Value.IsUnknown);

    [Fact]
    public void Another_units_value_is_named_as_what_it_is()
    {
        var fault = QuantityText.Number("47 kΩ", Unit.Volt).Fault!;
        Assert.Contains("a resistance", fault.Read, StringComparison.Ordinal);
        Assert.Contains("a voltage", fault.Expected, StringComparison.Ordinal);
    }

    [Fact]
    public void A_fault_shows_no_control_characters_and_no_endless_text()
    {
        var fault = QuantityText.Number("\u001b[31m\u202e" + new string('x', 5000), Unit.Volt).Fault!;
        Assert.DoesNotContain(fault.Read, c => char.IsControl(c) || c == '\u202e');
        Assert.True(fault.Read.Length < 200);
    }

    [Fact]
    public void Whatever_the_text_the_answer_is_a_finite_value_or_a_fault() =>
        Gen.OneOf(Gen.String, Gen.String[Gen.Char["0123456789.,+-\u2212eEkKmMRuµ%±?V ΩJF'\u00A0"], 0, 14]).Sample(text =>
        {
            foreach (var unit in (Unit[])[Unit.Volt, Unit.Ohm, Unit.One, Unit.Farad])
            {
                var number = QuantityText.Number(text, unit);
                Assert.True(!number.IsValue || Math.Abs(number.Value) <= QuantityText.Largest);
                var nominal = QuantityText.Nominal(text, unit, Tolerance.Percent(5));
                Assert.True(!nominal.IsValue || nominal.Value.IsUnknown || (nominal.Value.Low <= nominal.Value.Value && nominal.Value.Value <= nominal.Value.High));
            }
        });

    [Fact]
    public void A_number_as_the_machine_writes_it_is_read_back_to_the_last_bit() =>
        Gen.Double[-1e12, 1e12].Sample(value =>
            Assert.Equal(value, QuantityText.Number(value.ToString("R", System.Globalization.CultureInfo.InvariantCulture) + " V", Unit.Volt).Value));
}
