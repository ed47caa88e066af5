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
internal sealed partial class Workbench : IDisposable
{
    /// <summary>Most boards of one readings file that can be worked on here; more are a matter for a batch.</summary>
    public const int MostBoards = 50;

    private readonly TimeProvider clock;
    private CheckRunner? runner;
    private readonly BoardDocument board;
    private ReadingsDocument document;

    private Workbench(BoardDocument board, Bench bench, ReadingsDocument document, ImmutableArray<ReadingSet> sets, ImmutableArray<FileProblem> warnings, TimeProvider clock)
    {
        (this.board, this.document, Warnings, this.clock) = (board, document, warnings, clock);
        Session = BenchSession.Begin(board.AsRead, bench, sets);
        Left = LeftWork.Find(board.Path, document, bench);
    }

    /// <summary>Raised on the background thread.</summary>
    public event Action<CheckReport>? Reported;

    public string BoardPath => board.Path;

    public string ReadingsPath => document.Path;

    public BenchSession Session { get; private set; }

    public ImmutableArray<FileProblem> Warnings { get; }

    /// <summary>Entries that an earlier run left unsaved; until they are taken or set aside nothing else is entered.</summary>
    public LeftWork? Left { get; private set; }

    /// <summary>False while another screen has the readings file: look, but do not enter.</summary>
    public bool IsOurs => document.IsOurs;

    /// <summary>True while another screen looks on at the readings that are entered here.</summary>
    public bool HasOnlooker => document.HasOnlooker();

    /// <summary>For a screen that only looks on: whether the readings changed, or may now be entered here.</summary>
    public bool MayOpenAnew => !document.IsOurs && (document.IsFree() || HasChangedOnDisk());

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
            return new Opening(new Workbench(BoardDocument.Open(boardPath), bench, ReadingsDocument.Open(readings, sets), sets, problems, clock), problems);
        }
        catch (Exception failure) when (IsFileFailure(failure))
        {
            return new Opening(null, [.. problems, new FileProblem(readings, 0, 0, true, failure.Message)]);
        }
    }

    /// <summary>Starts checking; reports begin to come.</summary>
    public void Start()
    {
        runner = new CheckRunner(CheckSettings.Default, r => Reported?.Invoke(r));
        Check();
    }

    /// <summary>Takes a report of the background; true when a complete check of the present readings came with it.</summary>
    public bool Take(CheckReport report)
    {
        Session = report switch
        {
            CheckReport.Predicted p => Session.Predicted(p.Bench, p.Prediction),
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
        if (Session.Version != before) Check();
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
            if (next.Value.Board != Session.Board) board.Record(next.Value.Board, now);
            if (next.Value.Sets != Session.Sets) document.Record(next.Value.Sets, now);
        }
        catch (Exception failure) when (IsFileFailure(failure))
        {
            return $"Not entered, because it could not be written beside the file: {failure.Message}";
        }

        Session = next.Value;
        Check();
        return null;
    }

    /// <summary>Takes over what an earlier run left; where the file has changed since, its other readings are kept.</summary>
    public string? TakeLeft()
    {
        if (Left is not { } left) return null;
        if (left.Board is { } changed)
        {
            board.TakeUp(changed);
            if (Enter((s, _) => s.WithBoard(changed.Text, left.Bench)) is { } refused) return refused;
        }

        Left = null;
        if (left.Readings is not { } readings) return null;
        var isSameFile = readings.Basis == FileFingerprint.Of(ReadingsPath);
        return Enter((s, _) => s.Replace(isSameFile ? readings.Sets : Merge([], readings.Sets, s.Sets).Sets));
    }

    public void SetLeftAside()
    {
        ReadingsJournal.SetAside(ReadingsPath);
        BoardDocument.SetAside(BoardPath);
        Left = null;
    }

    /// <summary>A command that changes the board file. Null, or why it was refused: then nothing was changed.</summary>
    public string? EnterBoard(Func<BoardText, Parsed<BoardText>> command) => Enter((s, _) =>
    {
        var text = command(s.Board);
        return text.Fault is { } fault ? fault : WithBoard(s, text.Value);
    });

    /// <summary>The session with another version of its board, when that is a board and every reading still has a place on it.</summary>
    private Parsed<BenchSession> WithBoard(BenchSession session, BoardText text)
    {
        if (text.Text == session.Board.Text) return session;
        var read = BoardFile.Parse(text.Text, Path.GetFileName(BoardPath));
        if (read.Bench is not { } bench)
        {
            var problem = read.Problems.First(p => p.IsError);
            return new TextFault(problem.Read, problem.Expected ?? "", problem.Hint);
        }

        Reading[] homeless = [.. session.Sets.SelectMany(s => s.Readings).Where(r => ReadingText.Of(r).Read(bench).Fault is not null)];
        return homeless.Length == 0 ? session.WithBoard(text, bench) : new TextFault(
            $"{homeless.Length} {(homeless.Length == 1 ? "reading" : "readings")} at {string.Join(", ", homeless.Select(r => Place.Of(r, session.Bench.Board).Name(session.Bench.Board)).Distinct().Take(5))} would have no place on this board",
            "a board on which everything that was read can be read", "remove these readings first");
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

    /// <summary>Drops the journals: the user leaves without saving, or all is saved.</summary>
    public void Abandon()
    {
        document.Abandon();
        board.Abandon();
    }

    public void Dispose()
    {
        runner?.Dispose();
        if (!Session.IsDirty && Left is null) Abandon();
        document.Dispose();
        board.Dispose();
    }

    private void Check() => runner?.Post(Session.Version, Session.Bench, Session.Readings);

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
