using System.Globalization;

namespace BenchCheck.Files;

/// <summary>One program's claim on a file while it is being edited: a lock file beside it.</summary>
/// <remarks>
/// The operating system holds the lock and drops it when the program ends in whatever way, so a lock file left by a crash claims nothing: the
/// next program simply takes it over.
/// </remarks>
public sealed class FileClaim : IDisposable
{
    private readonly FileStream stream;
    private readonly string path;

    private FileClaim(FileStream stream, string path) => (this.stream, this.path) = (stream, path);

    public static string PathFor(string file) => file + ".lock";

    /// <summary>Null when another program holds the claim, or the folder cannot be written.</summary>
    public static FileClaim? TryTake(string file)
    {
        var path = PathFor(file);
        try
        {
            var stream = new FileStream(path, FileMode.OpenOrCreate, FileAccess.ReadWrite, FileShare.None);
            stream.SetLength(0);
            stream.Write(System.Text.Encoding.ASCII.GetBytes(Environment.ProcessId.ToString(CultureInfo.InvariantCulture)));
            stream.Flush();
            return new FileClaim(stream, path);
        }
        catch (Exception failure) when (failure is IOException or UnauthorizedAccessException)
        {
            return null;
        }
    }

    /// <summary>Gives the claim up. The file goes first, while it is still claimed, so that no other program's is taken away.</summary>
    public void Dispose()
    {
        try
        {
            if (!OperatingSystem.IsWindows()) File.Delete(path);
        }
        catch (Exception failure) when (failure is IOException or UnauthorizedAccessException)
        {
            // A lock file that stays claims nothing.
        }

        stream.Dispose();
    }
}
