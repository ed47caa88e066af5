using System.Security.Cryptography;

namespace BenchCheck.Files;

/// <summary>Tells whether a file still holds what it held: SHA-256 of its bytes (FIPS 180-4); <see cref="Absent"/> while there is no file.</summary>
public readonly record struct FileFingerprint(string Hash)
{
    public static FileFingerprint Absent { get; } = new("absent");

    /// <exception cref="IOException">the file is there and cannot be read</exception>
    public static FileFingerprint Of(string path)
    {
        try
        {
            using var stream = new FileStream(path, FileMode.Open, FileAccess.Read, FileShare.ReadWrite | FileShare.Delete);
            return new FileFingerprint(Convert.ToHexStringLower(SHA256.HashData(stream)));
        }
        catch (Exception failure) when (failure is FileNotFoundException or DirectoryNotFoundException)
        {
            return Absent;
        }
    }

    public static FileFingerprint Of(ReadOnlySpan<byte> bytes) => new(Convert.ToHexStringLower(SHA256.HashData(bytes)));
}
