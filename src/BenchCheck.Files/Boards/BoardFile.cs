using System.Collections.Immutable;
using System.Text;
using BenchCheck.Core.Boards;
using BenchCheck.Core.Metering;
using BenchCheck.Core.Quantities;

namespace BenchCheck.Files;

/// <summary>What came of reading a board file: the bench, or the reasons why there is none.</summary>
/// <param name="Bench">null when <paramref name="Problems"/> holds an error</param>
/// <param name="Problems">every error and warning of the file, in the order of its lines</param>
public sealed record BoardFileResult(Bench? Bench, ImmutableArray<FileProblem> Problems);

/// <summary>Reads board files (TOML): the parts, conditions and meters of one board.</summary>
/// <remarks>Whatever the file holds, reading it returns a result; all problems come at once, each with its line and column.</remarks>
public static class BoardFile
{
    /// <summary>Largest board file in bytes; a board of a thousand parts takes a tenth of it.</summary>
    public const int LargestFile = 1_000_000;

    /// <summary>Most parts of one board.</summary>
    public const int MostParts = 2000;

    public static BoardFileResult Read(string path)
    {
        ArgumentNullException.ThrowIfNull(path);
        byte[] bytes;
        try
        {
            using var stream = File.OpenRead(path);
            if (stream.CanSeek && stream.Length > LargestFile) return Refused(path, $"{stream.Length} bytes", $"a board file of at most {LargestFile} bytes");
            using var buffer = new MemoryStream();
            stream.CopyTo(buffer);
            bytes = buffer.ToArray();
        }
        catch (Exception failure) when (TextBytes.IsFileFailure(failure))
        {
            return Refused(path, TextBytes.Reason(failure), "a board file (TOML)");
        }

        if (TextBytes.EncodingOf(bytes.AsSpan(0, Math.Min(bytes.Length, 4096)), out var mark) is not { } encoding)
            return Refused(path, "binary data", "a board file: TOML text in UTF-8");
        try
        {
            return Parse(encoding.GetString(bytes.AsSpan(mark)), path);
        }
        catch (DecoderFallbackException invalid)
        {
            var line = 1 + bytes.AsSpan(0, Math.Clamp(mark + Math.Max(invalid.Index, 0), 0, bytes.Length)).Count((byte)'\n');
            return new BoardFileResult(null, [new FileProblem(path, line, 0, true, "characters that are not UTF-8", "TOML text in UTF-8", "save the file as UTF-8")]);
        }
    }

    /// <param name="text">the file's text</param>
    /// <param name="name">the file's name, for messages</param>
    public static BoardFileResult Parse(string text, string name)
    {
        ArgumentNullException.ThrowIfNull(text);
        ArgumentNullException.ThrowIfNull(name);
        if (text.Length > LargestFile) return Refused(name, $"{text.Length} characters", $"a board file of at most {LargestFile} bytes");
        var nul = text.IndexOf('\0', StringComparison.Ordinal);
        if (nul >= 0)
            return new BoardFileResult(null, [new FileProblem(name, 1 + text.AsSpan(0, nul).Count('\n'), 0, true, "a NUL byte: binary data", "a board file: TOML text in UTF-8")]);
        if (string.IsNullOrWhiteSpace(text)) return Refused(name, "an empty file", "a board file with at least [parts]");
        var problems = new ProblemList(name);
        return new BoardReader(problems).Read(text.StartsWith('\uFEFF') ? text[1..] : text);
    }

    private static BoardFileResult Refused(string name, string read, string expected) =>
        new(null, [new FileProblem(name, 0, 0, true, read, expected)]);
}
