using BenchCheck.Core.Boards;
using BenchCheck.Core.Equations;
using Xunit;

namespace BenchCheck.Core.Tests.Equations.SmallSignal;

/// <summary>Followers, common bases, cascodes, differential pairs and feedback stages of textbooks.</summary>
/// <remarks>
/// Examples and their printed figures from memory: Boylestad and Nashelsky, Electronic Devices and Circuit Theory 10e, chapters 5 and 10
/// (V_T 26 mV); Sedra and Smith, Microelectronic Circuits 5e, chapter 5 (V_T 25 mV). Each margin covers what the book neglects, said beside it.
/// </remarks>
public class TextbookStageTests
{
    [Fact]
    public void Emitter_follower_of_Boylestad_example_5_7()
    {
        var sketch = new BoardSketch().Supply("V1", "VCC", 12).Resistor("RB", "VCC", "B", 220e3).Resistor("RE", "E", "0", 3.3e3).Npn("Q1", "VCC", "B", "E", 100);
        var board = new SignalBoard(sketch, drive: new Drive("B", "0", null, 0));
        Within(132.72e3, board.InputOhms("B"), 1e-3);
        Within(0.996, board.Gain("E", "B"), 1e-3);

        // The book takes r_e for r_π/(β + 1): 1 % more.
        Within(12.56, board.OutputOhms("E"), 0.012);
    }

    [Fact]
    public void Output_of_an_emitter_follower_sees_its_source_divided_by_the_gain()
    {
        // Resistance reflection by β + 1: (r_π + R_S ‖ R_B)/(β + 1) ‖ R_E (trade rule).
        var sketch = new BoardSketch().Supply("V1", "VCC", 12).Resistor("RB", "VCC", "B", 220e3).Resistor("RE", "E", "0", 3.3e3).Npn("Q1", "VCC", "B", "E", 100)
            .Capacitor("C1", "IN", "B", 10e-6);
        var board = new SignalBoard(sketch, drive: new Drive("IN", "0", null, 10e3));
        var emitterOhms = 0.026 / (101 * (12 - 0.7) / (220e3 + 101 * 3.3e3));
        Within(Parallel(emitterOhms + Parallel(10e3, 220e3) / 101, 3.3e3), board.OutputOhms("E"), 1e-6);

        // Into the base: everything at the emitter times β + 1.
        Within(Parallel(101 * (emitterOhms + 3.3e3), 220e3), board.InputOhms("B"), 1e-6);
    }

    [Fact]
    public void Common_base_stage_of_Boylestad_example_5_8()
    {
        var sketch = new BoardSketch().Supply("V1", "VCC", 8).Supply("V2", "0", 2, "VEE").Resistor("RE", "E", "VEE", 1e3).Resistor("RC", "VCC", "C", 5e3)
            .Npn("Q1", "C", "0", "E", 49).Capacitor("C1", "IN", "E", 10e-6);
        var board = new SignalBoard(sketch);
        Within(19.61, board.InputOhms("IN"), 1e-3);
        Within(5e3, board.OutputOhms("C"), 1e-6);

        // The book prints 250 with α = 1; it states α = 0.98.
        Within(0.98 * 250, board.Gain("C", "IN"), 1e-3);
        Within(-0.98, board.CurrentGain("Q1.collector", "Q1.emitter"), 1e-9);
    }

    [Fact]
    public void Pnp_stage_with_grounded_base_of_Sedra_and_Smith_example_5_15()
    {
        var sketch = new BoardSketch().Supply("V1", "V+", 10).Supply("V2", "0", 10, "V-").Resistor("RE", "V+", "E", 10e3).Resistor("RC", "C", "V-", 5e3)
            .Pnp("Q1", "C", "0", "E", 100).Capacitor("C1", "IN", "E", 10e-6);
        var board = new SignalBoard(sketch, 0.025);

        // Printed with r_e rounded from 26.9 Ω to 27 Ω, and without R_E beside it.
        Within(183.3, board.Gain("C", "IN"), 6e-3);
        Within(27, board.InputOhms("IN"), 8e-3);
    }

    [Fact]
    public void Pnp_stage_mirrors_the_npn_stage_of_Boylestad_example_5_3()
    {
        // The small-signal model knows no polarity: Sedra and Smith 5.6.
        var sketch = new BoardSketch().Supply("V1", "0", 20, "VEE").Resistor("RB", "VEE", "B", 470e3).Resistor("RC", "VEE", "C", 2.2e3)
            .Resistor("RE", "E", "0", 0.56e3).Pnp("Q1", "C", "B", "E", 120);
        var board = new SignalBoard(sketch);
        Within(-3.89, board.Gain("C", "B"), 0.01);
        Within(59340, board.InputOhms("B"), 0.01);
    }

    [Fact]
    public void Cascode_of_Boylestad_example_5_15()
    {
        var sketch = new BoardSketch().Supply("V1", "VCC", 18).Resistor("RB1", "VCC", "B2", 6.8e3).Resistor("RB2", "B2", "B1", 5.6e3).Resistor("RB3", "B1", "0", 4.7e3)
            .Resistor("RC", "VCC", "C2", 1.8e3).Npn("Q2", "C2", "B2", "C1", 200).Npn("Q1", "C1", "B1", "E1", 200).Resistor("RE", "E1", "0", 1.1e3)
            .Capacitor("CE", "E1", "0", 20e-6).Capacitor("CB", "B2", "0", 10e-6).Capacitor("C1", "IN", "B1", 5e-6);
        var board = new SignalBoard(sketch);

        // The book leaves both base currents out of the divider, 2.5 % of the emitter current.
        Within(-265, board.Gain("C2", "IN"), 0.04);
        Within(-1, board.Gain("C1", "IN"), 0.02);
        Within(1.8e3, board.OutputOhms("C2"), 1e-6);
    }

    [Fact]
    public void Collector_feedback_stage_of_Boylestad_example_5_9()
    {
        var sketch = new BoardSketch().Supply("V1", "VCC", 9).Resistor("RF", "C", "B", 180e3).Resistor("RC", "VCC", "C", 2.7e3).Npn("Q1", "C", "B", "0", 200)
            .Capacitor("C1", "IN", "B", 10e-6);
        var board = new SignalBoard(sketch, drive: new Drive("IN", "0", null, 0));

        // The book leaves R_F, 1.5 % of the load, and 1/β out of the gain.
        Within(-240.86, board.Gain("C", "IN"), 0.025);
        Within(560.5, board.InputOhms("IN"), 0.025);
        Within(2660, board.OutputOhms("C"), 1e-3);
    }

    [Fact]
    public void Differential_pair_of_Boylestad_examples_10_3_and_10_5()
    {
        BoardSketch Pair(string second) => new BoardSketch().Supply("V1", "VCC", 9).Supply("V2", "0", 9, "VEE").Resistor("RC1", "VCC", "C1", 47e3)
            .Resistor("RC2", "VCC", "C2", 47e3).Npn("Q1", "C1", "B1", "E", 75).Npn("Q2", "C2", second, "E", 75).Resistor("RE", "E", "VEE", 43e3).Resistor("RB", "B1", "0", 1);

        // Driven at one base, the other grounded: R_C/2r_e; the tail and a drop of 0.64 V at 96 µA make 1 %.
        var single = new SignalBoard(Pair("0"), law: JunctionLaw.Exponential);
        Within(-87.4, single.Gain("C1", "B1"), 0.025);
        Within(87.4, single.Gain("C2", "B1"), 0.025);

        // Both bases driven together: β R_C/(r_i + 2 (β + 1) R_E).
        var together = new SignalBoard(Pair("B1"), law: JunctionLaw.Exponential);
        Within(-0.54, together.Gain("C1", "B1"), 0.01);
        Within(-0.54, together.Gain("C2", "B1"), 0.01);
    }

    [Fact]
    public void Differential_pair_between_its_bases_has_the_gain_and_input_resistance_of_its_formulas()
    {
        // Sedra and Smith 7.3: A_d = g_m R_C between the collectors, R_id = 2 r_π + what degenerates it, 2 (β + 1) R_E; here 2 × 100 Ω.
        var sketch = new BoardSketch().Supply("V1", "VCC", 15).Current("I1", "T", "VEE", -1e-3).Supply("V2", "0", 15, "VEE").Resistor("RC1", "VCC", "C1", 10e3)
            .Resistor("RC2", "VCC", "C2", 10e3).Resistor("RE1", "E1", "T", 100).Resistor("RE2", "E2", "T", 100).Npn("Q1", "C1", "B1", "E1", 150).Npn("Q2", "C2", "B2", "E2", 150)
            .Resistor("RB1", "B1", "0", 1e3).Resistor("RB2", "B2", "0", 1e3);
        var board = new SignalBoard(sketch, 0.025, drive: new Drive("B1", "B2", 1e-3, 0));
        var inner = 0.025 / 0.5e-3;
        Within(150.0 / 151 * 2 * 10e3 / (2 * inner + 2 * 100) * 1e-3, board.Volts("C1", "C2"), 1e-6);
        Within(Parallel(151 * (2 * inner + 2 * 100), 2e3), board.InputOhms("B1", "B2"), 1e-6);
    }

    private static double Parallel(double a, double b) => a * b / (a + b);

    private static void Within(double expected, double actual, double share) => Assert.InRange(actual / expected, 1 - share, 1 + share);
}
