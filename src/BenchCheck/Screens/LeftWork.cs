using BenchCheck.Core.Metering;
using BenchCheck.Files;

namespace BenchCheck.Screens;

/// <summary>What an earlier run of the screen left unsaved when it ended.</summary>
/// <param name="Board">a changed board; null when only readings were left</param>
/// <param name="Readings">null when only the board was changed</param>
/// <param name="Bench">the board on which these readings were taken</param>
internal sealed record LeftWork(BoardLeft? Board, JournalContent? Readings, Bench Bench)
{
    /// <summary>Null when nothing was left, or another screen is still at work on the readings.</summary>
    public static LeftWork? Find(string boardPath, ReadingsDocument document, Bench bench)
    {
        if (!document.IsOurs) return null;
        var left = BoardDocument.Left(boardPath);
        if (left is not null && BoardFile.Parse(left.Text.Text, boardPath).Bench is { } changed) bench = changed;
        else left = null;
        var readings = ReadingsJournal.Read(document.Path, bench);
        return left is null && readings is null ? null : new LeftWork(left, readings, bench);
    }
}
