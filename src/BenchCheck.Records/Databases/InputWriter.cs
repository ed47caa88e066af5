using System.Data.Common;

namespace BenchCheck.Records.Databases;

/// <summary>Keeps files by their SHA-256 within one transaction, each once.</summary>
internal sealed class InputWriter(LogDatabase database) : IDisposable
{
    private readonly DbCommand command = database.Command(
        "INSERT INTO inputs (sha256, body) VALUES (@sha256, @body) ON CONFLICT DO NOTHING", ("@sha256", ""), ("@body", Array.Empty<byte>()));

    private readonly HashSet<string> written = new(StringComparer.Ordinal);
    private readonly Dictionary<ReadOnlyMemory<byte>, string> hashes = [];

    /// <returns>the SHA-256</returns>
    public string Write(ReadOnlyMemory<byte> file)
    {
        // The same memory comes with every board of a shelf; hashing it once is enough.
        if (hashes.TryGetValue(file, out var known)) return known;
        var sha256 = hashes[file] = ChainHash.Of(file.Span);
        if (!written.Add(sha256)) return sha256;
        command.Parameters[0].Value = sha256;
        command.Parameters[1].Value = file.ToArray();
        command.ExecuteNonQuery();
        return sha256;
    }

    public void Dispose() => command.Dispose();
}
