using BenchCheck.Core.Boards;
using BenchCheck.Core.Quantities;
using Xunit;

namespace BenchCheck.Core.Tests.Boards;

public class BoardStructureTests
{
    private static BoardSketch Divider => new BoardSketch().Supply("V1", "VCC", 12).Resistor("R1", "VCC", "OUT", 1000).Resistor("R2", "OUT", "0", 1000);

    private static StructureProblem Only(BoardSketch sketch) => Assert.Single(BoardStructure.Problems(sketch.Board));

    private static void IsError(StructureProblem problem, string part, string words)
    {
        Assert.True(problem.IsError, problem.Message);
        Assert.Equal(part, problem.Part);
        Assert.Contains(words, problem.Message, StringComparison.Ordinal);
    }

    private static void IsWarning(StructureProblem problem, string part, string words)
    {
        Assert.False(problem.IsError, problem.Message);
        Assert.Equal(part, problem.Part);
        Assert.Contains(words, problem.Message, StringComparison.Ordinal);
    }

    [Fact]
    public void A_sound_board_has_no_problems() => Assert.Empty(BoardStructure.Problems(Divider.Npn("Q1", "OUT", "OUT", "0", 100).Board));

    [Fact]
    public void Supplies_that_contradict_each_other_are_an_error_naming_both_and_their_voltages() =>
        IsError(Only(Divider.Supply("V2", "VCC", 5)), "V2", "V2 contradicts V1: 5.00 V against 12.0 V");

    [Fact]
    public void A_loop_of_supplies_over_several_nodes_is_found() =>
        IsError(Only(Divider.Supply("V2", "MID", 5).Supply("V3", "VCC", 6, "MID")), "V3", "contradicts V2, V1: 6.00 V against 7.00 V");

    [Fact]
    public void Supplies_of_the_same_voltage_in_parallel_need_a_source_resistance() =>
        IsError(Only(Divider.Supply("V2", "VCC", 12)), "V2", "state a source resistance");

    [Fact]
    public void A_supply_with_a_source_resistance_may_stand_in_parallel() =>
        Assert.Empty(BoardStructure.Problems(Divider.Add(new Supply("V2", ["VCC", "0"], Nominal.Exactly(5), Nominal.Exactly(1))).Board));

    [Fact]
    public void A_supply_shorted_on_its_own_node_or_by_a_link_is_an_error()
    {
        IsError(Only(Divider.Supply("V2", "OUT", 5, "OUT")), "V2", "V2 is shorted: both of its pins are on node OUT");
        IsError(Only(Divider.Add(new Jumper("W1", ["VCC", "0"], Jumper.UsualOhms))), "V1", "V1 is shorted by W1");
    }

    [Fact]
    public void A_controlled_voltage_source_across_a_supply_is_a_loop_without_resistance() =>
        IsError(
            Only(Divider.Add(new ControlledSource(ControlledSource.VoltageByVoltage, "E1", ["VCC", "0"], Nominal.Exactly(2), new Control.NodePair("OUT", "0")))),
            "E1", "loop without any resistance");

    [Fact]
    public void Nodes_without_any_connection_to_the_reference_are_an_error_naming_nodes_and_parts() =>
        IsError(Only(Divider.Resistor("R3", "A", "B", 100).Resistor("R4", "A", "B", 100)), "R3", "nothing connects nodes A, B (R3, R4) with the reference 0");

    [Fact]
    public void Nodes_behind_capacitors_only_are_a_warning() =>
        IsWarning(
            Only(Divider.Add(new Capacitor("C1", ["OUT", "A"], Nominal.Exactly(1e-6))).Resistor("R3", "A", "B", 100).Resistor("R4", "A", "B", 100)),
            "C1", "no direct current can reach nodes A, B");

    [Fact]
    public void A_node_between_current_sources_only_is_an_error() =>
        IsError(Only(Divider.Current("I1", "A", "OUT", 1e-3).Current("I2", "0", "A", 2e-3)), "I1", "only current sources (I1, I2) connect node A");

    [Fact]
    public void A_node_with_a_single_pin_is_a_warning() =>
        IsWarning(Only(Divider.Resistor("R3", "OUT", "STUB", 100)), "R3", "node STUB has a single pin, R3.2");

    [Fact]
    public void A_part_with_all_pins_on_one_node_is_a_warning() =>
        IsWarning(Only(Divider.Resistor("R3", "OUT", "OUT", 100)), "R3", "R3 has all its pins on node OUT");

    [Fact]
    public void A_reference_that_no_part_touches_is_an_error()
    {
        var board = new Board("sketch", "GND", BoardOrigin.NewBuild, Divider.Board.Parts, []);
        Assert.Contains(BoardStructure.Problems(board), p => p.IsError && p.Message == "no part touches the reference node GND");
    }

    [Fact]
    public void An_op_amp_without_feedback_is_a_warning_and_with_feedback_none()
    {
        BoardSketch With(string minus) => Divider.Resistor("R3", "AMP", "OUT2", 1000).Resistor("R4", "OUT2", "0", 1000)
            .Add(new OpAmp("U1", ["OUT", minus, "AMP", "VCC", "0"], null, OpAmp.UsualOffset, 1.5));
        IsWarning(Only(With("VCC")), "U1", "U1 has no feedback from its output to an input");
        Assert.Empty(BoardStructure.Problems(With("OUT2").Board));
    }

    [Fact]
    public void An_op_amp_with_feedback_to_its_plus_input_only_is_told_to_hold_either_of_two_states()
    {
        var latch = Divider.Resistor("R3", "AMP", "P", 1000).Resistor("R4", "P", "0", 1000)
            .Add(new OpAmp("U1", ["P", "OUT", "AMP", "VCC", "0"], null, OpAmp.UsualOffset, 1.5));
        IsWarning(Only(latch), "U1", "either of two states");
    }

    [Fact]
    public void An_op_amp_with_both_inputs_on_one_node_is_a_warning()
    {
        var board = Divider.Resistor("R3", "AMP", "0", 1000).Add(new OpAmp("U1", ["OUT", "OUT", "AMP", "VCC", "0"], null, OpAmp.UsualOffset, 1.5));
        IsWarning(Only(board), "U1", "both inputs of U1 are on node OUT");
    }

    private static ControlledSource Controlled(PartKind kind, string name, string plus, string minus, Control control) =>
        new(kind, name, [plus, minus], Nominal.Exactly(2), control);

    [Fact]
    public void Sources_that_control_themselves_or_each_other_are_errors()
    {
        IsError(Only(Divider.Resistor("R3", "X", "OUT", 100).Add(Controlled(ControlledSource.VoltageByVoltage, "E1", "X", "0", new Control.NodePair("X", "0")))),
            "E1", "the voltage between its own pins");
        IsError(Only(Divider.Add(Controlled(ControlledSource.CurrentByCurrent, "F1", "OUT", "0", new Control.PartCurrent("F1")))), "F1", "its own current");
        IsError(
            Only(Divider.Add(Controlled(ControlledSource.CurrentByCurrent, "F1", "OUT", "0", new Control.PartCurrent("F2")))
                .Add(Controlled(ControlledSource.CurrentByCurrent, "F2", "OUT", "0", new Control.PartCurrent("F1")))),
            "F1", "F1 and F2 are controlled by each other's current");
    }

    [Fact]
    public void A_node_between_controlled_current_sources_is_an_error_unless_one_follows_the_voltage_there()
    {
        BoardSketch Node(Control control) => Divider.Add(Controlled(ControlledSource.CurrentByCurrent, "F1", "A", "0", new Control.PartCurrent("R1")))
            .Add(Controlled(ControlledSource.CurrentByVoltage, "G1", "0", "A", control));
        IsError(Only(Node(new Control.NodePair("OUT", "0"))), "F1", "only current sources (F1, G1) connect node A");
        Assert.Empty(BoardStructure.Problems(Node(new Control.NodePair("A", "0")).Board));
    }

    [Fact]
    public void A_control_that_carries_no_direct_current_is_a_warning() =>
        IsWarning(
            Only(Divider.Add(new Capacitor("C1", ["OUT", "0"], Nominal.Exactly(1e-6))).Add(Controlled(ControlledSource.CurrentByCurrent, "F1", "OUT", "0", new Control.PartCurrent("C1")))),
            "F1", "which carries none at DC");
}
