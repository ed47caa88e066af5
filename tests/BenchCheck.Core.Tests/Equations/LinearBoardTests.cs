using BenchCheck.Core.Boards;
using BenchCheck.Core.Equations;
using BenchCheck.Core.Quantities;
using CsCheck;
using Xunit;

namespace BenchCheck.Core.Tests.Equations;

/// <summary>The nodal equations of linear boards against loop equations and the theorems of networks.</summary>
public class LinearBoardTests
{
    private const int Seeds = 3000;

    [Fact]
    public void Node_voltages_agree_with_independently_stamped_loop_equations()
    {
        var skipped = 0;
        for (var seed = 0; seed < Seeds; seed++)
        {
            var board = LinearBoards.WithControlledSources(seed);
            var expected = LoopEquations.Volts(board, new Random(1));
            var again = LoopEquations.Volts(board, new Random(2));
            var size = Math.Max(1, expected?.Values.Max(Math.Abs) ?? 0);
            if (expected is null || again is null || expected.Any(v => !(Math.Abs(v.Value - again[v.Key]) <= 1e-10 * size)))
            {
                // Controlled sources can make a board singular, or nearly so: then two trees do not agree either.
                skipped++;
                continue;
            }

            var solved = new SolvedBoard(board);
            foreach (var (node, volts) in expected)
                Assert.True(Math.Abs(volts - solved.Volts(node)) <= 1e-9 * size, $"seed {seed}, node {node}: loops {volts}, nodes {solved.Volts(node)}, largest {size}");
        }

        Assert.InRange(skipped, 0, Seeds / 50);
    }

    /// <summary>Thévenin, C. R. Acad. Sci. 97 (1883): v R / (R + R_th), with controlled sources too.</summary>
    [Fact]
    public void A_load_meets_the_open_voltage_behind_the_resistance_looking_in()
    {
        for (var seed = 0; seed < 500; seed++)
        {
            var (board, random) = (LinearBoards.WithControlledSources(seed), new Random(seed));
            var (node, ohms) = (board.Nodes[random.Next(1, board.Nodes.Length)], Math.Pow(10, 1 + 5 * random.NextDouble()));
            var open = new SolvedBoard(board);
            var (volts, thevenin) = (open.Volts(node), open.Point.TheveninOhms(node));

            // A negative resistance near that of the load would make any error large.
            if (Math.Abs(ohms + thevenin) < 0.1 * ohms) continue;
            var loaded = new SolvedBoard(board.With([], [new Resistor("RL", [node, "0"], Nominal.Exactly(ohms))])).Volts(node);
            var size = 1 + board.Nodes.Max(n => Math.Abs(open.Volts(n)));
            Assert.True(Math.Abs(volts * ohms / (ohms + thevenin) - loaded) <= 1e-7 * size, $"seed {seed}, {node}: {loaded} V, {volts} V behind {thevenin} Ω");
        }
    }

    /// <summary>Tellegen, Philips Res. Rep. 7 (1952): voltages of one board times currents of another with the same connections sum to zero.</summary>
    [Fact]
    public void Voltages_of_one_board_and_currents_of_another_with_the_same_connections_are_orthogonal() =>
        Gen.Int[0, 1_000_000].Sample(seed =>
        {
            var board = LinearBoards.WithSources(seed);
            var random = new Random(seed);
            var other = board.With(
                board.Parts.Select(p => p is Resistor r ? r with { Ohms = Nominal.Exactly(r.Ohms.Value * Math.Exp(random.NextDouble() - 0.5)) } : p), []);
            var (volts, currents) = (new SolvedBoard(board), BranchCurrents(new SolvedBoard(other)));
            var terms = board.Parts.Select(p => volts.Volts(p.Nodes[0], p.Nodes[1]) * currents[p.Designator]).ToList();
            Assert.True(Math.Abs(terms.Sum()) <= 1e-9 * terms.Sum(Math.Abs), $"seed {seed}: {terms.Sum()} W of {terms.Sum(Math.Abs)} W");
        }, iter: 500);

    /// <summary>Power balance on a thousand boards with transistors, diodes and open joints; a dead short across a supply makes smoke, not readings.</summary>
    [Fact]
    public void Heat_in_every_part_is_what_the_supplies_deliver()
    {
        var compared = 0;
        for (var seed = 0; seed < 1000; seed++)
        {
            var board = RandomBoards.Passive(seed);
            var point = new SolvedBoard(board, JunctionLaw.Exponential).Point;
            var current = point.Currents().ToDictionary(c => c.At, c => c.Amperes);
            var heat = board.Parts.Sum(point.Watts);
            var delivered = board.Parts.OfType<Supply>().Sum(s => -(point.Volts(s.Nodes[0]) - point.Volts(s.Nodes[1])) * current[s.Designator]);
            var size = board.Parts.Sum(p => Math.Abs(point.Watts(p)));
            if (size > 10) continue;
            compared++;

            // An island's leakage takes its share.
            var leaked = 1e-11 * board.Nodes.Sum(n => 4 * point.Volts(n) * point.Volts(n));
            Assert.True(Math.Abs(heat - delivered) <= 1e-5 * size + leaked, $"seed {seed}: {heat} W of heat, {delivered} W delivered");
        }

        Assert.True(compared > 400, $"only {compared} boards compared");
    }

    /// <summary>Reciprocity of networks without sources (Desoer and Kuh, Basic Circuit Theory (1969), 16.4, from memory).</summary>
    [Fact]
    public void A_current_here_and_a_voltage_there_exchange_places_in_resistor_networks() =>
        Gen.Select(Gen.Int[0, 1_000_000], Gen.Int[0, 99], Gen.Int[0, 99], Gen.Int[0, 99], Gen.Int[0, 99]).Sample((seed, a, b, c, d) =>
        {
            var board = LinearBoards.Resistors(seed);
            string Node(int i) => board.Nodes[i % board.Nodes.Length];
            double Transfer(string into, string outOf, string high, string low) =>
                into == outOf ? 0 : new SolvedBoard(board.With([], [new CurrentSource("I", [into, outOf], Nominal.Exactly(1e-3))])).Volts(high, low);
            var forward = Transfer(Node(a), Node(b), Node(c), Node(d));
            var backward = Transfer(Node(c), Node(d), Node(a), Node(b));
            var size = Math.Abs(Transfer(Node(a), Node(b), Node(a), Node(b))) + Math.Abs(Transfer(Node(c), Node(d), Node(c), Node(d)));
            Assert.True(Math.Abs(forward - backward) <= 1e-9 * (1 + size), $"seed {seed}: {forward} V, {backward} V");
        }, iter: 500);

    [Fact]
    public void Sources_together_make_the_sum_of_what_each_makes_alone() =>
        Gen.Int[0, 1_000_000].Sample(seed =>
        {
            var board = LinearBoards.WithControlledSources(seed);
            var table = new ParameterTable(board);
            var network = NetworkCompiler.Compile(board, table, board.Conditions[0]);
            var solver = new NetworkSolver(JunctionLaw.ConstantDrop);
            var all = BoardSketch.NominalValues(table);
            int[] sources = [.. Enumerable.Range(0, table.Count).Where(i => table.Entries[i].Kind == ParameterKind.Voltage || table.Entries[i].Kind == ParameterKind.Current)];
            double[] Solve(double[] theta)
            {
                solver.Solve(network, theta);
                return solver.Unknowns[..network.NodeCount].ToArray();
            }

            try
            {
                var together = Solve(all);
                var sum = new double[together.Length];
                var size = together.Max(Math.Abs);
                foreach (var source in sources)
                {
                    var alone = (double[])all.Clone();
                    foreach (var other in sources.Where(s => s != source)) alone[other] = 0;
                    var part = Solve(alone);
                    for (var i = 0; i < sum.Length; i++) sum[i] += part[i];
                    size += part.Max(Math.Abs);
                }

                for (var i = 0; i < sum.Length; i++) Assert.True(Math.Abs(sum[i] - together[i]) <= 1e-9 * (1 + size), $"seed {seed}: {sum[i]} V, {together[i]} V");
            }
            catch (NoOperatingStateException)
            {
                // singular by its controlled sources
            }
        }, iter: 500);

    /// <summary>Current into the first pin of every part of a board without controlled sources.</summary>
    private static Dictionary<string, double> BranchCurrents(SolvedBoard solved)
    {
        var currents = solved.Point.Currents().ToDictionary(c => c.At, c => c.Amperes);
        foreach (var source in solved.Board.Parts.OfType<CurrentSource>()) currents[source.Designator] = -source.Amperes.Value;
        return currents;
    }
}
