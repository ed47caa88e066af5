using BenchCheck.Core.Boards;
using BenchCheck.Core.Equations;
using BenchCheck.Core.Quantities;
using Xunit;

namespace BenchCheck.Core.Tests.Equations;

/// <summary>The search for the operating state on boards drawn at random, healthy and faulty, each state judged by the parts' own laws.</summary>
public class OperatingStateTests
{
    private const int Seeds = 1500;

    /// <summary>Current of a dead short across a stiff supply, from where on nothing is a board any more.</summary>
    private const double SmokeAmperes = 1e5;

    private static Board Draw(string kind, int seed) => kind switch
    {
        "transistors" => RandomBoards.Passive(seed),
        "op-amps" => RandomBoards.WithOpAmps(seed),
        _ => RandomBoards.WithSwitches(seed),
    };

    [Theory]
    [InlineData("transistors", JunctionLaw.Exponential)]
    [InlineData("transistors", JunctionLaw.ConstantDrop)]
    [InlineData("op-amps", JunctionLaw.Exponential)]
    [InlineData("op-amps", JunctionLaw.ConstantDrop)]
    [InlineData("switches", JunctionLaw.Exponential)]
    [InlineData("switches", JunctionLaw.ConstantDrop)]
    public void A_state_is_found_on_every_board_and_obeys_every_part_and_every_node(string kind, JunctionLaw law)
    {
        var judged = 0;
        for (var seed = 0; seed < Seeds; seed++)
        {
            var board = Draw(kind, seed);
            var point = new SolvedBoard(board, law).Point;
            if (point.Currents().Any(c => Math.Abs(c.Amperes) > SmokeAmperes)) continue;
            judged++;
            var violations = StateCheck.Violations(board, law, point);
            Assert.True(violations.Count == 0, $"seed {seed}: {string.Join("; ", violations)}");
        }

        Assert.True(judged > Seeds / 2, $"only {judged} boards judged");
    }

    [Theory]
    [InlineData(JunctionLaw.Exponential)]
    [InlineData(JunctionLaw.ConstantDrop)]
    public void An_ohmmeter_between_any_two_nodes_of_an_unpowered_board_finds_a_state(JunctionLaw law)
    {
        for (var seed = 0; seed < Seeds; seed++)
        {
            var (board, random) = (RandomBoards.Passive(seed), new Random(seed));
            var (high, low) = (board.Nodes[random.Next(board.Nodes.Length)], board.Nodes[random.Next(board.Nodes.Length)]);
            if (high == low) continue;
            var solved = new SolvedBoard(board, law, Condition.Unpowered);
            Assert.True(solved.Ohms(high, low, Math.Pow(10, -6 + 3 * random.NextDouble())) >= -1e-6, $"seed {seed}");
        }
    }

    [Theory]
    [InlineData(JunctionLaw.Exponential)]
    [InlineData(JunctionLaw.ConstantDrop)]
    public void A_board_on_which_no_state_holds_is_named_and_not_searched_for_ever(JunctionLaw law)
    {
        // A source of −2 mS against 1 kΩ leaves −1 kΩ at the node: off, the diode would see 5 V forward; conducting, its current would be negative.
        var sketch = new BoardSketch();
        for (var i = 0; i < 12; i++)
        {
            sketch.Current($"I{i}", "0", $"A{i}", 5e-3).Resistor($"R{i}", $"A{i}", "0", 1e3).Diode($"D{i}", $"A{i}", "0")
                .Add(new ControlledSource(ControlledSource.CurrentByVoltage, $"G{i}", [$"A{i}", "0"], Nominal.Exactly(2e-3), new Control.NodePair($"A{i}", "0")));
        }

        var failure = Assert.Throws<NoOperatingStateException>(() => new SolvedBoard(sketch.Board, law));
        Assert.Contains("no state of the devices", failure.Message, StringComparison.Ordinal);
    }

    [Fact]
    public void Nodes_that_nothing_joins_read_zero_and_open()
    {
        var board = new BoardSketch().Supply("V1", "P", 9).Resistor("R1", "P", "0", 1e3)
            .Resistor("R2", "X", "Y", 1e3).Diode("D1", "Y", "Z").Resistor("R3", "U", "W", 2e3).Board;
        var solved = new SolvedBoard(board, JunctionLaw.Exponential);
        Assert.Equal(0, solved.Volts("X"), 1e-6);
        Assert.Equal(2e3, solved.Ohms("U", "W"), 1e-3);
        Assert.True(solved.Ohms("U", "P") > 1e11);
    }

    [Fact]
    public void Parts_eleven_decades_apart_leave_a_state_as_exact_as_any()
    {
        // 10 mΩ in series with 1 GΩ: V · 1e-11 across the small one, and the divider below a floating base.
        var board = new BoardSketch().Supply("V1", "P", 10).Resistor("R1", "P", "M", 1e9).Resistor("R2", "M", "0", 0.01)
            .Npn("Q1", "P", "B", "E", 100).Resistor("R3", "E", "0", 1e9).Board;
        var solved = new SolvedBoard(board, JunctionLaw.Exponential);
        Assert.Equal(10 * 0.01 / 1e9, solved.Volts("M"), 1e-16);
        Assert.InRange(solved.Volts("E"), -1e-3, 10);
    }
}
