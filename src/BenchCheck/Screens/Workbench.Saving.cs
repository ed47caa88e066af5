using System.Collections.Immutable;
using BenchCheck.Core.Metering;
using BenchCheck.Files;

namespace BenchCheck.Screens;

/// <content>The files on disk: saving, and what others did to them meanwhile.</content>
internal sealed partial class Workbench
{
    private FileFingerprint boardSeen;

    /// <summary>Looks whether another program changed the board file; takes it over when nothing was changed here. A sentence when there is news.</summary>
    public string? FollowBoard()
    {
        try
        {
            var now = FileFingerprint.Of(BoardPath);
            if (!board.HasChangedOnDisk() || now == boardSeen) return null;
            boardSeen = now;
        }
        catch (Exception failure) when (IsFileFailure(failure))
        {
            return null;
        }

        if (Session.IsBoardDirty) return "The board file was changed by another program: Ctrl+S asks what to do.";
        return RereadBoard() is { } refused
            ? $"The board file was changed by another program; the board here stays as it was: {refused}"
            : "The board file was changed by another program and taken over; Ctrl+U goes back.";
    }

    /// <summary>Takes the board file as it is on disk now, as a change that can be undone. Null, or why the board here stays as it is.</summary>
    public string? RereadBoard()
    {
        try
        {
            return board.Reread(text =>
            {
                var next = WithBoard(Session, text);
                if (next.Fault is { } fault) return Sentence(fault);
                Session = next.Value.SavedBoard(text);
                Check();
                return null;
            });
        }
        catch (Exception failure) when (IsFileFailure(failure))
        {
            return failure.Message;
        }
    }

    /// <summary>Writes the board as it is here to a file that does not exist yet, and leaves the one it came from alone. Null, or why not.</summary>
    public string? WriteBoardCopy(string path)
    {
        try
        {
            board.WriteCopy(Session.Board, path);
            return null;
        }
        catch (Exception failure) when (IsFileFailure(failure) || failure is ArgumentException)
        {
            return failure.Message;
        }
    }

    /// <summary>Saves what is not in its file: parts into the board file, readings into the readings file.</summary>
    /// <exception cref="IOException">a file cannot be written; entries stay in the journal</exception>
    /// <exception cref="UnauthorizedAccessException">no permission</exception>
    public (SaveOutcome Outcome, bool IsOfBoard) Save()
    {
        if (Session.IsBoardDirty)
        {
            var outcome = board.Save(Session.Board);
            if (outcome != SaveOutcome.Saved) return (outcome, true);
            Session = Session.SavedBoard(Session.Board);
        }

        if (Session.AreReadingsDirty || HasChangedOnDisk() || !File.Exists(ReadingsPath))
        {
            var outcome = document.Save(Session.Sets);
            if (outcome != SaveOutcome.Saved) return (outcome, false);
            Session = Session.SavedReadings();
        }

        Abandon();
        return (SaveOutcome.Saved, false);
    }

    /// <summary>Saves under another name, which must not exist, and goes on there. Null, or why not.</summary>
    public string? SaveAs(string path)
    {
        try
        {
            var full = Path.GetFullPath(path);
            if (File.Exists(full) || Directory.Exists(full)) return $"{full} exists already: choose another name.";
            var other = ReadingsDocument.Open(full, []);
            if (!other.IsOurs) return $"{full} cannot be written.";
            if (other.Save(Session.Sets) != SaveOutcome.Saved) return $"{full} was made by somebody else in this moment.";
            document.Abandon();
            document.Dispose();
            document = other;
            Session = Session.SavedReadings();
            return null;
        }
        catch (Exception failure) when (IsFileFailure(failure) || failure is ArgumentException)
        {
            return failure.Message;
        }
    }

    /// <summary>Brings the file's readings and ours together: both sides' changes kept, ours where both changed the same. A sentence that says what was done.</summary>
    public string Reconcile()
    {
        var read = ReadingsFile.Read(ReadingsPath, Session.Bench);
        if (!read.IsUsable && File.Exists(ReadingsPath)) return $"The file on disk cannot be read: {read.Problems.First(p => p.IsError)}";
        ImmutableArray<ReadingSet> theirs = [.. read.Sets.Take(MostBoards + 1)];
        var (sets, contested) = Merge(document.AsRead, Session.Sets, theirs);
        if (Enter((s, _) => s.Replace(sets)) is { } refused) return refused;
        document.Rebase(theirs);
        return contested.IsEmpty
            ? "Both brought together; save to put it on disk."
            : "Both brought together. Changed on both sides, yours kept; theirs were: "
                + string.Join(", ", contested.Select(r => $"{Place.Of(r, Session.Bench.Board).Name(Session.Bench.Board)} {Words.Number(r.Value, r.Quantity.Unit())}"));
    }
}
