using System.Collections.Immutable;
using BenchCheck.Core.Metering;
using BenchCheck.Files;

namespace BenchCheck.Commands.Batch;

/// <summary>The readings of a batch: files, and folders of files, one after the other; each file is surveyed first and then streamed.</summary>
internal sealed class BatchSource
{
    private readonly ImmutableArray<(string Path, ReadingsFileResult Result)> files;

    private BatchSource(ImmutableArray<(string, ReadingsFileResult)> files, int unusable, bool hasBadRows) => (this.files, Unusable, HasBadRows) = (files, unusable, hasBadRows);

    /// <summary>Files that hold nothing that can be used.</summary>
    public int Unusable { get; }

    /// <summary>Some row was left out.</summary>
    public bool HasBadRows { get; }

    public int BoardCount => files.Sum(f => f.Result.BoardCount);

    /// <summary>Every board in the order of the files; one without a serial takes the name of its file.</summary>
    public IEnumerable<ReadingSet> Boards =>
        files.SelectMany(f => f.Result.Sets.Select(s => s.Serial is null && files.Length > 1 ? s with { Serial = Path.GetFileNameWithoutExtension(f.Path) } : s));

    /// <param name="names">files and folders; of a folder the files *.csv, in the order of their names</param>
    /// <param name="say">hears of everything that is wrong with them</param>
    /// <exception cref="IOException">a folder cannot be read</exception>
    public static BatchSource Open(IEnumerable<string> names, Bench bench, Action<string> say)
    {
        var files = ImmutableArray.CreateBuilder<(string, ReadingsFileResult)>();
        var (unusable, hasBadRows) = (0, false);
        foreach (var path in names.SelectMany(Expand))
        {
            var result = ReadingsFile.Read(path, bench, new ReadingsOptions { SkipBadRows = true });
            foreach (var problem in result.Problems) say(problem.ToString());
            hasBadRows |= result.Problems.Any(p => p.Read.StartsWith("row left out", StringComparison.Ordinal));
            if (result.IsUsable) files.Add((path, result));
            else unusable++;
        }

        return new BatchSource(files.ToImmutable(), unusable, hasBadRows);
    }

    private static IEnumerable<string> Expand(string name) =>
        Directory.Exists(name) ? Directory.EnumerateFiles(name, "*.csv").Order(StringComparer.Ordinal) : [name];
}
