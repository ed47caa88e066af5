using BenchCheck.Core.Quantities;
using CsCheck;
using Xunit;

namespace BenchCheck.Core.Tests.Quantities;

public class LetterDigitCodeTests
{
    /// <summary>IEC 60062 examples as public tables of the code print them (RKM code pages; sizes.com/materials/resistUsage.htm).</summary>
    public static TheoryData<string, double> Printed => new()
    {
        { "R47", 0.47 }, { "4R7", 4.7 }, { "470R", 470 }, { "4K7", 4700 }, { "47K", 47e3 }, { "47K3", 47300 }, { "470K", 470e3 }, { "4M7", 4.7e6 },
        { "R68", 0.68 }, { "6R8", 6.8 }, { "68R", 68 }, { "6L8", 0.0068 },
    };

    [Theory]
    [MemberData(nameof(Printed))]
    public void Printed_examples_of_IEC_60062_are_read_and_written(string code, double ohms)
    {
        Assert.Equal(new LetterDigitCode(ohms, null), LetterDigitCode.Parse(code));
        Assert.Equal(code, LetterDigitCode.Mark(ohms));
    }

    [Theory]
    [InlineData("1R8J", 1.8, 5)]
    [InlineData("27KK", 27e3, 10)]
    [InlineData("4K7M", 4.7e3, 20)]
    [InlineData("10MM", 10e6, 20)]
    [InlineData("100RF", 100, 1)]
    [InlineData("4k7G", 4700, 2)]
    [InlineData("1K0B", 1000, 0.1)]
    public void A_second_letter_is_the_tolerance(string code, double ohms, double percent) =>
        Assert.Equal(new LetterDigitCode(ohms, percent), LetterDigitCode.Parse(code));

    [Theory]
    [InlineData("")]
    [InlineData("K")]
    [InlineData("47")]
    [InlineData("4.7K")]
    [InlineData("4K7K7")]
    [InlineData("4K7Q")]
    [InlineData("47nF")]
    [InlineData("10mA")]
    [InlineData("4X7")]
    [InlineData("4K-7")]
    [InlineData("12345678901234K7")]
    public void What_is_no_code_is_null(string text) => Assert.Null(LetterDigitCode.Parse(text));

    [Theory]
    [InlineData(0)]
    [InlineData(-4700)]
    [InlineData(1e-4)]
    [InlineData(1e15)]
    [InlineData(double.NaN)]
    [InlineData(double.PositiveInfinity)]
    public void A_value_without_code_has_no_mark(double ohms) => Assert.Null(LetterDigitCode.Mark(ohms));

    [Fact]
    public void A_mark_is_read_back_to_four_digits() =>
        Gen.Double[-2.9, 14.9].Select(x => Math.Pow(10, x)).Sample(ohms =>
        {
            var mark = LetterDigitCode.Mark(ohms)!;
            Assert.InRange(LetterDigitCode.Parse(mark)!.Value.Value / ohms, 1 - 5.1e-4, 1 + 5.1e-4);
        });

    [Fact]
    public void Every_preferred_value_is_read_back_exactly() =>
        Gen.Select(Gen.OneOf(PreferredSeries.E96.Values.ToArray()), Gen.Int[-4, 9]).Sample((mantissa, exponent) =>
        {
            var ohms = double.Parse(FormattableString.Invariant($"{mantissa}e{exponent}"), System.Globalization.CultureInfo.InvariantCulture);
            Assert.Equal(ohms, LetterDigitCode.Parse(LetterDigitCode.Mark(ohms)!)!.Value.Value);
        });
}
