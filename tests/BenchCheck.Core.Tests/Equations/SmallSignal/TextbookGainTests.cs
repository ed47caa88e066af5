using BenchCheck.Core.Boards;
using BenchCheck.Core.Quantities;
using Xunit;

namespace BenchCheck.Core.Tests.Equations.SmallSignal;

/// <summary>Gains and resistances printed in textbooks.</summary>
/// <remarks>
/// Boylestad and Nashelsky, Electronic Devices and Circuit Theory: V_T = 26 mV, r_e = V_T/I_E. A book rounds and takes β + 1 for β, so the
/// printed figures are met to 1 % where not said otherwise.
/// </remarks>
public class TextbookGainTests
{
    [Fact]
    public void Fixed_bias_stage_of_Boylestad_example_5_1()
    {
        var sketch = new BoardSketch().Supply("V1", "VCC", 12).Resistor("RB", "VCC", "B", 470e3).Resistor("RC", "VCC", "C", 3e3).Npn("Q1", "C", "B", "0", 100);
        var board = new SignalBoard(sketch);
        Within(-280.11, board.Gain("C", "B"), 0.011);
        Within(1069, board.InputOhms("B"), 0.011);
        Within(3e3, board.OutputOhms("C"), 1e-6);
    }

    [Fact]
    public void Fixed_bias_stage_with_output_resistance_of_Boylestad_example_5_1()
    {
        var q = new Transistor(Transistor.Npn, "Q1", ["C", "B", "0"], Nominal.Exactly(100), Nominal.Exactly(0.7), Nominal.Exactly(0.2)) { OutputOhms = Nominal.Exactly(50e3) };
        var sketch = new BoardSketch().Supply("V1", "VCC", 12).Resistor("RB", "VCC", "B", 470e3).Resistor("RC", "VCC", "C", 3e3).Add(q);
        var board = new SignalBoard(sketch);
        Within(-264.24, board.Gain("C", "B"), 0.011);
        Within(2830, board.OutputOhms("C"), 0.002);
    }

    [Fact]
    public void Divider_bias_stage_with_bypassed_emitter_of_Boylestad_example_5_2()
    {
        var sketch = new BoardSketch().Supply("V1", "VCC", 22).Resistor("R1", "VCC", "B", 56e3).Resistor("R2", "B", "0", 8.2e3).Resistor("RC", "VCC", "C", 6.8e3)
            .Resistor("RE", "E", "0", 1.5e3).Npn("Q1", "C", "B", "E", 90).Capacitor("CE", "E", "0", 20e-6).Capacitor("C1", "IN", "B", 10e-6);
        var board = new SignalBoard(sketch);

        // The book leaves the base current out of the bias, 5 % of the emitter current, and takes β + 1 for β.
        Within(-367.89, board.Gain("C", "IN"), 0.065);
        Within(1350, board.InputOhms("IN"), 0.065);
    }

    [Fact]
    public void Unbypassed_emitter_resistor_of_Boylestad_example_5_3()
    {
        var sketch = new BoardSketch().Supply("V1", "VCC", 20).Resistor("RB", "VCC", "B", 470e3).Resistor("RC", "VCC", "C", 2.2e3)
            .Resistor("RE", "E", "0", 0.56e3).Npn("Q1", "C", "B", "E", 120);
        var board = new SignalBoard(sketch);
        Within(-3.89, board.Gain("C", "B"), 0.01);
        Within(59340, board.InputOhms("B"), 0.01);
    }

    [Fact]
    public void Loaded_stage_with_source_resistance_of_Boylestad_example_5_11()
    {
        var sketch = new BoardSketch().Supply("V1", "VCC", 12).Resistor("RB", "VCC", "B", 470e3).Resistor("RC", "VCC", "C", 3e3).Npn("Q1", "C", "B", "0", 100)
            .Capacitor("C1", "S", "B", 10e-6).Capacitor("C2", "C", "OUT", 10e-6).Resistor("RL", "OUT", "0", 4.7e3).Resistor("RS", "G", "S", 300);
        var board = new SignalBoard(sketch);
        Within(-170.98, board.Gain("OUT", "B"), 0.011);
        Within(-133.54, board.Gain("OUT", "G"), 0.011);
    }

    [Fact]
    public void Stage_of_Sedra_and_Smith_example_5_14_whose_gain_is_minus_3()
    {
        // V_T 25 mV, I_C 2.3 mA: the base is fed through 100 kΩ from a source whose DC part biases it.
        var sketch = new BoardSketch().Supply("V1", "VCC", 10).Resistor("RC", "VCC", "C", 3e3).Supply("V2", "G", 3).Resistor("RBB", "G", "B", 100e3)
            .Npn("Q1", "C", "B", "0", 100).Resistor("RS", "G", "X", 1e6).Resistor("RX", "X", "0", 1e6);
        var board = new SignalBoard(sketch, 0.025);
        Within(100 * 0.025 / 2.3e-3, board.InputOhms("B") / (1 - board.InputOhms("B") / 100e3), 1e-6);
        Within(-2.96774, board.Gain("C", "B") * 1086.957 / (100e3 + 1086.957), 1e-5);
    }

    private static void Within(double expected, double actual, double share) => Assert.InRange(actual / expected, 1 - share, 1 + share);
}
