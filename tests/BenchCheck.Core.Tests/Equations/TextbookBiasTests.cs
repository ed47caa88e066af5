using BenchCheck.Core.Equations;
using Xunit;

namespace BenchCheck.Core.Tests.Equations;

/// <summary>
/// Published transistor bias examples, constant-drop law. First figure: the exact linear model, recomputed independently of this program,
/// to 1e-4; in the comment what the book prints, which often takes i_E for i_C. Books: Boylestad and Nashelsky, Electronic Devices and Circuit
/// Theory 10e; Sedra and Smith, Microelectronic Circuits 5e; Neamen, Electronic Circuit Analysis and Design 2e; Floyd, Electronic Devices 7e;
/// Malvino and Bates, Electronic Principles 7e; Bell, Electronic Devices and Circuits 5e; Millman and Halkias, Integrated Electronics.
/// </summary>
public class TextbookBiasTests
{
    private static void Assert4(double expected, double actual) => Assert.InRange(actual, expected - 1.01e-4, expected + 1.01e-4);

    [Fact]
    public void Fixed_bias_matches_Boylestad_4_1()
    {
        // printed V_CE 6.82 V, I_C 2.35 mA
        var v = new BoardSketch().Supply("V1", "VCC", 12).Resistor("RB", "VCC", "B", 240e3).Resistor("RC", "VCC", "C", 2.2e3).Npn("Q1", "C", "B", "0", 50).Voltages();
        Assert4(6.8208, v["C"]);
        Assert4(0.7, v["B"]);
    }

    [Fact]
    public void Emitter_bias_matches_Boylestad()
    {
        // printed V_C 15.98 V, V_E 2.01 V (from memory); exact model below
        var v = new BoardSketch().Supply("V1", "VCC", 20).Resistor("RB", "VCC", "B", 430e3).Resistor("RC", "VCC", "C", 2e3).Resistor("RE", "E", "0", 1e3)
            .Npn("Q1", "C", "B", "E", 50).Voltages();
        Assert4(2.7464, v["B"]);
        Assert4(2.0464, v["E"]);
        Assert4(15.9875, v["C"]);
    }

    [Theory]
    [InlineData(140, 1.9786, 1.2786, 13.5367)] // printed V_CE 12.22 V (from memory)
    [InlineData(100, 1.9703, 1.2703, 13.6154)] // printed V_CE 12.34 V (from memory)
    public void Divider_bias_matches_Boylestad(double gain, double b, double e, double c)
    {
        var v = Divider(22, 39e3, 3.9e3, 10e3, 1.5e3, gain).Voltages();
        Assert4(b, v["B"]);
        Assert4(e, v["E"]);
        Assert4(c, v["C"]);
    }

    [Theory]
    [InlineData(15, 100e3, 50e3, 5e3, 3e3, 100, 4.5738, 3.8738, 8.6075)] // Sedra 5.10, printed V_B 4.57, V_C 8.6
    [InlineData(10, 56e3, 12.2e3, 2e3, 0.4e3, 100, 1.5725, 0.8725, 5.6806)] // Neamen 3.14, printed V_CE 4.81
    [InlineData(10, 10e3, 2.2e3, 3.6e3, 1e3, 200, 1.7935, 1.0935, 6.0831)] // Malvino 8-3, printed I_E 1.09 mA
    [InlineData(18, 33e3, 12e3, 1.2e3, 1e3, 50, 4.1967, 3.4967, 13.8863)] // Bell 5.9, printed V_CE 10.4
    [InlineData(18, 33e3, 12e3, 1.2e3, 1e3, 100, 4.4714, 3.7714, 13.5191)] // Bell 5.8, printed V_CE 9.7
    [InlineData(18, 33e3, 12e3, 1.2e3, 1e3, 200, 4.6280, 3.9280, 13.3098)] // Bell 5.10, printed V_CE 9.4
    public void Divider_bias_matches_the_books(double supply, double r1, double r2, double rc, double re, double gain, double b, double e, double c)
    {
        var v = Divider(supply, r1, r2, rc, re, gain).Voltages();
        Assert4(b, v["B"]);
        Assert4(e, v["E"]);
        Assert4(c, v["C"]);
    }

    [Theory]
    [InlineData(10, 250e3, 4.7e3, 1.2e3, 90, 1.9906, 4.9452)] // Boylestad, printed V_CE 3.69 (from memory)
    [InlineData(10, 250e3, 4.7e3, 1.2e3, 135, 2.1422, 4.3514)] // Boylestad, printed V_CE 2.92 (from memory)
    [InlineData(20, 680e3, 4.7e3, 0, 120, 0.7, 11.2101)] // Boylestad, printed V_C 11.26 (from memory)
    [InlineData(10, 100e3, 10e3, 0, 100, 0.7, 1.5378)] // Floyd 5.8, printed V_CE 1.545
    [InlineData(18, 270e3, 2.2e3, 0, 100, 0.7, 10.1900)] // Bell 5.5, printed V_CE 10.2
    public void Collector_feedback_matches_the_books(double supply, double rf, double rc, double re, double gain, double b, double c)
    {
        var sketch = new BoardSketch().Supply("V1", "VCC", supply).Resistor("RF", "C", "B", rf).Resistor("RC", "VCC", "C", rc);
        if (re > 0) sketch.Resistor("RE", "E", "0", re);
        var v = sketch.Npn("Q1", "C", "B", re > 0 ? "E" : "0", gain).Voltages();
        Assert4(b, v["B"]);
        Assert4(c, v["C"]);
    }

    [Fact]
    public void Feedback_pair_of_pnp_and_npn_matches_Boylestad_5_18()
    {
        // printed V_out 9.55 V, V_B1 8.85 V with beta for beta + 1
        var v = new BoardSketch().Supply("V1", "VCC", 18).Resistor("RB", "B1", "0", 2e6).Resistor("RC", "VCC", "OUT", 75)
            .Pnp("Q1", "B2", "B1", "OUT", 140).Npn("Q2", "OUT", "B2", "0", 180).Voltages();
        Assert4(8.8705, v["B1"]);
        Assert4(9.5705, v["OUT"]);
    }

    [Fact]
    public void Npn_and_pnp_direct_coupled_match_Sedra_5_11()
    {
        // printed V_C1 8.74 V, V_E2 9.44 V, V_C2 7.43 V (from memory)
        var v = Divider(15, 100e3, 50e3, 5e3, 3e3, 100).Resistor("RE2", "VCC", "E2", 2e3).Resistor("RC2", "C2", "0", 2.7e3).Pnp("Q2", "C2", "C", "E2", 100).Voltages();
        Assert4(8.7450, v["C"]);
        Assert4(9.4450, v["E2"]);
        Assert4(7.4250, v["C2"]);
    }

    [Fact]
    public void Npn_and_pnp_between_two_supplies_match_Neamen_3_17()
    {
        // printed V_C1 -0.48 V, V_E2 0.22 V, V_C2 -1.45 V
        var v = new BoardSketch().Supply("V1", "P", 5).Supply("V2", "N", -5).Resistor("R1", "P", "B1", 100e3).Resistor("R2", "B1", "N", 50e3)
            .Resistor("RE1", "E1", "N", 2e3).Resistor("RC1", "P", "C1", 5e3).Resistor("RE2", "P", "E2", 2e3).Resistor("RC2", "C2", "N", 1.5e3)
            .Npn("Q1", "C1", "B1", "E1", 100).Pnp("Q2", "C2", "C1", "E2", 100).Voltages();
        Assert4(-2.0397, v["B1"]);
        Assert4(-2.7397, v["E1"]);
        Assert4(-0.4767, v["C1"]);
        Assert4(0.2233, v["E2"]);
        Assert4(-1.4530, v["C2"]);
    }

    [Fact]
    public void Two_supply_emitter_bias_matches_malvino_com_biasans4()
    {
        // printed V_B -0.902, V_E -1.6, V_C 6.69 V
        var v = new BoardSketch().Supply("V1", "P", 15).Supply("V2", "N", -15).Resistor("RB", "B", "0", 51e3).Resistor("RE", "E", "N", 7.5e3)
            .Resistor("RC", "P", "C", 4.7e3).Npn("Q1", "C", "B", "E", 100).Voltages();
        Assert4(-0.9020, v["B"]);
        Assert4(-1.6020, v["E"]);
        Assert4(6.6871, v["C"]);
    }

    [Fact]
    public void Loaded_collector_between_two_supplies_matches_Neamen_3_9()
    {
        // printed V_C 3.91 V, I_C 0.83 mA
        var v = new BoardSketch().Supply("V1", "P", 12).Supply("V2", "N", -5).Resistor("RB", "B", "0", 10e3).Resistor("RE", "E", "N", 5e3)
            .Resistor("RC", "P", "C", 5e3).Resistor("RL", "C", "0", 5e3).Npn("Q1", "C", "B", "E", 100).Voltages();
        Assert4(-0.0835, v["B"]);
        Assert4(3.9126, v["C"]);
    }

    [Theory]
    [InlineData(5, 200e3, 3e3, 0, 100, 0.7, 3.55)] // Millman 5.1a, printed V_CB 2.85
    [InlineData(5, 200e3, 3e3, 2e3, 100, 2.8607, 6.7910)] // Millman 5.1b, printed V_CB 3.93
    [InlineData(4, 220e3, 2e3, 0, 200, 0.7, 4.0)] // Neamen 3.3, printed V_CE 4.00
    [InlineData(5, 100e3, 2e3, 0, 100, 0.7, 1.4)] // Sedra 5.8, printed V_C 1.4
    public void Base_fed_from_its_own_supply_matches_the_books(double baseSupply, double rb, double rc, double re, double gain, double b, double c)
    {
        var sketch = new BoardSketch().Supply("V1", "VCC", 10).Supply("V2", "VBB", baseSupply).Resistor("RB", "VBB", "B", rb).Resistor("RC", "VCC", "C", rc);
        if (re > 0) sketch.Resistor("RE", "E", "0", re);
        var v = sketch.Npn("Q1", "C", "B", re > 0 ? "E" : "0", gain).Voltages();
        Assert4(b, v["B"]);
        Assert4(c, v["C"]);
    }

    [Fact]
    public void Saturated_stage_matches_Sedra_5_5()
    {
        // printed V_E 5.3 V, V_C 5.5 V with V_CEsat 0.2 V; the active-region answer would be 2.45 V
        var v = new BoardSketch().Supply("V1", "VCC", 10).Supply("V2", "B", 6).Resistor("RC", "VCC", "C", 4.7e3).Resistor("RE", "E", "0", 3.3e3)
            .Npn("Q1", "C", "B", "E", 100).Voltages();
        Assert4(5.3, v["E"]);
        Assert4(5.5, v["C"]);
    }

    [Fact]
    public void Constant_drop_and_junction_law_agree_where_the_drop_is_stated()
    {
        // 1 mA of collector current: the junction law's drop is the stated one there.
        BoardSketch Stage() => new BoardSketch().Supply("V1", "VCC", 10).Supply("V2", "B", 1.7).Resistor("RC", "VCC", "C", 4.7e3)
            .Resistor("RE", "E", "0", 1010).Npn("Q1", "C", "B", "E", 100);
        Assert.InRange(Stage().Voltages(JunctionLaw.Exponential)["E"], 1 - 1e-3, 1 + 3e-3);
    }

    private static BoardSketch Divider(double supply, double r1, double r2, double rc, double re, double gain) =>
        new BoardSketch().Supply("V1", "VCC", supply).Resistor("R1", "VCC", "B", r1).Resistor("R2", "B", "0", r2).Resistor("RC", "VCC", "C", rc)
            .Resistor("RE", "E", "0", re).Npn("Q1", "C", "B", "E", gain);
}
