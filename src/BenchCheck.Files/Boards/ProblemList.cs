using System.Collections.Immutable;
using BenchCheck.Core.Quantities;

namespace BenchCheck.Files;

/// <summary>The problems of one file while it is being read.</summary>
internal sealed class ProblemList(string file)
{
    private const int MostListed = 200;

    private readonly List<FileProblem> problems = [];

    public string File { get; } = file;

    public bool HasErrors => problems.Exists(p => p.IsError);

    public void Error(TomlPlace place, string read, string? expected = null, string? hint = null) =>
        problems.Add(new FileProblem(File, place.Line, place.Column, true, read, expected, hint));

    public void Error(TomlPlace place, string subject, TextFault fault) =>
        Error(place, $"{subject}: {fault.Read}", fault.Expected, fault.Hint);

    public void Warning(TomlPlace place, string read, string? expected = null, string? hint = null) =>
        problems.Add(new FileProblem(File, place.Line, place.Column, false, read, expected, hint));

    /// <summary>By line and column; a very long list ends with the number of those left out.</summary>
    public ImmutableArray<FileProblem> InOrder()
    {
        var all = problems.Distinct().OrderBy(p => p.Line).ThenBy(p => p.Column).ToList();
        return all.Count <= MostListed
            ? [.. all]
            : [.. all.Take(MostListed), new FileProblem(File, 0, 0, HasErrors, $"{all.Count - MostListed} more problems", null, "put the first ones right")];
    }
}
