using System.Collections.Immutable;
using BenchCheck.Core.Boards;
using BenchCheck.Core.Checking;
using BenchCheck.Core.Equations;
using BenchCheck.Core.Fitting;
using BenchCheck.Core.Metering;
using BenchCheck.Core.Quantities;
using Xunit;

namespace BenchCheck.Core.Tests.Checking;

/// <summary>A divider whose lower resistor the parts list leaves open: the one reading that sees it fixes it, and says nothing for or against the board.</summary>
public class UnknownPartTests
{
    [Theory]
    [InlineData(0.05), InlineData(1), InlineData(10e3), InlineData(100e6)]
    public void An_unknown_of_any_size_is_estimated_and_does_not_make_the_board_disagree(double ohms)
    {
        var (result, fit) = Check(ohms, 5.01);
        var unknown = Assert.Single(result.Parameters, e => e.Part == "R2");
        Assert.Equal(BoardVerdict.Agrees, result.Verdict);
        Assert.InRange(ohms, unknown.Low, unknown.High);
        Assert.Equal(ohms, unknown.Value, 0.02 * ohms);
        Assert.True(double.IsNaN(fit.NormalisedResiduals[1]));
        Assert.True(double.IsFinite(fit.NormalisedResiduals[0]));
    }

    /// <summary>Measured above the fit is positive; the supply is then pulled up.</summary>
    [Fact]
    public void A_supply_read_too_high_shows_as_a_positive_residual_and_disagrees()
    {
        var (result, fit) = Check(10e3, 5.4);
        Assert.Equal(BoardVerdict.Disagrees, result.Verdict);
        Assert.True(fit.NormalisedResiduals[0] > 3);
        Assert.True(fit.PriorScores[0] > 3);
    }

    private static (CheckResult Result, BoardFit Fit) Check(double ohms, double supplyRead)
    {
        var board = new Board(
            "Divider", "GND", BoardOrigin.NewBuild,
            [
                new Supply("V1", ["VCC", "GND"], Nominal.Within(5, Tolerance.Percent(1))),
                new Resistor("R1", ["VCC", "OUT"], Nominal.Within(3 * ohms, Tolerance.Percent(5))),
                new Resistor("R2", ["OUT", "GND"], Nominal.Unknown),
            ],
            [Condition.Powered]);
        var bench = new Bench(board, [Meter.Usual with { InputOhms = double.PositiveInfinity }], []);
        ImmutableArray<Reading> readings = [Volts("VCC", supplyRead), Volts("OUT", supplyRead / 4)];
        var plan = ReadingPlan.Of(bench, new ReadingSet(null, readings));
        var model = new BoardModel(board, plan.Probes, plan.HasScaleError, new NetworkSolver(JunctionLaw.Exponential));
        return Checker.Check(bench, new ReadingSet(null, readings), plan, model, new EvidenceFit(), CheckSettings.Default);
    }

    private static Reading Volts(string node, double volts) => new([], Condition.Powered.Name, ReadingQuantity.Voltage, node, "GND", volts);
}
