using System.Text;

namespace BenchCheck.Files;

/// <summary>Recognises the encoding of a text file from its first bytes.</summary>
internal static class TextBytes
{
    private static readonly UTF8Encoding Utf8 = new(false, true);

    /// <summary>UTF-8 or UTF-16 of either byte order, by mark or, without one, by where the NUL bytes stand; null for a binary file.</summary>
    /// <param name="head">the first bytes of the file; some thousand are enough</param>
    /// <param name="markLength">bytes of the byte-order mark</param>
    public static Encoding? EncodingOf(ReadOnlySpan<byte> head, out int markLength)
    {
        markLength = 0;
        if (head.StartsWith((ReadOnlySpan<byte>)[0xEF, 0xBB, 0xBF]))
        {
            markLength = 3;
            return Utf8;
        }

        if (head.StartsWith((ReadOnlySpan<byte>)[0xFF, 0xFE]) || head.StartsWith((ReadOnlySpan<byte>)[0xFE, 0xFF]))
        {
            markLength = 2;
            return new UnicodeEncoding(head[0] == 0xFE, false, true);
        }

        var (even, odd) = (0, 0);
        for (var i = 0; i < head.Length; i++)
        {
            if (head[i] != 0) continue;
            if (i % 2 == 0) even++;
            else odd++;
        }

        if (even + odd == 0) return Utf8;
        var most = head.Length / 4;
        return odd > most && even == 0 ? new UnicodeEncoding(false, false, true)
            : even > most && odd == 0 ? new UnicodeEncoding(true, false, true)
            : null;
    }

    /// <summary>Why a file cannot be opened, in plain words.</summary>
    public static string Reason(Exception failure) => failure switch
    {
        FileNotFoundException or DirectoryNotFoundException => "there is no such file",
        UnauthorizedAccessException => "the file may not be read, or is a folder",
        _ => $"the file cannot be read: {failure.Message}",
    };

    public static bool IsFileFailure(Exception failure) =>
        failure is IOException or UnauthorizedAccessException or ArgumentException or NotSupportedException or System.Security.SecurityException;
}
