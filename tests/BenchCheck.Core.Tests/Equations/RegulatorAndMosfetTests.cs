using BenchCheck.Core.Boards;
using BenchCheck.Core.Equations;
using BenchCheck.Core.Quantities;
using Xunit;

namespace BenchCheck.Core.Tests.Equations;

/// <summary>Regulators and MOSFETs in each of their states against figures worked out by hand.</summary>
public class RegulatorAndMosfetTests
{
    [Theory]
    [InlineData(12, 5, "regulating")]
    [InlineData(6, 4, "in drop-out")]
    [InlineData(1, 0, "off")]
    public void A_regulator_regulates_drops_out_or_is_off(double input, double output, string state)
    {
        // 2 V drop-out: 5 V from 7 V on, below that 2 V less than the input, and nothing from 2 V down.
        var board = new SolvedBoard(new BoardSketch().Supply("V1", "IN", input).Add(Regulator("U1", "IN", "OUT", "0")).Resistor("R1", "OUT", "0", 500).Board);
        Assert.Equal(output, board.Volts("OUT"), 1e-4);
        Assert.Equal(state, board.Point.State(board.Board.Find("U1")!));
    }

    [Fact]
    public void A_regulator_takes_its_output_current_and_its_own_from_the_input()
    {
        var board = new SolvedBoard(new BoardSketch().Supply("V1", "IN", 12).Add(Regulator("U1", "IN", "OUT", "0")).Resistor("R1", "OUT", "0", 500).Board);
        var currents = board.Point.Currents().ToDictionary(c => c.At, c => c.Amperes);
        Assert.Equal(-15e-3, currents["V1"], 2e-5);
        Assert.Equal(-10e-3, currents["U1.output"], 1e-6);

        // (12 − 5) V · 10 mA through it, 12 V · 5 mA of its own.
        Assert.Equal(0.13, board.Point.Watts(board.Board.Find("U1")!), 2e-4);
    }

    [Fact]
    public void A_regulator_does_not_pull_its_output_down()
    {
        var board = new SolvedBoard(new BoardSketch().Supply("V1", "IN", 12).Add(Regulator("U1", "IN", "OUT", "0")).Supply("V2", "X", 9).Resistor("R1", "X", "OUT", 100)
            .Resistor("R2", "OUT", "0", 10e3).Board);
        Assert.Equal(9 * 10e3 / 10.1e3, board.Volts("OUT"), 1e-3);
    }

    [Fact]
    public void A_regulator_lifted_by_a_divider_gives_a_higher_voltage()
    {
        // V_out = 5 V (1 + R2/R1) + I_idle R2, the usual formula of data sheets.
        var board = new SolvedBoard(new BoardSketch().Supply("V1", "IN", 15).Add(Regulator("U1", "IN", "OUT", "ADJ")).Resistor("R1", "OUT", "ADJ", 500).Resistor("R2", "ADJ", "0", 200).Board);
        Assert.Equal(5 * (1 + 200.0 / 500) + 5e-3 * 200, board.Volts("OUT"), 3e-3);
    }

    [Theory]
    [InlineData(5, 12 * 2.0 / 102, "on")]
    [InlineData(1.5, 12, "off")]
    public void An_n_channel_switch_is_its_on_resistance_or_open(double gate, double drain, string state)
    {
        var board = new SolvedBoard(new BoardSketch().Supply("V1", "VCC", 12).Supply("V2", "G", gate).Resistor("R1", "VCC", "D", 100).Add(Nmos("D", "G", "0")).Board);
        Assert.Equal(drain, board.Volts("D"), 1e-4);
        Assert.Equal(state, board.Point.State(board.Board.Find("Q1")!));
    }

    [Fact]
    public void Between_off_and_on_the_gate_sets_the_current()
    {
        // Source resistor: v_G − threshold = I (R + R_on).
        var board = new SolvedBoard(new BoardSketch().Supply("V1", "VCC", 12).Supply("V2", "G", 4).Add(Nmos("VCC", "G", "S")).Resistor("R1", "S", "0", 98).Board);
        Assert.Equal((4 - 2) / 100.0 * 98, board.Volts("S"), 1e-4);
        Assert.Equal("partly on", board.Point.State(board.Board.Find("Q1")!));
    }

    [Fact]
    public void A_p_channel_switch_conducts_with_its_gate_low()
    {
        Board Board(double gate) => new BoardSketch().Supply("V1", "VCC", 12).Supply("V2", "G", gate).Resistor("R1", "D", "0", 100)
            .Add(new Mosfet(Mosfet.PChannel, "Q1", ["D", "G", "VCC"], Nominal.Exactly(2), Nominal.Exactly(2))).Board;
        Assert.Equal(12 * 100.0 / 102, new SolvedBoard(Board(0)).Volts("D"), 1e-4);
        Assert.Equal(0, new SolvedBoard(Board(11)).Volts("D"), 1e-4);
    }

    [Fact]
    public void A_body_diode_conducts_backwards()
    {
        var board = new SolvedBoard(new BoardSketch().Supply("V1", "S", 5).Resistor("R1", "D", "0", 1e3).Add(Nmos("D", "0", "S")).Board);
        Assert.InRange(board.Volts("D"), 4.2, 4.4);
        Assert.Equal("off, body diode conducting", board.Point.State(board.Board.Find("Q1")!));
    }

    [Theory]
    [InlineData(JunctionLaw.ConstantDrop)]
    [InlineData(JunctionLaw.Exponential)]
    public void Sensitivities_of_regulators_and_channels_are_those_of_differences(JunctionLaw law)
    {
        var board = new BoardSketch().Supply("V1", "IN", 6.2).Add(Regulator("U1", "IN", "V5", "0")).Resistor("R1", "V5", "D", 220).Resistor("R2", "V5", "G", 10e3).Resistor("R3", "G", "0", 33e3)
            .Add(Nmos("D", "G", "S")).Resistor("R4", "S", "0", 47).Board;
        var table = new ParameterTable(board);
        var network = NetworkCompiler.Compile(board, table, board.Conditions[0]);
        var solver = new NetworkSolver(law);
        var theta = BoardSketch.NominalValues(table);
        var measurement = new Measurement(network.IndexOf("S"), -1, 1e-7);
        double At(double[] values)
        {
            solver.Solve(network, values);
            return solver.Read(measurement, []);
        }

        var gradient = new double[theta.Length];
        solver.Solve(network, theta);
        solver.Read(measurement, gradient);
        for (var i = 0; i < theta.Length; i++)
        {
            var step = 1e-5 * theta[i];
            var moved = theta.ToArray();
            moved[i] += step;
            var above = At(moved);
            moved[i] -= 2 * step;
            Assert.Equal((above - At(moved)) / (2 * step) * theta[i], gradient[i] * theta[i], 1e-6);
        }
    }

    private static Regulator Regulator(string name, string input, string output, string common) =>
        new(name, [input, output, common], Nominal.Exactly(5), Nominal.Exactly(2), Nominal.Exactly(5e-3));

    private static Mosfet Nmos(string drain, string gate, string source) =>
        new(Mosfet.NChannel, "Q1", [drain, gate, source], Nominal.Exactly(2), Nominal.Exactly(2));
}
