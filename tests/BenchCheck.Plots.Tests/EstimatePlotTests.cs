using Xunit;

namespace BenchCheck.Plots.Tests;

public sealed class EstimatePlotTests
{
    [Fact]
    public void Names_limits_and_estimates_stand_in_the_picture_as_text()
    {
        var texts = EstimatePlot.Of(Checks.Healthy).Texts();
        foreach (var expected in new[] { "R1 resistance", "48.20 ± 0.60 kΩ", "44.65..49.35 kΩ", "Q1 gain", "190 ± 60", "100..300", "R9 resistance", "?", "partly" })
            Assert.Contains(expected, texts);
    }

    /// <summary>A decade off on ±5 %: ln(4680/470)/ln(493.5/470) = 47.1.</summary>
    [Fact]
    public void An_estimate_far_outside_its_tolerance_shows_how_far() => Assert.Contains("+47", EstimatePlot.Of(Checks.Healthy).Texts());

    [Fact]
    public void An_unknown_part_is_not_compared() => Assert.Contains("no tolerance to compare with", EstimatePlot.Of(Checks.Healthy).Texts());

    [Fact]
    public void Estimates_of_a_disagreeing_board_are_said_to_be_as_if_it_had_no_fault()
    {
        Assert.Contains(EstimatePlot.Of(Checks.Faulty).Texts(), t => t.Contains("as if the board had no fault", StringComparison.Ordinal));
        Assert.DoesNotContain(EstimatePlot.Of(Checks.Healthy).Texts(), t => t.Contains("as if the board had no fault", StringComparison.Ordinal));
    }
}
