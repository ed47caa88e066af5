using System.Collections.Immutable;
using System.Reflection;
using System.Text;
using BenchCheck.Files;

namespace BenchCheck.Screens;

/// <summary>What the screen remembers of its user between runs: recent boards, the cautions acknowledged, copies of the samples to play with.</summary>
/// <remarks>Nothing here is needed: where the folder cannot be read or written the screen goes on without it.</remarks>
internal sealed class UserFolder(string path)
{
    private const int MostRecent = 9;
    private const string SamplePrefix = "samples/";

    private string RecentFile => Path.Combine(path, "recent.txt");

    private string AcknowledgedFile => Path.Combine(path, "cautions-read.txt");

    public static UserFolder Usual() => new(Path.Combine(
        Environment.GetFolderPath(Environment.SpecialFolder.LocalApplicationData, Environment.SpecialFolderOption.DoNotVerify), "benchcheck"));

    public bool HasAcknowledgedCautions => File.Exists(AcknowledgedFile);

    public void AcknowledgeCautions() => Try(() => Write(AcknowledgedFile, "The cautions were read and acknowledged.\n"));

    /// <summary>Boards opened before that are still there, the last one first.</summary>
    public ImmutableArray<string> Recent()
    {
        try
        {
            return File.Exists(RecentFile) ? [.. File.ReadLines(RecentFile).Take(MostRecent * 4).Where(File.Exists).Distinct().Take(MostRecent)] : [];
        }
        catch (Exception failure) when (Workbench.IsFileFailure(failure))
        {
            return [];
        }
    }

    public void Remember(string boardPath)
    {
        var full = Path.GetFullPath(boardPath);
        if (full.AsSpan().ContainsAny('\n', '\r')) return;
        Try(() => Write(RecentFile, string.Concat(Recent().Where(p => p != full).Prepend(full).Take(MostRecent).Select(p => p + "\n"))));
    }

    /// <summary>Names of the samples that the program carries, without their endings.</summary>
    public static ImmutableArray<string> Samples() =>
    [
        .. Assembly.GetExecutingAssembly().GetManifestResourceNames()
            .Where(n => n.StartsWith(SamplePrefix, StringComparison.Ordinal) && n.EndsWith(".toml", StringComparison.Ordinal))
            .Select(n => n[SamplePrefix.Length..^".toml".Length]).Order(StringComparer.Ordinal),
    ];

    /// <summary>Puts a copy of a sample where it may be changed, unless one is there, and says where. </summary>
    /// <exception cref="IOException">the folder cannot be written</exception>
    /// <exception cref="UnauthorizedAccessException">no permission</exception>
    public string CopySample(string name)
    {
        var folder = Path.Combine(path, "samples");
        foreach (var ending in (ReadOnlySpan<string>)[".toml", ".csv"])
        {
            var file = Path.Combine(folder, name + ending);
            if (File.Exists(file)) continue;
            using var stream = Assembly.GetExecutingAssembly().GetManifestResourceStream(SamplePrefix + name + ending);
            if (stream is null) continue;
            using var reader = new StreamReader(stream, Encoding.UTF8);
            Write(file, reader.ReadToEnd());
        }

        return Path.Combine(folder, name + ".toml");
    }

    private static void Write(string file, string text)
    {
        Directory.CreateDirectory(Path.GetDirectoryName(file)!);
        AtomicFile.Write(file, Encoding.UTF8.GetBytes(text));
    }

    private static void Try(Action action)
    {
        try
        {
            action();
        }
        catch (Exception failure) when (Workbench.IsFileFailure(failure))
        {
            // The screen works without its memory.
        }
    }
}
