using System.Collections.Immutable;
using BenchCheck.Core.Checking;
using BenchCheck.Core.Metering;
using BenchCheck.Core.Quantities;
using BenchCheck.Files;

namespace BenchCheck.Screens;

/// <summary>What came of opening a board: the workbench, or the problems in the way.</summary>
internal sealed record Opening(Workbench? Workbench, ImmutableArray<FileProblem> Problems)
{
    /// <summary>The board is usable and the readings file would be without its bad rows.</summary>
    public bool CanSkipRows { get; init; }
}

/// <summary>One board on the bench: its session, its files, its check in the background. Every effect of the screen but drawing is here.</summary>
/// <remarks>Used from one thread; <see cref="Reported"/> is raised on the background thread and its report handed back by <see cref="Take"/>.</remarks>
internal sealed class Workbench : IDisposable
{
    /// <summary>Most boards of one readings file that can be worked on here; more are a matter for a batch.</summary>
    public const int MostBoards = 50;

    private readonly TimeProvider clock;
    private CheckRunner? runner;
    private ReadingsDocument document;

    private Workbench(string boardPath, Bench bench, ReadingsDocument document, ImmutableArray<ReadingSet> sets, ImmutableArray<FileProblem> warnings, TimeProvider clock)
    {
        (BoardPath, this.document, Warnings, this.clock) = (boardPath, document, warnings, clock);
        Session = BenchSession.Begin(bench, sets);
        Left = document.IsOurs ? ReadingsJournal.Read(document.Path, bench) : null;
    }

    /// <summary>Raised on the background thread.</summary>
    public event Action<CheckReport>? Reported;

    public string BoardPath { get; }

    public string ReadingsPath => document.Path;

    public BenchSession Session { get; private set; }

    public ImmutableArray<FileProblem> Warnings { get; }

    /// <summary>Entries that an earlier run left unsaved; until they are taken or set aside nothing else is entered.</summary>
    public JournalContent? Left { get; private set; }

    /// <summary>False while another screen has the readings file: look, but do not enter.</summary>
    public bool IsOurs => document.IsOurs;

    public static Opening Open(string boardPath, string? readingsPath, bool skipBadRows, TimeProvider clock)
    {
        var board = BoardFile.Read(boardPath);
        if (board.Bench is not { } bench) return new Opening(null, board.Problems);
        var readings = Path.GetFullPath(readingsPath ?? Path.ChangeExtension(boardPath, ".csv"));
        ImmutableArray<ReadingSet> sets = [];
        var problems = board.Problems;
        if (File.Exists(readings) || readingsPath is not null && Directory.Exists(readings))
        {
            var read = ReadingsFile.Read(readings, bench, new ReadingsOptions { SkipBadRows = skipBadRows });
            problems = [.. problems, .. read.Problems];
            if (!read.IsUsable && new FileInfo(readings) is not { Exists: true, Length: 0 }) return new Opening(null, problems) { CanSkipRows = !skipBadRows };
            if (read.BoardCount > MostBoards)
            {
                var many = new FileProblem(readings, 0, 0, true, $"readings of {read.BoardCount} boards", $"at most {MostBoards} at the bench", "check them all with: benchcheck batch");
                return new Opening(null, [.. problems, many]);
            }

            sets = [.. read.Sets];
        }

        try
        {
            return new Opening(new Workbench(Path.GetFullPath(boardPath), bench, ReadingsDocument.Open(readings, sets), sets, problems, clock), problems);
        }
        catch (Exception failure) when (IsFileFailure(failure))
        {
            return new Opening(null, [.. problems, new FileProblem(readings, 0, 0, true, failure.Message)]);
        }
    }

    /// <summary>Starts checking; reports begin to come.</summary>
    public void Start()
    {
        runner = new CheckRunner(Session.Bench, CheckSettings.Default, r => Reported?.Invoke(r));
        runner.Post(Session.Version, Session.Readings);
    }

    /// <summary>Takes a report of the background; true when a complete check of the present readings came with it.</summary>
    public bool Take(CheckReport report)
    {
        Session = report switch
        {
            CheckReport.Predicted p => Session with { Prediction = p.Prediction },
            CheckReport.Checked c => Session.Checked(c.Version, c.Result, c.IsComplete),
            CheckReport.Failed f => Session.Failed(f.Version, f.Reason),
            _ => Session,
        };
        return report is CheckReport.Checked { IsComplete: true } done && done.Version == Session.Version;
    }

    /// <summary>A command that leaves the readings as they are: moving, sorting, choosing.</summary>
    public void Look(Func<BenchSession, BenchSession> command)
    {
        var before = Session.Version;
        Session = command(Session);
        if (Session.Version != before) runner?.Post(Session.Version, Session.Readings);
    }

    /// <summary>A command that changes the readings: on the disk first, then in the session. Null, or why it was refused.</summary>
    public string? Enter(Func<BenchSession, DateTimeOffset, Parsed<BenchSession>> command)
    {
        if (!IsOurs) return "Another screen has this readings file open: entries are made there. Save under another name to enter here.";
        var now = clock.GetLocalNow();
        var next = command(Session, now);
        if (next.Fault is { } fault) return Sentence(fault);
        if (next.Value.Version == Session.Version)
        {
            Session = next.Value;
            return null;
        }

        try
        {
            document.Record(next.Value.Sets, now);
        }
        catch (Exception failure) when (IsFileFailure(failure))
        {
            return $"Not entered, because it could not be written beside the readings file: {failure.Message}";
        }

        Session = next.Value;
        runner?.Post(Session.Version, Session.Readings);
        return null;
    }

    /// <summary>Takes over what an earlier run left; where the file has changed since, its other readings are kept.</summary>
    public string? TakeLeft()
    {
        if (Left is not { } left) return null;
        var isSameFile = left.Basis == FileFingerprint.Of(ReadingsPath);
        Left = null;
        return Enter((s, _) => s.Replace(isSameFile ? left.Sets : Merge([], left.Sets, s.Sets).Sets));
    }

    public void SetLeftAside()
    {
        ReadingsJournal.SetAside(ReadingsPath);
        Left = null;
    }

    public bool HasChangedOnDisk()
    {
        try
        {
            return document.HasChangedOnDisk();
        }
        catch (Exception failure) when (IsFileFailure(failure))
        {
            return true;
        }
    }

    /// <exception cref="IOException">the file cannot be written; entries stay in the journal</exception>
    /// <exception cref="UnauthorizedAccessException">no permission</exception>
    public SaveOutcome Save()
    {
        var outcome = document.Save(Session.Sets);
        if (outcome == SaveOutcome.Saved) Session = Session.Saved();
        return outcome;
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
            Session = Session.Saved();
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

    /// <summary>Drops the journal: the user leaves without saving.</summary>
    public void Abandon() => document.Abandon();

    public void Dispose()
    {
        runner?.Dispose();
        document.Dispose();
    }

    public static bool IsFileFailure(Exception failure) => failure is IOException or UnauthorizedAccessException or System.Security.SecurityException or NotSupportedException;

    public static string Sentence(TextFault fault)
    {
        var expected = string.IsNullOrEmpty(fault.Expected) ? "" : $"; expected {fault.Expected}";
        return fault.Read + expected + (fault.Hint is null ? "" : $" ({fault.Hint})");
    }

    private static (ImmutableArray<ReadingSet> Sets, ImmutableArray<Reading> Contested) Merge(
        ImmutableArray<ReadingSet> basis, ImmutableArray<ReadingSet> ours, ImmutableArray<ReadingSet> theirs)
    {
        var contested = ImmutableArray.CreateBuilder<Reading>();
        var sets = ImmutableArray.CreateBuilder<ReadingSet>();
        foreach (var serial in theirs.Concat(ours).Select(s => s.Serial).Distinct())
        {
            var merged = ReadingsMerge.Of(Of(basis), Of(ours), Of(theirs));
            contested.AddRange(merged.Contested);
            sets.Add(merged.Set);

            ReadingSet Of(ImmutableArray<ReadingSet> all) => all.FirstOrDefault(s => s.Serial == serial) ?? new ReadingSet(serial, []);
        }

        return (sets.ToImmutable(), contested.ToImmutable());
    }
}
