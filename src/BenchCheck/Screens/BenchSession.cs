using System.Collections.Immutable;
using BenchCheck.Core.Checking;
using BenchCheck.Core.Metering;
using BenchCheck.Core.Quantities;
using BenchCheck.Files;

namespace BenchCheck.Screens;

/// <summary>Everything the bench screen shows, as one immutable value; each command of the user makes a new one.</summary>
internal sealed record BenchSession
{
    private ImmutableStack<Content> undo = ImmutableStack<Content>.Empty;
    private ImmutableStack<Content> redo = ImmutableStack<Content>.Empty;
    private Content content;
    private Content saved;

    private BenchSession(Content content, Place cursor) => (this.content, saved, Cursor) = (content, content, cursor);

    /// <summary>The board file as it stands here.</summary>
    public BoardText Board => content.Board;

    /// <summary>What <see cref="Board"/> describes.</summary>
    public Bench Bench => content.Bench;

    /// <summary>The boards of the readings file; at least one.</summary>
    public ImmutableArray<ReadingSet> Sets => content.Sets;

    /// <summary>Which of <see cref="Sets"/> is on the bench.</summary>
    public int Active { get; private init; }

    public Place Cursor { get; private init; }

    public RowOrder Order { get; init; }

    public bool OnlyFlagged { get; init; }

    /// <summary>After an entry the cursor goes to the suggested next reading.</summary>
    public bool IsGuided { get; init; }

    /// <summary>Position of the suspect whose explanation is shown; null for none.</summary>
    public int? Suspect { get; private init; }

    /// <summary>Counts the changes of the readings; a check belongs to one version.</summary>
    public long Version { get; private init; }

    public CheckResult? Result { get; private init; }

    /// <summary>False while the check of the present readings is running.</summary>
    public bool IsChecked { get; private init; }

    /// <summary>Why the present readings could not be checked; null when they could.</summary>
    public string? Failure { get; private init; }

    /// <summary>What a healthy board shows at every node; null until it is known.</summary>
    public Prediction? Prediction { get; private init; }

    /// <summary>True while readings or parts are not as in their files.</summary>
    public bool IsDirty => AreReadingsDirty || IsBoardDirty;

    public bool AreReadingsDirty => Sets != saved.Sets;

    public bool IsBoardDirty => Board.Text != saved.Board.Text;

    public bool CanUndo => !undo.IsEmpty;

    public bool CanRedo => !redo.IsEmpty;

    public ReadingSet Readings => Sets[Active];

    public string Condition => Cursor.Condition;

    public ImmutableArray<ReadingRow> Rows => ReadingRows.Of(this);

    public ReadingRow? Row => Rows.FirstOrDefault(r => r.Place == Cursor);

    /// <summary>Position of the cursor among the rows; −1 when it is at none of them.</summary>
    public int RowIndex
    {
        get
        {
            ReadingRow[] rows = [.. Rows];
            return Array.FindIndex(rows, r => r.Place == Cursor);
        }
    }

    public static BenchSession Begin(BoardText board, Bench bench, ImmutableArray<ReadingSet> sets)
    {
        ArgumentNullException.ThrowIfNull(bench);
        if (sets.IsDefaultOrEmpty) sets = [new ReadingSet(null, [])];
        var condition = sets[0].Readings.FirstOrDefault()?.Condition ?? bench.Board.Conditions[0].Name;
        var session = new BenchSession(new Content(board, bench, sets), new Place(condition, ReadingQuantity.Voltage, "", null));
        return session.ToFirstRow();
    }

    /// <summary>Takes a typed value at the cursor: in place of what was read there, or as one more repeat of it.</summary>
    public Parsed<BenchSession> Type(string value, bool asRepeat, DateTimeOffset time)
    {
        var old = Row?.Reading;
        var text = old is null ? ReadingText.Typed(Cursor, value) : ReadingText.Of(old) with { Value = value, Range = "" };
        var read = text.Read(Bench);
        if (read.Fault is { } fault) return fault;
        var reading = read.Value with { Time = time };
        if (asRepeat && old is not null) reading = Pooled(old, reading);
        return Put(old, reading);
    }

    /// <summary>Takes a reading typed in full, at any place.</summary>
    /// <param name="replaced">the reading that was edited; null for a new one</param>
    public Parsed<BenchSession> Put(ReadingText text, Reading? replaced, DateTimeOffset time)
    {
        var read = text.Read(Bench);
        if (read.Fault is { } fault) return fault;
        var isSameValue = replaced is not null && replaced.Value.Equals(read.Value.Value);
        var reading = read.Value with { Time = isSameValue ? replaced!.Time : time };
        if (isSameValue) reading = reading with { Repeats = replaced!.Repeats, RepeatUncertainty = replaced.RepeatUncertainty };
        return Put(replaced, reading) with { Cursor = Place.Of(reading, Bench.Board) };
    }

    public BenchSession WithNote(string note)
    {
        if (Row?.Reading is not { } old) return this;
        return Put(old, old with { Note = string.IsNullOrWhiteSpace(note) ? null : note.Trim() });
    }

    /// <summary>Says which board it is that lies on the bench; two boards of a file cannot bear the same serial.</summary>
    /// <param name="serial">empty for none</param>
    public Parsed<BenchSession> WithSerial(string serial)
    {
        var named = string.IsNullOrWhiteSpace(serial) ? null : serial.Trim();
        if (named == Readings.Serial) return this;
        return Sets.Any(s => s.Serial == named) ? new TextFault($"serial {TextFault.Quote(named ?? "")}, which another board of this file bears", "a serial of its own")
            : Changed(Readings with { Serial = named });
    }

    /// <summary>Removes the reading at the cursor.</summary>
    public BenchSession Delete() => Row?.Reading is { } old ? Changed(Readings with { Readings = Readings.Readings.Remove(old) }) : this;

    public BenchSession Undo() => undo.IsEmpty ? this : (With(undo.Peek()) with { undo = undo.Pop(), redo = redo.Push(content) }).InSight();

    public BenchSession Redo() => redo.IsEmpty ? this : (With(redo.Peek()) with { redo = redo.Pop(), undo = undo.Push(content) }).InSight();

    /// <summary>Takes readings from elsewhere (an import, a recovery, a merge) as one change that can be undone.</summary>
    public BenchSession Replace(ImmutableArray<ReadingSet> sets)
    {
        if (sets.IsDefaultOrEmpty) sets = [new ReadingSet(null, [])];
        return Changed(content with { Sets = sets }) with { Active = Math.Min(Active, sets.Length - 1) };
    }

    /// <summary>Takes another version of the board, in which every reading keeps its place, as one change that can be undone.</summary>
    public BenchSession WithBoard(BoardText board, Bench bench) => Changed(content with { Board = board, Bench = bench }).InSight();

    public BenchSession SavedReadings() => this with { saved = saved with { Sets = Sets } };

    /// <param name="board">the text that is on disk now</param>
    public BenchSession SavedBoard(BoardText board) => this with { saved = saved with { Board = board } };

    /// <summary>What a healthy board shows; one of another version of the board changes nothing.</summary>
    public BenchSession Predicted(Bench bench, Prediction prediction) => ReferenceEquals(bench, Bench) ? (this with { Prediction = prediction }).InSight() : this;

    /// <summary>The result of a check; one of older readings changes nothing.</summary>
    public BenchSession Checked(long version, CheckResult result, bool isComplete)
    {
        if (version != Version) return this;
        var suspects = isComplete || Result is null ? result.Suspects : Result.Suspects;
        return this with
        {
            Result = isComplete ? result : result with { Suspects = [], Next = [] }, IsChecked = isComplete, Failure = null,
            Suspect = isComplete && Suspect is { } chosen && chosen >= suspects.Length ? null : Suspect,
        };
    }

    public BenchSession Failed(long version, string reason) => version == Version ? this with { Failure = reason, Result = null, IsChecked = true } : this;

    /// <summary>Moves the cursor by rows, staying within the table.</summary>
    public BenchSession Move(int rows)
    {
        var all = Rows;
        if (all.IsEmpty) return this;
        var at = RowIndex;
        var to = at < 0 ? 0 : Math.Clamp(at + rows, 0, all.Length - 1);
        return this with { Cursor = all[to].Place };
    }

    public BenchSession MoveTo(Place place) => this with { Cursor = place };

    /// <summary>The next condition of the board in turn.</summary>
    public BenchSession NextCondition()
    {
        var names = Bench.Board.Conditions.Select(c => c.Name).ToList();
        return InCondition(names[(names.IndexOf(Condition) + 1) % names.Count]);
    }

    public BenchSession InCondition(string name)
    {
        var there = this with { Cursor = Cursor with { Condition = name } };
        var same = there.Rows.FirstOrDefault(r => r.Place.At == Cursor.At && r.Place.Against == Cursor.Against);
        return same is null ? there.ToFirstRow() : there with { Cursor = same.Place };
    }

    /// <summary>The next board of the file in turn.</summary>
    public BenchSession NextBoard() =>
        Sets.Length == 1 ? this : (this with { Active = (Active + 1) % Sets.Length, Version = Version + 1, Result = null, IsChecked = false }).ToFirstRow();

    /// <summary>Chooses the next suspect in turn, none after the last.</summary>
    public BenchSession NextSuspect()
    {
        var count = Result?.Suspects.Length ?? 0;
        return this with { Suspect = count == 0 ? null : Suspect is not { } i ? 0 : i + 1 < count ? i + 1 : null };
    }

    /// <summary>The suggested next reading, where the board can be read; null when there is none.</summary>
    public Place? Suggested => IsChecked && Result is { Next: [var next, ..] } ? Place.Of(next, Bench.Board) : null;

    private BenchSession ToFirstRow() => Rows is [var first, ..] ? this with { Cursor = first.Place } : this with { Cursor = Cursor with { At = Bench.Board.Reference } };

    private BenchSession Put(Reading? old, Reading reading)
    {
        var readings = Readings.Readings;
        if (old is not null && readings.Contains(old)) return Changed(Readings with { Readings = readings.Replace(old, reading) });
        var repeated = readings.FirstOrDefault(reading.IsRepeatOf);
        return Changed(Readings with { Readings = repeated is null ? readings.Add(reading) : readings.Replace(repeated, reading) });
    }

    private static Reading Pooled(Reading old, Reading one)
    {
        var together = Repeats.Pooled([new Repeats(old.Repeats, old.Value, old.RepeatUncertainty * Math.Sqrt(old.Repeats)), new Repeats(1, one.Value, 0)]);
        return old with { Value = together.Mean, Repeats = together.Count, RepeatUncertainty = together.Uncertainty, Time = one.Time };
    }

    private BenchSession Changed(ReadingSet set) => Changed(content with { Sets = Sets.SetItem(Active, set) });

    private BenchSession Changed(Content next) => With(next) with { undo = undo.Push(content), redo = ImmutableStack<Content>.Empty };

    private BenchSession With(Content next)
    {
        var isSameBoard = ReferenceEquals(next.Bench, Bench);
        return this with
        {
            content = next, Active = Math.Min(Active, next.Sets.Length - 1), Version = Version + 1, IsChecked = false,
            Prediction = isSameBoard ? Prediction : null, Result = isSameBoard ? Result : null, Suspect = isSameBoard ? Suspect : null,
        };
    }

    /// <summary>The cursor where the board still has a row.</summary>
    private BenchSession InSight()
    {
        if (Bench.Board.FindCondition(Condition) is null) return (this with { Cursor = Cursor with { Condition = Bench.Board.Conditions[0].Name } }).ToFirstRow();
        return Row is null ? ToFirstRow() : this;
    }

    /// <summary>What is undone and saved: the board and its readings.</summary>
    private sealed record Content(BoardText Board, Bench Bench, ImmutableArray<ReadingSet> Sets);
}
