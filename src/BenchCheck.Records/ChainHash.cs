using System.Buffers.Binary;
using System.Security.Cryptography;
using System.Text;

namespace BenchCheck.Records;

/// <summary>The hash chain: each record's hash covers the record and the hash before it, so no record can be changed, taken out or put in unseen.</summary>
/// <remarks>
/// SHA-256 (FIPS 180-4) over the fields in the order below, each with its length before it (four bytes, most significant first; all ones for
/// null), text in UTF-8. The files are covered by their own SHA-256. Cutting off the newest records leaves a chain that is whole: note the
/// newest hash elsewhere to notice that.
/// </remarks>
internal static class ChainHash
{
    public static string Start { get; } = new('0', 64);

    public static string Of(ReadOnlySpan<byte> bytes) => Convert.ToHexStringLower(SHA256.HashData(bytes));

    /// <summary>The hash that <paramref name="record"/> ought to have.</summary>
    public static string Of(LogRecord record)
    {
        using var hash = IncrementalHash.CreateHash(HashAlgorithmName.SHA256);
        Span<byte> number = stackalloc byte[8];
        BinaryPrimitives.WriteInt64BigEndian(number, record.Entry.Number);
        Add(hash, record.Previous);
        hash.AppendData(number);
        Add(hash, record.Entry.FiledAt);
        Add(hash, record.Entry.Program);
        Add(hash, record.Entry.BoardTitle);
        Add(hash, record.Entry.Serial);
        Add(hash, record.Entry.Verdict);
        Add(hash, record.Settings);
        Add(hash, record.Result);
        Add(hash, record.BoardFile);
        Add(hash, record.ReadingsFile);
        Add(hash, record.RatesFile);
        // Records from before there were plots keep the hash that they were filed with.
        if (record.Plot is not null) Add(hash, record.Plot);
        return Convert.ToHexStringLower(hash.GetHashAndReset());
    }

    private static void Add(IncrementalHash hash, string? text)
    {
        Span<byte> length = stackalloc byte[4];
        var bytes = text is null ? [] : Encoding.UTF8.GetBytes(text);
        BinaryPrimitives.WriteInt32BigEndian(length, text is null ? -1 : bytes.Length);
        hash.AppendData(length);
        hash.AppendData(bytes);
    }
}
