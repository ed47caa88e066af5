using BenchCheck.Core.Boards;
using BenchCheck.Core.Equations;
using BenchCheck.Core.Fitting;
using BenchCheck.Core.Metering;
using BenchCheck.Core.Quantities;
using Xunit;

namespace BenchCheck.Core.Tests.Equations;

/// <summary>Junctions whose voltage follows their current (Shockley): what the constant drop cannot show.</summary>
public class JunctionLawTests
{
    [Fact]
    public void A_diode_at_10_microamperes_reads_about_0_12_V_less_than_at_1_milliampere()
    {
        var volts = new BoardSketch().Current("I1", "A", "0", 1e-3).Diode("D1", "A", "0").Current("I2", "B", "0", 10e-6).Diode("D2", "B", "0").Voltages(JunctionLaw.Exponential);

        // n·V_T·ln 100 at 25 °C: 0.118 V for n = 1; a small diode's n of about 1.1 to 1.2 makes 0.13 V.
        Assert.InRange(volts["A"] - volts["B"], 0.115, 0.145);
    }

    [Fact]
    public void Joined_emitters_share_their_current()
    {
        var volts = new BoardSketch().Supply("V1", "VCC", 12).Resistor("R1", "VCC", "C1", 1e3).Resistor("R2", "VCC", "C2", 1e3).Current("I1", "0", "E", 4e-3)
            .Supply("V2", "B1", 5).Supply("V3", "B2", 5).Npn("Q1", "C1", "B1", "E", 200).Npn("Q2", "C2", "B2", "E", 200).Voltages(JunctionLaw.Exponential);
        Assert.Equal(volts["C1"], volts["C2"], 1e-5);
        Assert.InRange(12 - volts["C1"], 1.98, 2.0);
    }

    [Fact]
    public void Joined_emitters_divide_their_current_by_the_exponential_of_the_difference_of_their_bases()
    {
        // Widlar's and every differential pair's rule: I1/I2 = exp(ΔV/nV_T), here with the resistance in series left small: within 3 %.
        var volts = new BoardSketch().Supply("V1", "VCC", 12).Resistor("R1", "VCC", "C1", 1e3).Resistor("R2", "VCC", "C2", 1e3).Current("I1", "0", "E", 1e-3)
            .Supply("V2", "B1", 5.06).Supply("V3", "B2", 5).Npn("Q1", "C1", "B1", "E", 200).Npn("Q2", "C2", "B2", "E", 200).Voltages(JunctionLaw.Exponential);
        var ratio = (12 - volts["C1"]) / (12 - volts["C2"]);
        Assert.InRange(ratio / Math.Exp(0.06 / (1.02 * JunctionCurve.ThermalVolts(25))), 0.95, 1.03);
    }

    [Fact]
    public void A_transistor_that_begins_off_can_leave_that_state()
    {
        // The second transistor gets base current only once the first conducts.
        var volts = new BoardSketch().Supply("V1", "VCC", 12).Resistor("R1", "VCC", "B1", 1e6).Npn("Q1", "C1", "B1", "0", 200).Resistor("R2", "VCC", "C1", 10e3)
            .Pnp("Q2", "OUT", "B2", "VCC", 100).Resistor("R3", "C1", "B2", 10e3).Resistor("R4", "OUT", "0", 2.2e3).Voltages(JunctionLaw.Exponential);
        Assert.InRange(volts["OUT"], 1, 12);
        Assert.InRange(volts["B1"], 0.5, 0.75);
    }

    [Fact]
    public void A_drop_stated_at_a_current_is_read_at_that_current()
    {
        var led = new Diode(Diode.Led, "D1", ["A", "0"], Nominal.Exactly(2.0)) { ReferenceAmperes = 20e-3 };
        var volts = new BoardSketch().Current("I1", "A", "0", 20e-3).Add(led).Voltages(JunctionLaw.Exponential);

        // The resistance in series, a few ohms, comes on top of the junction.
        Assert.InRange(volts["A"], 2.0, 2.2);
    }

    [Theory]
    [InlineData(2e-3, 0.01)]
    [InlineData(20e-6, 0.3)]
    public void A_gain_stated_at_another_current_is_known_less_well(double stated, double widening)
    {
        BoardModel Model(double? at)
        {
            var q = new Transistor(Transistor.Npn, "Q1", ["C", "B", "E"], Nominal.Between(100, 300), Transistor.UsualDrop, Transistor.UsualSaturation) { StatedAmperes = at };
            var board = new BoardSketch().Supply("V1", "VCC", 12).Resistor("R1", "VCC", "B", 68e3).Resistor("R2", "B", "0", 15e3).Resistor("R3", "VCC", "C", 2.7e3)
                .Resistor("R4", "E", "0", 680).Add(q).Board;
            return BoardModel.AtPlaces(board, [new Probe(Condition.DefaultName, ReadingQuantity.Voltage, "C", null, Meter.Usual, 6)], new NetworkSolver(JunctionLaw.Exponential));
        }

        // The stage runs at about 2 mA.
        double Sigma(double? at) => Model(at).Parameters.Single(p => p.Kind == ParameterKind.Gain).Sigma;
        Assert.Equal(widening, Math.Sqrt(Sigma(stated) * Sigma(stated) - Sigma(null) * Sigma(null)), 0.02);
    }
}
