using System.Collections.Immutable;
using BenchCheck.Core.Metering;

namespace BenchCheck.Files;

/// <summary>What came of reading a readings file: the boards' readings, or the reasons why there are none.</summary>
/// <remarks>
/// <see cref="Sets"/> reads the file anew, one board after the other, so that memory stays flat however long the file is. A board whose rows
/// are scattered over the file is held until its last row; boards come in the order of their last rows.
/// </remarks>
public sealed class ReadingsFileResult
{
    internal ReadingsFileResult(ImmutableArray<FileProblem> problems, int boardCount, IEnumerable<ReadingSet> sets)
    {
        Problems = problems;
        IsUsable = !problems.Any(p => p.IsError);
        BoardCount = IsUsable ? boardCount : 0;
        Sets = IsUsable ? sets : [];
    }

    /// <summary>Every error and warning, in the order of the lines; very many of one kind are cut off with their count.</summary>
    public ImmutableArray<FileProblem> Problems { get; }

    /// <summary>False when <see cref="Problems"/> holds an error; <see cref="Sets"/> is then empty.</summary>
    public bool IsUsable { get; }

    /// <summary>How many boards <see cref="Sets"/> gives.</summary>
    public int BoardCount { get; }

    /// <summary>The readings of each board.</summary>
    /// <exception cref="IOException">while enumerating: the file was changed or taken away since it was checked</exception>
    public IEnumerable<ReadingSet> Sets { get; }
}
