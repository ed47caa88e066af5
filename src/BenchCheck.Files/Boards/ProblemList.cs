using System.Collections.Immutable;
using BenchCheck.Core.Quantities;

namespace BenchCheck.Files;

/// <summary>The problems of one file while it is being read.</summary>
internal sealed class ProblemList(string file)
{
    private readonly List<FileProblem> problems = [];

    public string File { get; } = file;

    public bool HasErrors => problems.Exists(p => p.IsError);

    public void Error(TomlPlace place, string read, string? expected = null, string? hint = null) =>
        problems.Add(new FileProblem(File, place.Line, place.Column, true, read, expected, hint));

    public void Error(TomlPlace place, string subject, TextFault fault) =>
        Error(place, $"{subject}: {fault.Read}", fault.Expected, fault.Hint);

    public void Warning(TomlPlace place, string read, string? expected = null, string? hint = null) =>
        problems.Add(new FileProblem(File, place.Line, place.Column, false, read, expected, hint));

    public ImmutableArray<FileProblem> InOrder() => [.. problems.Distinct().OrderBy(p => p.Line).ThenBy(p => p.Column)];
}
