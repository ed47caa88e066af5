using BenchCheck.Core.Boards;
using BenchCheck.Core.Quantities;
using Xunit;

namespace BenchCheck.Core.Tests.Equations.SmallSignal;

/// <summary>Amplifiers made of op-amps, their gains printed in textbooks or by the textbook's formula.</summary>
/// <remarks>
/// From memory: Boylestad and Nashelsky 10e, chapters 10 and 11; Sedra and Smith 5e, chapter 2; Franco, Design with Operational Amplifiers
/// and Analog Integrated Circuits 3e, 1.4 to 2.5. An ideal amplifier has a gain of 1e7 here, hence the margins.
/// </remarks>
public class TextbookAmplifierTests
{
    [Fact]
    public void Inverting_amplifier_of_Boylestad_example_10_5()
    {
        var sketch = Supplied().Resistor("R1", "IN", "M", 100e3).Resistor("RF", "M", "OUT", 500e3).Add(OpAmp("U1", "0", "M", "OUT"));
        var board = new SignalBoard(sketch, drive: new Drive("IN", "0", null, 0));
        Within(-5, board.Gain("OUT", "IN"), 1e-5);
        Within(100e3, board.InputOhms("IN"), 1e-5);
        Assert.InRange(board.OutputOhms("OUT"), 0, 1);
    }

    [Fact]
    public void Non_inverting_amplifier_of_Boylestad_example_10_6() =>
        Within(6, new SignalBoard(
            Supplied().Resistor("R1", "0", "M", 100e3).Resistor("RF", "M", "OUT", 500e3).Resistor("RS", "IN", "0", 1e6).Add(OpAmp("U1", "IN", "M", "OUT"))).Gain("OUT", "IN"), 1e-5);

    [Fact]
    public void Inverting_amplifier_with_a_T_network_of_Sedra_and_Smith_example_2_2()
    {
        // R1 = R2 = R4 = 1 MΩ and R3 = 10.2 kΩ make −100.
        var sketch = Supplied().Resistor("R1", "IN", "M", 1e6).Resistor("R2", "M", "X", 1e6).Resistor("R3", "X", "0", 10.2e3).Resistor("R4", "X", "OUT", 1e6).Add(OpAmp("U1", "0", "M", "OUT"));
        var board = new SignalBoard(sketch);
        Within(-100, board.Gain("OUT", "IN"), 1e-3);
        Within(1e6, board.InputOhms("IN"), 1e-4);
    }

    [Fact]
    public void Finite_gain_of_Sedra_and_Smith_example_2_1()
    {
        // R1 1 kΩ, R2 100 kΩ, open-loop gain 10³: closed-loop gain printed 90.83.
        var sketch = Supplied().Resistor("R1", "IN", "M", 1e3).Resistor("R2", "M", "OUT", 100e3).Add(OpAmp("U1", "0", "M", "OUT", 1e3));
        Within(-90.83, new SignalBoard(sketch).Gain("OUT", "IN"), 1e-4);
    }

    [Fact]
    public void Difference_amplifier_has_the_formulas_gains_for_both_inputs_and_for_what_they_share()
    {
        // Franco 2.4: v_O = R4/(R3 + R4) (1 + R2/R1) v_2 − R2/R1 v_1, R3 mismatched on purpose.
        const double r1 = 10e3, r2 = 100e3, r3 = 11e3, r4 = 100e3;
        BoardSketch Amplifier(string first, string second) => Supplied().Resistor("R1", first, "M", r1).Resistor("R2", "M", "OUT", r2).Resistor("R3", second, "P", r3)
            .Resistor("R4", "P", "0", r4).Add(OpAmp("U1", "P", "M", "OUT"));
        var plus = r4 / (r3 + r4) * (1 + r2 / r1);
        Within(-r2 / r1, new SignalBoard(Amplifier("IN", "0")).Gain("OUT", "IN"), 1e-5);
        Within(plus, new SignalBoard(Amplifier("0", "IN")).Gain("OUT", "IN"), 1e-5);
        Assert.Equal(plus - r2 / r1, new SignalBoard(Amplifier("IN", "IN")).Gain("OUT", "IN"), 1e-4);
        Within(r1 + r3, new SignalBoard(Amplifier("A", "B"), drive: new Drive("B", "A", 1e-3, 0)).InputOhms("B", "A"), 1e-5);
    }

    [Theory]
    [InlineData(5e3, 500, 5e3, 21)]
    [InlineData(24.9e3, 1e3, 10e3, 50.8)]
    public void Instrumentation_amplifier_of_three_op_amps(double feedback, double bridge, double rest, double printed)
    {
        // Boylestad example 11.11: V_O = (1 + 2R/R_P)(V_1 − V_2), 21 for 5 kΩ and 500 Ω.
        var sketch = Supplied().Add(OpAmp("U1", "P", "X", "A")).Add(OpAmp("U2", "M", "Y", "B")).Resistor("R1", "A", "X", feedback).Resistor("RP", "X", "Y", bridge)
            .Resistor("R2", "Y", "B", feedback).Resistor("R3", "B", "V", rest).Resistor("R4", "V", "OUT", rest).Resistor("R5", "A", "W", rest).Resistor("R6", "W", "0", rest)
            .Add(OpAmp("U3", "W", "V", "OUT")).Resistor("R7", "P", "0", 1e6).Resistor("R8", "M", "0", 1e6);
        Within(printed * 1e-3, new SignalBoard(sketch, drive: new Drive("P", "M", 1e-3, 0)).Volts("OUT"), 1e-4);
        Within(2e6, new SignalBoard(sketch).InputOhms("P", "M"), 1e-4);
    }

    [Fact]
    public void What_both_inputs_of_an_instrumentation_amplifier_share_does_not_reach_the_output()
    {
        var sketch = Supplied().Add(OpAmp("U1", "P", "X", "A")).Add(OpAmp("U2", "P", "Y", "B")).Resistor("R1", "A", "X", 5e3).Resistor("RP", "X", "Y", 500)
            .Resistor("R2", "Y", "B", 5e3).Resistor("R3", "B", "V", 5e3).Resistor("R4", "V", "OUT", 5e3).Resistor("R5", "A", "W", 5e3).Resistor("R6", "W", "0", 5e3)
            .Add(OpAmp("U3", "W", "V", "OUT")).Resistor("R7", "P", "0", 1e6);
        var board = new SignalBoard(sketch);
        Assert.Equal(0, board.Gain("OUT", "P"), 1e-5);
        Within(1, board.Gain("A", "P"), 1e-5);
    }

    private static BoardSketch Supplied() => new BoardSketch().Supply("V1", "V+", 15).Supply("V2", "0", 15, "V-");

    private static OpAmp OpAmp(string name, string plus, string minus, string output, double? gain = null) =>
        new(name, [plus, minus, output, "V+", "V-"], gain is { } g ? Nominal.Exactly(g) : null, Nominal.Exactly(0), 1.5);

    private static void Within(double expected, double actual, double share) => Assert.InRange(actual / expected, 1 - share, 1 + share);
}
