using System.Globalization;
using System.Text;
using System.Text.Json;

namespace BenchCheck.Files;

/// <summary>A board file that may be changed: claimed with the first change, every change journalled, saved atomically, never over a stranger's change.</summary>
public sealed class BoardDocument : IDisposable
{
    private const int Format = 1;
    private Encoding encoding;
    private byte[] mark;
    private FileClaim? claim;
    private FileFingerprint basis;

    private BoardDocument(string path, byte[] bytes)
    {
        (Path, basis) = (path, FileFingerprint.Of(bytes));
        (AsRead, encoding, mark) = Decoded(bytes);
    }

    public string Path { get; }

    /// <summary>The text as it was on disk when last read or saved.</summary>
    public BoardText AsRead { get; private set; }

    public static string JournalFor(string boardFile) => boardFile + ".journal";

    /// <exception cref="IOException">the file cannot be read</exception>
    public static BoardDocument Open(string path)
    {
        var full = System.IO.Path.GetFullPath(path);
        return new BoardDocument(full, File.ReadAllBytes(full));
    }

    public bool HasChangedOnDisk() => FileFingerprint.Of(Path) != basis;

    /// <summary>Reads the file again and, when its text can be used, takes it as the version that ours stands on.</summary>
    /// <param name="take">null when it takes the text, or why not: then nothing is changed here</param>
    /// <exception cref="IOException">the file cannot be read</exception>
    public string? Reread(Func<BoardText, string?> take)
    {
        ArgumentNullException.ThrowIfNull(take);
        var bytes = File.ReadAllBytes(Path);
        var read = Decoded(bytes);
        if (take(read.Text) is { } refused) return refused;
        basis = FileFingerprint.Of(bytes);
        (AsRead, encoding, mark) = read;
        Abandon();
        return null;
    }

    /// <summary>Puts the text after a change on the disk, in the journal.</summary>
    /// <exception cref="IOException">another screen is changing the board, or the disk is full or gone</exception>
    /// <exception cref="UnauthorizedAccessException">no permission to write beside the file</exception>
    public void Record(BoardText text, DateTimeOffset time)
    {
        ArgumentNullException.ThrowIfNull(text);
        Claim();
        AtomicFile.Write(JournalFor(Path), JsonSerializer.SerializeToUtf8Bytes(new Dictionary<string, object>
        {
            ["format"] = Format, ["basis"] = basis.Hash, ["time"] = time.ToString("O", CultureInfo.InvariantCulture), ["text"] = text.Text,
        }));
    }

    /// <summary>What a journal left by another run holds; null when there is none.</summary>
    public static BoardLeft? Left(string path)
    {
        try
        {
            var journal = JournalFor(path);
            if (!File.Exists(journal) || new FileInfo(journal).Length > 16L * BoardFile.LargestFile) return null;
            using var document = JsonDocument.Parse(File.ReadAllBytes(journal));
            var root = document.RootElement;
            return root.GetProperty("format").GetInt32() == Format && root.GetProperty("text").GetString() is { } text
                ? new BoardLeft(new FileFingerprint(root.GetProperty("basis").GetString() ?? ""), BoardText.Of(text)) : null;
        }
        catch (Exception failure) when (failure is IOException or UnauthorizedAccessException or JsonException or KeyNotFoundException or InvalidOperationException or FormatException)
        {
            return null;
        }
    }

    /// <summary>Goes on from what another run left: it counts as standing on the file that it was begun on, so that a later one is not overwritten.</summary>
    public void TakeUp(BoardLeft left)
    {
        ArgumentNullException.ThrowIfNull(left);
        basis = left.Basis;
    }

    /// <summary>Puts a journal that was declined out of the way without destroying it.</summary>
    public static void SetAside(string path)
    {
        var journal = JournalFor(path);
        if (File.Exists(journal)) File.Move(journal, journal + ".declined", overwrite: true);
    }

    /// <exception cref="IOException">the file cannot be written; the old one is as it was</exception>
    /// <exception cref="UnauthorizedAccessException">no permission; the old one is as it was</exception>
    public SaveOutcome Save(BoardText text)
    {
        ArgumentNullException.ThrowIfNull(text);
        if (HasChangedOnDisk()) return SaveOutcome.ChangedOnDisk;
        var bytes = Bytes(text);
        AtomicFile.Write(Path, bytes);
        basis = FileFingerprint.Of(bytes);
        AsRead = text;
        Abandon();
        return SaveOutcome.Saved;
    }

    /// <summary>Writes the text under another name, which must not exist; the document stays what it was.</summary>
    /// <exception cref="IOException">it exists, or cannot be written</exception>
    /// <exception cref="UnauthorizedAccessException">no permission</exception>
    public void WriteCopy(BoardText text, string path)
    {
        ArgumentNullException.ThrowIfNull(text);
        if (File.Exists(path) || Directory.Exists(path)) throw new IOException($"{path} exists already");
        AtomicFile.Write(path, Bytes(text));
    }

    /// <summary>Removes the journal: its change was saved or given up.</summary>
    public void Abandon()
    {
        if (claim is null) return;
        File.Delete(JournalFor(Path));
        claim.Dispose();
        claim = null;
    }

    /// <summary>Gives the file up; unsaved changes stay in the journal.</summary>
    public void Dispose() => claim?.Dispose();

    private void Claim() => claim ??= FileClaim.TryTake(Path) ?? throw new IOException("another screen is changing this board, or its folder cannot be written");

    private byte[] Bytes(BoardText text) => [.. mark, .. encoding.GetBytes(text.Text)];

    /// <exception cref="IOException">it is no text</exception>
    private static (BoardText Text, Encoding Encoding, byte[] Mark) Decoded(byte[] bytes)
    {
        if (TextBytes.EncodingOf(bytes.AsSpan(0, Math.Min(bytes.Length, 4096)), out var length) is not { } encoding) throw new IOException("the board file holds binary data");
        return (BoardText.Of(encoding.GetString(bytes.AsSpan(length))), encoding, bytes[..length]);
    }
}

/// <summary>A change of a board file that an earlier run left unsaved.</summary>
/// <param name="Basis">of the board file that it stands on</param>
public sealed record BoardLeft(FileFingerprint Basis, BoardText Text);
