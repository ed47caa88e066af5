using System.Collections.Immutable;
using System.Text;
using BenchCheck.Core.Metering;

namespace BenchCheck.Files;

/// <summary>Reads readings files (CSV): long form, <c>node,volts</c>, and wide form.</summary>
/// <remarks>
/// A first pass checks every row and keeps nothing but problems and serials; the readings are then streamed from a second one. Whatever the
/// file holds, reading it returns a result. Rows of one serial are one board wherever they stand.
/// </remarks>
public static class ReadingsFile
{
    /// <summary>Most rows of one file.</summary>
    public const int MostRows = 2_000_000;

    /// <summary>Most readings of one board, repeats counted.</summary>
    public const int MostReadingsOfBoard = 100_000;

    /// <summary>Most readings of boards whose rows are scattered over the file, which are held in memory.</summary>
    public const int MostScatteredReadings = 200_000;

    public static ReadingsFileResult Read(string path, Bench bench, ReadingsOptions? options = null)
    {
        ArgumentNullException.ThrowIfNull(path);
        ArgumentNullException.ThrowIfNull(bench);
        try
        {
            var head = new byte[4096];
            int length;
            using (var stream = File.OpenRead(path)) length = stream.ReadAtLeast(head, head.Length, throwOnEndOfStream: false);
            if (TextBytes.EncodingOf(head.AsSpan(0, length), out _) is not { } encoding)
                return Refused(path, "binary data", "a readings file: CSV text");
            return ReadAs(encoding, path, bench, options) ?? ReadAs(Encoding.Latin1, path, bench, options)
                ?? Refused(path, "text in no known encoding", "CSV in UTF-8 or UTF-16");
        }
        catch (Exception failure) when (TextBytes.IsFileFailure(failure))
        {
            return Refused(path, TextBytes.Reason(failure), "a readings file (CSV)");
        }
    }

    /// <param name="text">the file's text</param>
    /// <param name="name">the file's name, for messages</param>
    public static ReadingsFileResult Parse(string text, string name, Bench bench, ReadingsOptions? options = null)
    {
        ArgumentNullException.ThrowIfNull(text);
        ArgumentNullException.ThrowIfNull(name);
        ArgumentNullException.ThrowIfNull(bench);
        return new ReadingsSource(() => new StringReader(text), name, bench, options ?? ReadingsOptions.Default).Survey([]);
    }

    /// <summary>The first rows of a table as they stand, for a user who says what its columns are; empty when it is none.</summary>
    public static ImmutableArray<ImmutableArray<string>> Glance(string path, Bench bench)
    {
        ArgumentNullException.ThrowIfNull(path);
        try
        {
            var head = new byte[4096];
            int length;
            using (var stream = File.OpenRead(path)) length = stream.ReadAtLeast(head, head.Length, throwOnEndOfStream: false);
            if (TextBytes.EncodingOf(head.AsSpan(0, length), out _) is not { } encoding) return [];
            try
            {
                return Source(encoding).Glance(ColumnMap.RowsSeen);
            }
            catch (DecoderFallbackException)
            {
                return Source(Encoding.Latin1).Glance(ColumnMap.RowsSeen);
            }
        }
        catch (Exception failure) when (TextBytes.IsFileFailure(failure) || failure is CsvHelper.CsvFormatException)
        {
            return [];
        }

        ReadingsSource Source(Encoding encoding) => new(() => new StreamReader(path, encoding), path, bench, ReadingsOptions.Default);
    }

    /// <summary>Null when the file is not in that encoding.</summary>
    private static ReadingsFileResult? ReadAs(Encoding encoding, string path, Bench bench, ReadingsOptions? options)
    {
        try
        {
            var source = new ReadingsSource(() => new StreamReader(path, encoding), path, bench, options ?? ReadingsOptions.Default);
            return source.Survey(encoding != Encoding.Latin1 ? [] :
                [new FileProblem(path, 0, 0, false, "characters that are not UTF-8, read as Latin-1", "CSV in UTF-8", "look at the notes and units; save the file as UTF-8")]);
        }
        catch (DecoderFallbackException)
        {
            return null;
        }
    }

    private static ReadingsFileResult Refused(string name, string read, string expected) =>
        new([new FileProblem(name, 0, 0, true, read, expected)], 0, []);
}
