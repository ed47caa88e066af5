using BenchCheck.Core.Boards;
using BenchCheck.Core.Equations;
using BenchCheck.Core.Quantities;
using Xunit;

namespace BenchCheck.Core.Tests.Equations;

/// <summary>Op-amps between and at their limits, and those that latch, against figures worked out by hand.</summary>
public class OpAmpStateTests
{
    private static BoardSketch Between(double positive, double negative, double input) =>
        new BoardSketch().Supply("V1", "P", positive).Supply("V2", "M", negative).Supply("V3", "IN", input);

    private static OpAmp Amplifier(string plus, string minus, double? gain = null, double offset = 0) =>
        new("U1", [plus, minus, "OUT", "P", "M"], gain is { } a ? Nominal.Exactly(a) : null, Nominal.Exactly(offset), 1.5);

    private static (double Volts, string? State) At(BoardSketch sketch)
    {
        var solved = new SolvedBoard(sketch.Board, JunctionLaw.Exponential);
        return (solved.Volts("OUT"), solved.Point.State(solved.Board.Find("U1")!));
    }

    [Theory]
    [InlineData(1, 11, "linear")]
    [InlineData(2, 13.5, "high")]
    [InlineData(-2, -13.5, "low")]
    public void A_non_inverting_amplifier_gives_eleven_times_its_input_up_to_its_supplies_less_the_headroom(double input, double output, string state)
    {
        var (volts, found) = At(Between(15, -15, input).Resistor("R1", "OUT", "N", 100e3).Resistor("R2", "N", "0", 10e3).Add(Amplifier("IN", "N")));
        Assert.Equal(output, volts, 1e-4);
        Assert.Equal(state, found);
    }

    /// <summary>A / (1 + A b) with b = 1/11, the offset counted at the plus input.</summary>
    [Fact]
    public void Finite_gain_and_offset_come_in_where_stated()
    {
        var (volts, _) = At(Between(15, -15, 1).Resistor("R1", "OUT", "N", 100e3).Resistor("R2", "N", "0", 10e3).Add(Amplifier("IN", "N", 1000, 3e-3)));
        Assert.Equal(1.003 * 1000 / (1 + 1000.0 / 11), volts, 1e-6);
    }

    [Theory]
    [InlineData(5, "low")]
    [InlineData(-5, "high")]
    [InlineData(7, "low")]
    public void A_comparator_without_feedback_stands_at_one_of_its_supplies(double input, string state)
    {
        var (volts, found) = At(Between(15, -15, input).Resistor("R1", "OUT", "0", 10e3).Add(Amplifier("0", "IN")));
        Assert.Equal(state == "high" ? 13.5 : -13.5, volts, 1e-4);
        Assert.Equal(state, found);
    }

    /// <summary>Thresholds ±13.5 V · 10/110 = ±1.227 V: above the upper one low, below the lower one high, and between them the high state of the two.</summary>
    [Theory]
    [InlineData(3, "low")]
    [InlineData(1.3, "low")]
    [InlineData(1.1, "high")]
    [InlineData(0, "high")]
    [InlineData(-1.1, "high")]
    [InlineData(-3, "high")]
    public void A_comparator_with_positive_feedback_is_never_left_between_and_the_high_state_is_taken_where_both_hold(double input, string state)
    {
        var (volts, found) = At(Between(15, -15, input).Resistor("R1", "OUT", "X", 100e3).Resistor("R2", "X", "0", 10e3).Add(Amplifier("X", "IN")));
        Assert.Equal(state, found);
        Assert.Equal(state == "high" ? 13.5 : -13.5, volts, 1e-4);
    }

    [Fact]
    public void A_latch_that_stands_low_stays_low_while_its_input_stays_between_the_thresholds()
    {
        // Started from the state before, as a fit does from one step to the next.
        var board = new SolvedBoard(Between(15, -15, 3).Resistor("R1", "OUT", "X", 100e3).Resistor("R2", "X", "0", 10e3).Add(Amplifier("X", "IN")).Board, JunctionLaw.Exponential);
        Assert.Equal(-13.5, board.With("V3", ParameterKind.Voltage, 0.5).Volts("OUT"), 1e-4);
        Assert.Equal(13.5, board.With("V3", ParameterKind.Voltage, -1.5).Volts("OUT"), 1e-4);
    }
}
