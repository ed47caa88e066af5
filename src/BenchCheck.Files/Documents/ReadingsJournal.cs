using System.Collections.Immutable;
using System.Globalization;
using System.Text;
using System.Text.Json;
using BenchCheck.Core.Metering;

namespace BenchCheck.Files;

/// <summary>Entries not yet saved, on disk beside the readings file: what a crash, a kill or a power cut leaves for the next start.</summary>
/// <remarks>
/// A text of JSON lines: the first tells the format and the fingerprint of the readings file that the entries stand on, each further one holds
/// all readings after one entry, as the CSV that <see cref="ReadingsCsv"/> writes, and the time. <see cref="Append"/> returns when the line is
/// on the disk. The last whole line counts; a torn one behind it is the entry that was being written.
/// </remarks>
public sealed class ReadingsJournal : IDisposable
{
    private const int Format = 1;

    /// <summary>Largest journal read back, in bytes.</summary>
    private const long Largest = 256_000_000;

    private readonly FileStream stream;

    private ReadingsJournal(FileStream stream, string path) => (this.stream, Path) = (stream, path);

    public string Path { get; }

    public static string PathFor(string readingsFile) => readingsFile + ".journal";

    /// <summary>Begins a journal with its first entry; an old one stays until the new one is whole on the disk, and is then replaced.</summary>
    /// <exception cref="IOException">the folder cannot be written</exception>
    /// <exception cref="UnauthorizedAccessException">no permission</exception>
    public static ReadingsJournal Begin(string readingsFile, FileFingerprint basis, IReadOnlyCollection<ReadingSet> sets, DateTimeOffset time)
    {
        var path = PathFor(readingsFile);
        var fresh = path + ".new";
        var journal = new ReadingsJournal(new FileStream(fresh, FileMode.Create, FileAccess.Write, FileShare.Read | FileShare.Delete), path);
        try
        {
            journal.WriteLine(JsonSerializer.Serialize(new Dictionary<string, object> { ["format"] = Format, ["basis"] = basis.Hash }));
            journal.Append(sets, time);
            File.Move(fresh, path, overwrite: true);
            return journal;
        }
        catch
        {
            journal.Dispose();
            throw;
        }
    }

    /// <summary>Writes the readings as they are after an entry; they are on the disk when this returns.</summary>
    /// <exception cref="IOException">the disk is full or gone</exception>
    public void Append(IReadOnlyCollection<ReadingSet> sets, DateTimeOffset time)
    {
        ArgumentNullException.ThrowIfNull(sets);
        using var csv = new StringWriter(CultureInfo.InvariantCulture);
        if (sets.Any(s => !s.Readings.IsEmpty)) ReadingsCsv.Write(csv, sets);
        WriteLine(JsonSerializer.Serialize(new Dictionary<string, string> { ["time"] = time.ToString("O", CultureInfo.InvariantCulture), ["readings"] = csv.ToString() }));
    }

    /// <summary>What a journal left by another run holds; null when there is none or nothing was entered.</summary>
    public static JournalContent? Read(string readingsFile, Bench bench)
    {
        ArgumentNullException.ThrowIfNull(bench);
        var path = PathFor(readingsFile);
        string text;
        try
        {
            if (!File.Exists(path) || new FileInfo(path).Length > Largest) return null;
            using var stream = new FileStream(path, FileMode.Open, FileAccess.Read, FileShare.ReadWrite | FileShare.Delete);
            using var reader = new StreamReader(stream, Encoding.UTF8);
            text = reader.ReadToEnd();
        }
        catch (Exception failure) when (TextBytes.IsFileFailure(failure))
        {
            return null;
        }

        // What stands behind the last line break was being written when the program ended.
        var lines = text[..(text.LastIndexOf('\n') + 1)].Split('\n', StringSplitOptions.RemoveEmptyEntries);
        if (lines.Length < 2 || Field(lines[0], "basis") is not { } basis) return null;
        for (var i = lines.Length - 1; i > 0; i--)
        {
            if (Field(lines[i], "readings") is not { } csv) continue;
            var time = DateTimeOffset.TryParse(Field(lines[i], "time"), CultureInfo.InvariantCulture, out var read) ? read : (DateTimeOffset?)null;
            if (csv.Length == 0) return new JournalContent(new FileFingerprint(basis), [], i, time);
            var result = ReadingsFile.Parse(csv, path, bench);
            if (result.IsUsable) return new JournalContent(new FileFingerprint(basis), [.. result.Sets], i, time);
        }

        return null;
    }

    /// <summary>Puts a journal that was declined out of the way without destroying it.</summary>
    public static void SetAside(string readingsFile)
    {
        var path = PathFor(readingsFile);
        if (File.Exists(path)) File.Move(path, path + ".declined", overwrite: true);
    }

    /// <summary>Removes the journal: everything in it was saved.</summary>
    public void Close()
    {
        stream.Dispose();
        File.Delete(Path);
    }

    public void Dispose() => stream.Dispose();

    private static string? Field(string line, string name)
    {
        try
        {
            using var document = JsonDocument.Parse(line);
            return document.RootElement.ValueKind == JsonValueKind.Object && document.RootElement.TryGetProperty(name, out var field) && field.ValueKind == JsonValueKind.String
                ? field.GetString()
                : null;
        }
        catch (JsonException)
        {
            return null;
        }
    }

    private void WriteLine(string line)
    {
        stream.Write(Encoding.UTF8.GetBytes(line + "\n"));
        stream.Flush(flushToDisk: true);
    }
}

/// <summary>What a journal holds.</summary>
/// <param name="Basis">of the readings file that the entries stand on</param>
/// <param name="Sets">all readings after the last entry</param>
/// <param name="Entries">how many entries were made</param>
/// <param name="Time">of the last one</param>
public sealed record JournalContent(FileFingerprint Basis, ImmutableArray<ReadingSet> Sets, int Entries, DateTimeOffset? Time);
