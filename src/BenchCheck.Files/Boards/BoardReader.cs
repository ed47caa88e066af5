using System.Collections.Immutable;
using BenchCheck.Core.Boards;
using BenchCheck.Core.Metering;
using BenchCheck.Core.Quantities;

namespace BenchCheck.Files;

/// <summary>Puts the sections of one board file together: parts, conditions, meters, layout.</summary>
internal sealed class BoardReader(ProblemList problems)
{
    private readonly Assumptions assumptions = new();
    private readonly Dictionary<string, Part> parts = new(StringComparer.Ordinal);
    private readonly Dictionary<string, TomlPlace> places = new(StringComparer.Ordinal);
    private readonly HashSet<string> broken = new(StringComparer.Ordinal);

    public BoardFileResult Read(string text)
    {
        var root = TomlDocument.Read(text, problems, broken);
        var top = new TableReader(root, "the board file", problems);
        var title = ReadTitle(top);
        var origin = ReadOrigin(top);
        var celsius = top.TakeNumber("temperature", Unit.Celsius, Limits.Celsius);
        ReadParts(top.TakeTable("parts"));
        var reference = ReadReference(top);
        CheckControls();
        var adjacent = ReadAdjacent(top);
        var conditions = top.TakeTable("conditions") is { } table ? new ConditionReader(parts, broken, reference, problems).Read(table) : [];
        var meters = ReadMeters(top.TakeTable("meters"));
        top.Finish();
        if (problems.HasErrors) return new BoardFileResult(null, problems.InOrder());
        var board = new Board(title, reference, origin, [.. parts.Values], conditions, adjacent);
        if (celsius is { } stated) board = new Board(title, reference, origin, board.Parts, conditions, adjacent) { Celsius = stated };
        CheckStructure(board);
        CheckSimilarNames(board);
        return new BoardFileResult(problems.HasErrors ? null : new Bench(board, meters, assumptions.Sentences()), problems.InOrder());
    }

    private string ReadTitle(TableReader top)
    {
        if (top.TakeText("title") is { } title && !string.IsNullOrWhiteSpace(title.Text)) return title.Text.Trim();
        var name = Path.GetFileNameWithoutExtension(problems.File);
        return name.Length > 0 ? name : "untitled board";
    }

    private BoardOrigin ReadOrigin(TableReader top)
    {
        if (top.TakeText("origin") is not { } origin)
        {
            assumptions.Add("", "No origin of the board stated: new build taken, which decides the faults that are likelier.");
            return BoardOrigin.NewBuild;
        }

        if (origin.Text is not ("new build" or "service"))
            problems.Error(origin.Place, $"origin {TextFault.Quote(origin.Text)}", "\"new build\" or \"service\"", NearMiss.Suggest(origin.Text, ["new build", "service"]));
        return origin.Text == "service" ? BoardOrigin.Service : BoardOrigin.NewBuild;
    }

    private void ReadParts(TomlTable? table)
    {
        if (table is null || table.Entries.Count == 0)
        {
            if (broken.Count == 0) problems.Error(table?.Place ?? default, "no parts", "a section [parts] with one line a part");
            return;
        }

        if (table.Entries.Count > BoardFile.MostParts)
        {
            problems.Error(table.Place, $"{table.Entries.Count} parts", $"a board of at most {BoardFile.MostParts} parts");
            broken.Add("");
            return;
        }

        foreach (var entry in table.Entries)
        {
            places[entry.Key] = entry.Place;
            if (PartReader.Read(entry, problems, assumptions) is { } part) parts[entry.Key] = part;
            else broken.Add(entry.Key);
        }
    }

    private IEnumerable<string> Nodes() => parts.Values.SelectMany(p => p.Nodes).Distinct(StringComparer.Ordinal);

    private string ReadReference(TableReader top)
    {
        const string usual = "GND";
        if (top.TakeText("reference") is not { } reference)
        {
            if (top.Take("reference") is not null) return usual;
            if (Nodes().Contains(usual)) assumptions.Add("", "No reference node stated: GND taken.");
            else if (broken.Count == 0) problems.Error(default, "no reference node", "reference = \"…\", the node that every voltage is counted against", $"one of {NearMiss.List(Nodes())}");
            return usual;
        }

        // A part that could not be read may be the one that touches the reference.
        if (!Nodes().Contains(reference.Text) && broken.Count == 0)
            problems.Error(reference.Place, $"reference {TextFault.Quote(reference.Text)}: no part touches that node", NearMiss.List(Nodes()), NearMiss.Suggest(reference.Text, Nodes()));
        return reference.Text;
    }

    private void CheckControls()
    {
        foreach (var source in parts.Values.OfType<ControlledSource>())
        {
            switch (source.Control)
            {
                case Control.PartCurrent current when !broken.Contains(current.Designator):
                    if (!parts.ContainsKey(current.Designator) || current.Designator == source.Designator)
                        problems.Error(places[source.Designator], $"{source.Designator}: control {TextFault.Quote(current.Designator)}",
                            "the name of another part", NearMiss.Suggest(current.Designator, parts.Keys));
                    break;
                case Control.NodePair pair when broken.Count == 0:
                    foreach (var node in new[] { pair.Plus, pair.Minus }.Except(Nodes(), StringComparer.Ordinal))
                        UnknownNode(places[source.Designator], $"{source.Designator}: control", node);
                    break;
            }
        }
    }

    private void UnknownNode(TomlPlace place, string subject, string node) =>
        problems.Error(place, $"{subject}: no node {TextFault.Quote(node)} on the board", NearMiss.List(Nodes()), NearMiss.Suggest(node, Nodes()));

    private ImmutableArray<ImmutableArray<string>> ReadAdjacent(TableReader top)
    {
        if (top.Take("adjacent") is not { } entry) return [];
        if (entry.Value is not TomlList list || !list.Items.All(i => i is TomlList { Items.Count: >= 2 } group && group.Items.All(n => n is TomlText)))
        {
            problems.Error(entry.Value.Place, $"adjacent is {entry.Value.Describe}", "groups of two or more nodes: adjacent = [[\"C1\", \"B1\"], [\"E1\", \"GND\"]]");
            return [];
        }

        foreach (var node in list.Items.Cast<TomlList>().SelectMany(g => g.Items).Cast<TomlText>().Where(n => broken.Count == 0 && !Nodes().Contains(n.Text)))
            UnknownNode(node.Place, "adjacent", node.Text);
        return [.. list.Items.Cast<TomlList>().Select(g => g.Items.Cast<TomlText>().Select(n => n.Text).Distinct().ToImmutableArray())];
    }

    private ImmutableArray<Meter> ReadMeters(TomlTable? table)
    {
        if (table is { Entries.Count: > 0 }) return new MeterReader(problems, assumptions).Read(table);
        assumptions.Add("", "No meter described: a hand-held of 6000 counts and 10 MΩ taken, 0.5 % + 2 counts in volts, 1 % + 3 counts in amperes, 0.8 % + 2 counts in ohms.");
        return [Meter.Usual];
    }

    private void CheckStructure(Board board)
    {
        foreach (var problem in BoardStructure.Problems(board))
        {
            var owner = problem.Part ?? board.Parts.FirstOrDefault(p => p.Nodes.Contains(problem.Node ?? ""))?.Designator;
            var place = owner is not null && places.TryGetValue(owner, out var there) ? there : default;
            if (problem.IsError) problems.Error(place, problem.Message);
            else problems.Warning(place, problem.Message);
        }
    }

    private void CheckSimilarNames(Board board)
    {
        foreach (var group in board.Nodes.GroupBy(n => n, StringComparer.OrdinalIgnoreCase).Where(g => g.Count() > 1))
        {
            var second = group.Skip(1).First();
            problems.Warning(places[board.Parts.First(p => p.Nodes.Contains(second)).Designator],
                $"nodes {string.Join(" and ", group)} differ only in capitals", "one spelling of each node", "they are taken as different nodes");
        }
    }
}
