namespace BenchCheck.Core.Boards;

/// <summary>Nodes grouped by what ties them together (union-find), each with an offset in volts against its group's root where one is known.</summary>
internal sealed class NodeGroups
{
    private readonly Dictionary<string, (string Parent, double Volts)> links = new(StringComparer.Ordinal);

    public NodeGroups(IEnumerable<string> nodes)
    {
        foreach (var node in nodes) links[node] = (node, 0);
    }

    public bool AreTied(string a, string b) => Root(a).Node == Root(b).Node;

    /// <summary>v(a) − v(b) as the ties so far fix it; meaningful for tied nodes only.</summary>
    public double VoltsBetween(string a, string b) => Root(a).Volts - Root(b).Volts;

    /// <summary>Ties a and b with v(a) − v(b) = <paramref name="volts"/>; nodes tied already stay as they are.</summary>
    public void Tie(string a, string b, double volts = 0)
    {
        var (rootA, voltsA) = Root(a);
        var (rootB, voltsB) = Root(b);
        if (rootA != rootB) links[rootA] = (rootB, volts + voltsB - voltsA);
    }

    public void TieAll(IReadOnlyList<string> nodes)
    {
        for (var i = 1; i < nodes.Count; i++) Tie(nodes[0], nodes[i]);
    }

    private (string Node, double Volts) Root(string node)
    {
        var (root, volts) = (node, 0.0);
        while (links[root] is var link && link.Parent != root)
        {
            volts += link.Volts;
            root = link.Parent;
        }

        // The next search from this node is then one step long.
        if (root != node) links[node] = (root, volts);
        return (root, volts);
    }
}
