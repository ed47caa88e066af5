using System.Collections.Immutable;
using System.Globalization;
using System.Text;
using BenchCheck.Core.Metering;

namespace BenchCheck.Files;

/// <summary>What came of saving.</summary>
public enum SaveOutcome
{
    Saved,

    /// <summary>nothing was written: the file on disk is no longer what was read</summary>
    ChangedOnDisk,

    /// <summary>nothing was written: another program holds the file</summary>
    HeldElsewhere,
}

/// <summary>A readings file that is being worked on: claimed while open, every entry journalled, saved atomically, never over a stranger's change.</summary>
public sealed class ReadingsDocument : IDisposable
{
    private readonly FileClaim? claim;
    private FileClaim? onlooker;
    private ReadingsJournal? journal;
    private FileFingerprint basis;
    private ImmutableArray<ReadingSet> asRead;

    private ReadingsDocument(string path, FileClaim? claim, FileFingerprint basis, ImmutableArray<ReadingSet> asRead) =>
        (Path, this.claim, this.basis, this.asRead) = (path, claim, basis, asRead);

    public string Path { get; }

    /// <summary>False when another program holds the file: it may be looked at, entries are not taken.</summary>
    public bool IsOurs => claim is not null;

    /// <summary>The readings as they were on disk when last read or saved.</summary>
    public ImmutableArray<ReadingSet> AsRead => asRead;

    /// <summary>Opens a file that may not exist yet.</summary>
    /// <param name="asRead">what was read from it; empty for a new one</param>
    /// <exception cref="IOException">the file is there and cannot be read</exception>
    public static ReadingsDocument Open(string path, ImmutableArray<ReadingSet> asRead)
    {
        var full = System.IO.Path.GetFullPath(path);
        var claim = FileClaim.TryTake(full);
        return new ReadingsDocument(full, claim, FileFingerprint.Of(full), asRead) { onlooker = claim is null ? FileClaim.TryTake(OnlookerOf(full)) : null };
    }

    /// <summary>For the program that holds the file: whether another one has it open too.</summary>
    public bool HasOnlooker()
    {
        if (!IsOurs || !File.Exists(FileClaim.PathFor(OnlookerOf(Path)))) return false;
        using var free = FileClaim.TryTake(OnlookerOf(Path));
        return free is null;
    }

    /// <summary>For an onlooker: whether the program that held the file has given it up. Until then the onlooker makes itself known.</summary>
    public bool IsFree()
    {
        onlooker ??= FileClaim.TryTake(OnlookerOf(Path));
        using var free = FileClaim.TryTake(Path);
        return free is not null;
    }

    /// <summary>Puts the readings after an entry on the disk, in the journal.</summary>
    /// <exception cref="IOException">the disk is full or gone</exception>
    /// <exception cref="UnauthorizedAccessException">no permission to write beside the file</exception>
    public void Record(IReadOnlyCollection<ReadingSet> sets, DateTimeOffset time)
    {
        if (!IsOurs) throw new IOException("another screen has the file open");
        if (journal is null) journal = ReadingsJournal.Begin(Path, basis, sets, time);
        else journal.Append(sets, time);
    }

    public bool HasChangedOnDisk() => FileFingerprint.Of(Path) != basis;

    /// <summary>Takes what is on disk now as the version that ours stands on.</summary>
    public void Rebase(ImmutableArray<ReadingSet> theirs)
    {
        basis = FileFingerprint.Of(Path);
        asRead = theirs;
    }

    /// <exception cref="IOException">the file cannot be written; the old one is as it was</exception>
    /// <exception cref="UnauthorizedAccessException">no permission; the old one is as it was</exception>
    public SaveOutcome Save(ImmutableArray<ReadingSet> sets)
    {
        if (!IsOurs) return SaveOutcome.HeldElsewhere;
        if (HasChangedOnDisk()) return SaveOutcome.ChangedOnDisk;
        var bytes = Bytes(sets);
        KeepOriginal();
        AtomicFile.Write(Path, bytes);
        basis = FileFingerprint.Of(bytes);
        asRead = sets;
        journal?.Close();
        journal = null;
        return SaveOutcome.Saved;
    }

    /// <summary>Removes the journal: the user chose to leave without saving.</summary>
    public void Abandon()
    {
        journal?.Close();
        journal = null;
    }

    /// <summary>Gives the file up; unsaved entries stay in the journal.</summary>
    public void Dispose()
    {
        journal?.Dispose();
        onlooker?.Dispose();
        claim?.Dispose();
    }

    private static string OnlookerOf(string path) => path + ".onlooker";

    private static byte[] Bytes(ImmutableArray<ReadingSet> sets)
    {
        using var csv = new StringWriter(CultureInfo.InvariantCulture);
        ReadingsCsv.Write(csv, sets);
        return Encoding.UTF8.GetBytes(csv.ToString());
    }

    /// <summary>A file that somebody else wrote may hold comments or columns that our form does not keep: it stays beside as ".bak".</summary>
    private void KeepOriginal()
    {
        if (basis == FileFingerprint.Absent || basis == FileFingerprint.Of(Bytes(asRead))) return;
        var copy = Path + ".bak";
        if (!File.Exists(copy)) File.Copy(Path, copy);
    }
}
