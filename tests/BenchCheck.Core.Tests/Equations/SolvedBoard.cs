using BenchCheck.Core.Boards;
using BenchCheck.Core.Equations;

namespace BenchCheck.Core.Tests.Equations;

/// <summary>A board solved at its nominal values, some of them exchanged.</summary>
internal sealed class SolvedBoard
{
    private readonly double[] theta;

    private readonly Ammeter? inserted;

    public SolvedBoard(Board board, JunctionLaw law = JunctionLaw.ConstantDrop, Condition? condition = null, Ammeter? ammeter = null)
    {
        Board = board;
        Table = new ParameterTable(board);
        inserted = ammeter;
        Network = NetworkCompiler.Compile(board, Table, condition ?? board.Conditions[0], ammeter is null ? [] : [ammeter]);
        Solver = new NetworkSolver(law);
        theta = BoardSketch.NominalValues(Table);
        Solver.Solve(Network, theta);
    }

    public Board Board { get; }

    public ParameterTable Table { get; }

    public Network Network { get; }

    public NetworkSolver Solver { get; }

    public ReadOnlySpan<double> Theta => theta;

    public OperatingPoint Point => OperatingPoint.Of(Network, Solver, theta);

    public double AmmeterAmperes => Solver.Unknowns[Network.RowOf(inserted!)];

    public double Volts(string node, string against = "0") => At(node) - At(against);

    /// <summary>What a voltmeter of this resistance shows.</summary>
    public double Read(string node, double inputOhms, string against = "0") =>
        Solver.Read(new Measurement(Network.IndexOf(node), Network.IndexOf(against), 1 / inputOhms), []);

    /// <summary>What an ohmmeter of this test current shows.</summary>
    public double Ohms(string node, string against = "0", double testAmperes = 1e-6) =>
        Solver.Read(new Measurement(Network.IndexOf(node), Network.IndexOf(against), 0, testAmperes), []);

    /// <summary>The same board solved anew with one of its numbers exchanged; starts from the state it is in.</summary>
    public SolvedBoard With(string designator, ParameterKind kind, double value)
    {
        var index = Table.Entries.Select((e, i) => (e, i)).First(x => x.e.Part.Designator == designator && x.e.Kind == kind).i;
        theta[index] = value;
        Solver.Solve(Network, theta, Solver.PortCurrents.ToArray());
        return this;
    }

    private double At(string node) => Network.IndexOf(node) is >= 0 and var i ? Solver.Unknowns[i] : 0;
}
