using System.Numerics;
using BenchCheck.Core.Boards;
using MathNet.Numerics.LinearAlgebra;
using Row = MathNet.Numerics.LinearAlgebra.Vector<System.Numerics.Complex>;

namespace BenchCheck.Core.Tests.Equations;

/// <summary>
/// Solves a linear board by loop currents: spanning tree, one fundamental loop a link, Kirchhoff's voltage law round each. Stamped from the parts, with
/// nothing in common with nodal equations (Desoer and Kuh, Basic Circuit Theory (1969), chapters 10 and 11, from memory).
/// </summary>
/// <remarks>
/// Unknowns: the loop currents J, then one control quantity c a controlled source. The current of branch b, into its first pin, is Σ B[l, b] J_l; current
/// sources are links, whose loop current is given. A branch that is no current source has v = E + R i + g c.
/// </remarks>
internal sealed class LoopEquations
{
    private readonly Part[] parts;
    private readonly string reference;
    private readonly double angular;
    private readonly Dictionary<string, (string Parent, int Branch)> tree = [];
    private readonly List<int> links = [];
    private readonly Dictionary<string, int> controlled = [];
    private readonly int[][] loop;

    private LoopEquations(Board board, Random order, double angular)
    {
        parts = [.. board.Parts];
        this.angular = angular;
        reference = board.Reference;
        GrowTree(order);
        foreach (var part in parts.OfType<ControlledSource>()) controlled[part.Designator] = controlled.Count;
        loop = [.. links.Select(Loop)];
    }

    /// <summary>Node voltages at rest; null when the equations are singular.</summary>
    /// <param name="order">decides the tree</param>
    public static Dictionary<string, double>? Volts(Board board, Random order) => Phasors(board, order, 0)?.ToDictionary(v => v.Key, v => v.Value.Real);

    /// <summary>Node voltages at a frequency, every supply and current source giving its value as amplitude and zero phase; null when the equations are singular.</summary>
    /// <param name="angular">radians a second</param>
    public static Dictionary<string, Complex>? Phasors(Board board, Random order, double angular) => new LoopEquations(board, order, angular).Solve();

    private static bool GivesCurrent(Part part) => part is CurrentSource
        || (part is ControlledSource c && (ReferenceEquals(c.Kind, ControlledSource.CurrentByVoltage) || ReferenceEquals(c.Kind, ControlledSource.CurrentByCurrent)));

    private void GrowTree(Random order)
    {
        int[] shuffled = [.. Enumerable.Range(0, parts.Length).OrderBy(_ => order.Next())];
        tree[reference] = (reference, -1);
        for (var grew = true; grew;)
        {
            grew = false;
            foreach (var b in shuffled.Where(b => !GivesCurrent(parts[b])))
            {
                var (from, to) = (parts[b].Nodes[0], parts[b].Nodes[1]);
                if (tree.ContainsKey(from) == tree.ContainsKey(to)) continue;
                if (tree.ContainsKey(from)) tree[to] = (from, b);
                else tree[from] = (to, b);
                grew = true;
            }
        }

        var inTree = tree.Values.Select(t => t.Branch).ToHashSet();
        links.AddRange(Enumerable.Range(0, parts.Length).Where(b => !inTree.Contains(b)));
    }

    /// <summary>+1, −1 or 0 for each branch: how the path in the tree from a node to the reference runs through it.</summary>
    private int[] PathToReference(string node)
    {
        var path = new int[parts.Length];
        for (; tree[node].Branch >= 0; node = tree[node].Parent)
            path[tree[node].Branch] = parts[tree[node].Branch].Nodes[0] == node ? 1 : -1;
        return path;
    }

    /// <summary>The path in the tree from one node to another: v(from) − v(to) is the sum of its branch voltages.</summary>
    private int[] Path(string from, string to)
    {
        var (a, b) = (PathToReference(from), PathToReference(to));
        return [.. a.Select((x, i) => x - b[i])];
    }

    private int[] Loop(int link)
    {
        var path = Path(parts[link].Nodes[1], parts[link].Nodes[0]);
        path[link] += 1;
        return path;
    }

    /// <summary>Current of a branch as a row over the unknowns.</summary>
    private Row Current(int branch)
    {
        var row = Row.Build.Dense(links.Count + controlled.Count);
        for (var l = 0; l < links.Count; l++) row[l] = loop[l][branch];
        return row;
    }

    /// <summary>Voltage of a branch that is no current source: a row over the unknowns and a constant.</summary>
    private (Row Row, Complex Constant) Voltage(int branch)
    {
        switch (parts[branch])
        {
            case Resistor r: return (Current(branch) * r.Ohms.Value, 0);
            case Inductor l: return (Current(branch) * new Complex(l.WindingOhms.Value, angular * l.Henries.Value), 0);
            case Capacitor c: return (Current(branch) * new Complex(0, -1 / (angular * c.Farads.Value)), 0);
            case Supply s: return (Current(branch) * (s.SourceOhms?.Value ?? 0), s.Volts.Value);
            case ControlledSource e:
                var row = Row.Build.Dense(links.Count + controlled.Count);
                row[links.Count + controlled[e.Designator]] = e.Gain.Value;
                return (row, 0);
            default: throw new NotSupportedException(parts[branch].Kind.Name);
        }
    }

    private (Row Row, Complex Constant) Along(int[] path)
    {
        var (row, constant) = (Row.Build.Dense(links.Count + controlled.Count), Complex.Zero);
        for (var b = 0; b < parts.Length; b++)
        {
            if (path[b] == 0) continue;
            var (r, c) = Voltage(b);
            row += path[b] * r;
            constant += path[b] * c;
        }

        return (row, constant);
    }

    private Dictionary<string, Complex>? Solve()
    {
        var size = links.Count + controlled.Count;
        var matrix = Matrix<Complex>.Build.Dense(size, size);
        var right = Row.Build.Dense(size);
        for (var l = 0; l < links.Count; l++)
        {
            // A current source's pin "plus" gives its current to the board, so the branch current into it is minus that.
            if (parts[links[l]] is CurrentSource given)
            {
                matrix[l, l] = 1;
                right[l] = -given.Amperes.Value;
            }
            else if (parts[links[l]] is ControlledSource source && GivesCurrent(source))
            {
                matrix[l, l] = 1;
                matrix[l, links.Count + controlled[source.Designator]] = source.Gain.Value;
            }
            else
            {
                var (row, constant) = Along(loop[l]);
                matrix.SetRow(l, row);
                right[l] = -constant;
            }
        }

        foreach (var source in parts.OfType<ControlledSource>())
        {
            var k = links.Count + controlled[source.Designator];
            var (row, constant) = source.Control switch
            {
                Control.NodePair pair => Along(Path(pair.Plus, pair.Minus)),
                Control.PartCurrent part => (Current(Array.FindIndex(parts, p => p.Designator == part.Designator)), 0),
                _ => throw new NotSupportedException(),
            };
            matrix.SetRow(k, -row);
            matrix[k, k] += 1;
            right[k] = constant;
        }

        var solution = matrix.Solve(right);
        if (solution.Any(x => !Complex.IsFinite(x))) return null;
        return tree.Keys.ToDictionary(node => node, node =>
        {
            var (row, constant) = Along(PathToReference(node));
            return row * solution + constant;
        });
    }
}
