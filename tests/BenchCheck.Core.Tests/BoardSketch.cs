using System.Collections.Immutable;
using BenchCheck.Core.Boards;
using BenchCheck.Core.Equations;
using BenchCheck.Core.Quantities;

namespace BenchCheck.Core.Tests;

/// <summary>Writes a board down in a few words for a test; "0" is the reference node.</summary>
internal sealed class BoardSketch
{
    private readonly List<Part> parts = [];
    private readonly List<Condition> conditions = [];

    public BoardSketch Resistor(string name, string from, string to, double ohms, double percent = 0) =>
        Add(new Resistor(name, [from, to], Nominal.Within(ohms, Tolerance.Percent(percent))));

    public BoardSketch Supply(string name, string plus, double volts, string minus = "0", double percent = 0) =>
        Add(new Supply(name, [plus, minus], Nominal.Within(volts, Tolerance.Percent(percent))));

    public BoardSketch Current(string name, string plus, string minus, double amperes) =>
        Add(new CurrentSource(name, [plus, minus], Nominal.Exactly(amperes)));

    public BoardSketch Npn(string name, string collector, string @base, string emitter, double gain, double drop = 0.7) =>
        Add(Bipolar(Transistor.Npn, name, collector, @base, emitter, Nominal.Exactly(gain), drop));

    public BoardSketch Pnp(string name, string collector, string @base, string emitter, double gain, double drop = 0.7) =>
        Add(Bipolar(Transistor.Pnp, name, collector, @base, emitter, Nominal.Exactly(gain), drop));

    public BoardSketch Npn(string name, string collector, string @base, string emitter, double lowGain, double highGain, double drop) =>
        Add(Bipolar(Transistor.Npn, name, collector, @base, emitter, Nominal.Between(lowGain, highGain), drop));

    public BoardSketch Diode(string name, string anode, string cathode, double drop = 0.65) =>
        Add(new Diode(Core.Boards.Diode.Plain, name, [anode, cathode], Nominal.Exactly(drop)));

    public BoardSketch Zener(string name, string anode, string cathode, double breakdown, double drop = 0.65) =>
        Add(new Diode(Core.Boards.Diode.Zener, name, [anode, cathode], Nominal.Exactly(drop), Nominal.Exactly(breakdown)));

    public BoardSketch Capacitor(string name, string from, string to, double farads) => Add(new Capacitor(name, [from, to], Nominal.Exactly(farads)));

    public BoardSketch Add(Part part)
    {
        parts.Add(part);
        return this;
    }

    public BoardSketch In(Condition condition)
    {
        conditions.Add(condition);
        return this;
    }

    public Board Board => new("sketch", "0", BoardOrigin.NewBuild, [.. parts], [.. conditions]);

    /// <summary>Node voltages with every part at its nominal value.</summary>
    public Dictionary<string, double> Voltages(JunctionLaw law = JunctionLaw.ConstantDrop)
    {
        var board = Board;
        var table = new ParameterTable(board);
        var network = NetworkCompiler.Compile(board, table, board.Conditions[0]);
        var solver = new NetworkSolver(law);
        solver.Solve(network, NominalValues(table));
        var result = new Dictionary<string, double>();
        foreach (var node in board.Nodes)
        {
            var i = network.IndexOf(node);
            result[node] = i < 0 ? 0 : solver.Unknowns[i];
        }

        return result;
    }

    public static double[] NominalValues(ParameterTable table) => [.. table.Entries.Select(e => e.Nominal.Value)];

    private static Transistor Bipolar(PartKind kind, string name, string collector, string @base, string emitter, Nominal gain, double drop) =>
        new(kind, name, [collector, @base, emitter], gain, Nominal.Exactly(drop), Nominal.Exactly(0.2));
}
