using BenchCheck.Core.Boards;
using BenchCheck.Core.Equations;
using BenchCheck.Core.Metering;
using BenchCheck.Core.Quantities;
using Xunit;

namespace BenchCheck.Core.Tests.Equations.SmallSignal;

/// <summary>
/// The equivalent for small signals is the derivative of the equations at rest: gains and resistances against what a supply, or a current, moved by a
/// little does to the DC solution under the junction law. Emission coefficients and series resistances are the usual ones.
/// </summary>
public class TangentTests
{
    private const double Step = 1e-4;

    public static TheoryData<string> Boards => [.. Sketches.Keys];

    private static readonly Dictionary<string, BoardSketch> Sketches = new()
    {
        ["npn"] = Fed(1.1).Resistor("RC", "VCC", "OUT", 3.3e3).Resistor("RE", "E", "0", 330).Npn("Q1", "OUT", "B", "E", 150).Resistor("RB", "IN", "B", 1e3),
        ["npn without emitter resistor"] = Fed(2).Resistor("RC", "VCC", "OUT", 1e3).Npn("Q1", "OUT", "B", "0", 150).Resistor("RB", "IN", "B", 47e3),
        ["pnp"] = Fed(10.9).Resistor("RC", "OUT", "0", 3.3e3).Resistor("RE", "E", "VCC", 330).Pnp("Q1", "OUT", "B", "E", 80).Resistor("RB", "IN", "B", 1e3),
        ["pnp follower"] = Fed(5).Resistor("RE", "OUT", "VCC", 2.2e3).Pnp("Q1", "0", "IN", "OUT", 80),
        ["saturated npn"] = Fed(5).Resistor("RC", "VCC", "OUT", 10e3).Npn("Q1", "OUT", "B", "0", 150).Resistor("RB", "IN", "B", 10e3),
        ["saturated pnp"] = Fed(6).Resistor("RC", "OUT", "0", 10e3).Pnp("Q1", "OUT", "B", "VCC", 80).Resistor("RB", "IN", "B", 10e3),
        ["transistor used backwards"] = Fed(3).Resistor("RC", "VCC", "OUT", 10e3).Npn("Q1", "0", "B", "OUT", 150).Resistor("RB", "IN", "B", 100e3),
        ["pair with joined emitters"] = Fed(0.01).Supply("V3", "0", 9, "VEE").Resistor("RC", "VCC", "OUT", 10e3).Npn("Q1", "VCC", "IN", "E", 120).Npn("Q2", "OUT", "0", "E", 200)
            .Resistor("RE", "E", "VEE", 8.2e3),
        ["two coupled stages"] = Fed(0.68).Resistor("R1", "VCC", "C", 10e3).Npn("Q1", "C", "IN", "E1", 200).Resistor("R2", "E1", "0", 47).Pnp("Q2", "OUT", "C", "E2", 100)
            .Resistor("R3", "VCC", "E2", 1e3).Resistor("R4", "OUT", "0", 2.2e3).Resistor("R5", "OUT", "E1", 4.7e3),
        ["diode"] = Fed(2).Resistor("R1", "IN", "OUT", 10e3).Diode("D1", "OUT", "0").Resistor("R2", "OUT", "0", 4.7e3),
        ["Schottky diode at a microampere"] = Fed(0.2).Resistor("R1", "IN", "OUT", 100e3).Diode("D1", "OUT", "0", 0.25),
        ["Schottky diode held back"] = Fed(-0.05).Resistor("R1", "IN", "OUT", 100e3).Diode("D1", "OUT", "0", 0.25),
        ["LED"] = Fed(5).Resistor("R1", "IN", "OUT", 470).Add(new Diode(Diode.Led, "D1", ["OUT", "0"], Nominal.Exactly(1.9))),
        ["zener in breakdown"] = Fed(9).Resistor("R1", "IN", "OUT", 680).Zener("D1", "0", "OUT", 5.1).Resistor("R2", "OUT", "0", 2.2e3),
        ["zener forward"] = Fed(3).Resistor("R1", "IN", "OUT", 680).Zener("D1", "OUT", "0", 5.1),
        ["bridge of diodes"] = Fed(4).Resistor("R1", "IN", "A", 220).Diode("D1", "A", "OUT").Diode("D2", "0", "A").Diode("D3", "B", "OUT").Diode("D4", "0", "B").Resistor("R2", "OUT", "0", 1e3)
            .Resistor("R3", "B", "0", 1e3),
        ["op-amp in its range"] = Amplifier(0.3, 1e5),
        ["op-amp of little gain"] = Amplifier(0.3, 50),
        ["op-amp at its upper limit"] = Amplifier(-3, 1e5),
        ["op-amp at its lower limit"] = Amplifier(3, 1e5),
        ["op-amp with a diode in its feedback"] = Amplifier(1, 1e5).Diode("D1", "M", "OUT"),
        ["MOSFET at its threshold"] = Fed(2.1).Resistor("RD", "VCC", "OUT", 100).Add(new Mosfet(Mosfet.NChannel, "Q1", ["OUT", "IN", "E"], Nominal.Exactly(2), Nominal.Exactly(2)))
            .Resistor("RS", "E", "0", 10),
        ["MOSFET switched on"] = Fed(5).Resistor("RD", "IN", "OUT", 100).Add(new Mosfet(Mosfet.NChannel, "Q1", ["OUT", "VCC", "0"], Nominal.Exactly(2), Nominal.Exactly(2))),
        ["regulator"] = Fed(9).Add(new Regulator("U1", ["IN", "OUT", "0"], Nominal.Exactly(5), Nominal.Exactly(1.8), Nominal.Exactly(5e-3))).Resistor("R1", "OUT", "0", 470),
        ["regulator in drop-out"] = Fed(6).Add(new Regulator("U1", ["IN", "OUT", "0"], Nominal.Exactly(5), Nominal.Exactly(1.8), Nominal.Exactly(5e-3))).Resistor("R1", "OUT", "0", 470),
    };

    [Theory]
    [MemberData(nameof(Boards))]
    public void Gain_is_what_the_output_moves_for_a_small_move_of_the_input(string name)
    {
        var (up, down) = (Rest(name, Step, 0, "OUT"), Rest(name, -Step, 0, "OUT"));
        var expected = (up.Volts("OUT") - down.Volts("OUT")) / (up.Volts("IN") - down.Volts("IN"));
        var actual = Read(name, ReadingQuantity.Gain, "OUT", "IN");
        Assert.True(Math.Abs(expected - actual) <= 2e-4 * Math.Abs(expected) + 1e-6, $"gain {actual}, moved by {expected}");
    }

    [Theory]
    [MemberData(nameof(Boards))]
    public void Resistance_looking_in_is_what_a_node_moves_for_a_small_current(string name)
    {
        foreach (var node in new[] { "IN", "OUT" })
        {
            var scale = Read(name, ReadingQuantity.OutputResistance, node, "0");
            var amperes = Step / Math.Max(scale, 1);
            var expected = (Rest(name, 0, amperes, node).Volts(node) - Rest(name, 0, -amperes, node).Volts(node)) / (2 * amperes);
            Assert.True(Math.Abs(expected - scale) <= 2e-4 * Math.Abs(expected) + 1e-3, $"{node}: {scale} Ω, moved by {expected} V/A");
        }
    }

    [Theory]
    [MemberData(nameof(Boards))]
    public void Derivatives_follow_every_parameter_in_every_state(string name)
    {
        var board = new SignalBoard(Sketches[name], JunctionCurve.ThermalVolts(25), law: JunctionLaw.Exponential);
        var theta = BoardSketch.NominalValues(board.Table);
        var gradient = new double[theta.Length];
        var value = board.Read(ReadingQuantity.OutputResistance, "OUT", "0", theta, gradient);
        for (var i = 0; i < theta.Length; i++)
        {
            var step = 1e-5 * Math.Abs(theta[i]);
            if (step == 0) continue;
            double At(double sign)
            {
                var moved = theta.ToArray();
                moved[i] += sign * step;
                return board.Read(ReadingQuantity.OutputResistance, "OUT", "0", moved, []);
            }

            var difference = (At(1) - At(-1)) / (2 * step);
            Assert.True(Math.Abs(difference - gradient[i]) * Math.Abs(theta[i]) <= 1e-5 * (value + Math.Abs(difference * theta[i])),
                $"{board.Table.Entries[i].Part.Designator} {board.Table.Entries[i].Kind}: {gradient[i]} for {difference}");
        }
    }

    private static BoardSketch Fed(double volts) => new BoardSketch().Supply("V1", "VCC", 12).Add(new Supply("V2", ["IN", "0"], Nominal.Exactly(volts), Nominal.Exactly(100)));

    private static BoardSketch Amplifier(double volts, double gain) => Fed(volts).Supply("V3", "0", 12, "VEE").Resistor("R1", "IN", "M", 10e3).Resistor("R2", "M", "OUT", 100e3).Resistor("R3", "OUT", "0", 2e3)
        .Add(new OpAmp("U1", ["0", "M", "OUT", "VCC", "VEE"], Nominal.Exactly(gain), Nominal.Exactly(1e-3), 1.5));

    /// <summary>The board at rest with its input supply and the current into a node moved.</summary>
    private static SolvedBoard Rest(string name, double volts, double amperes, string node)
    {
        var board = Sketches[name].Board;
        var input = (Supply)board.Find("V2")!;
        return new SolvedBoard(
            board.With([input with { Volts = Nominal.Exactly(input.Volts.Value + volts) }], [new CurrentSource("I1", [node, "0"], Nominal.Exactly(amperes))]), JunctionLaw.Exponential);
    }

    private static double Read(string name, ReadingQuantity quantity, string at, string against)
    {
        var board = new SignalBoard(Sketches[name], JunctionCurve.ThermalVolts(25), law: JunctionLaw.Exponential);
        return board.Read(quantity, at, against, BoardSketch.NominalValues(board.Table), []);
    }
}
