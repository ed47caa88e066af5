using System.Text;
using System.Text.Json;
using BenchCheck.Files;
using BenchCheck.Records;

namespace BenchCheck.Commands.Log;

/// <summary>What a user has set once for every check: which bench log, and whether each check is filed without being asked.</summary>
/// <remarks>One JSON file in the user's configuration folder, for its owner's eyes only since a connection string may hold a password.</remarks>
/// <param name="Log">a file or a connection string; null for the usual file</param>
/// <param name="FilesEveryCheck">checks are filed without --log</param>
internal sealed record LogDefaults(string? Log = null, bool FilesEveryCheck = false)
{
    private static readonly JsonSerializerOptions Json = new(JsonSerializerDefaults.Web) { WriteIndented = true };

    /// <summary>Where they are kept.</summary>
    public static string Path => System.IO.Path.Combine(
        Environment.GetFolderPath(Environment.SpecialFolder.ApplicationData, Environment.SpecialFolderOption.DoNotVerify), "benchcheck", "settings.json");

    /// <exception cref="IOException">the file is there but cannot be read; the message says what to do</exception>
    public static LogDefaults Read()
    {
        try
        {
            return JsonSerializer.Deserialize<LogDefaults>(File.ReadAllText(Path), Json) ?? new LogDefaults();
        }
        catch (Exception missing) when (missing is FileNotFoundException or DirectoryNotFoundException)
        {
            return new LogDefaults();
        }
        catch (Exception failure) when (failure is JsonException or UnauthorizedAccessException)
        {
            throw new IOException($"{Path}: these settings cannot be read ({failure.Message}); log default FILE writes them anew", failure);
        }
    }

    /// <exception cref="IOException">the folder cannot be written</exception>
    public void Write()
    {
        try
        {
            Directory.CreateDirectory(System.IO.Path.GetDirectoryName(Path)!);
            AtomicFile.Write(Path, Encoding.UTF8.GetBytes(JsonSerializer.Serialize(this, Json) + "\n"));
            if (!OperatingSystem.IsWindows()) File.SetUnixFileMode(Path, UnixFileMode.UserRead | UnixFileMode.UserWrite);
        }
        catch (UnauthorizedAccessException failure)
        {
            throw new IOException($"{Path}: the settings cannot be written: {failure.Message}", failure);
        }
    }

    public LogPlace Place => Log is null ? LogPlace.Standard() : LogPlace.Parse(Log);
}
