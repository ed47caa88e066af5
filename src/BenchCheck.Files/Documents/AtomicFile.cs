namespace BenchCheck.Files;

/// <summary>Writes a file so that at every moment either the old or the new content is there in full.</summary>
public static class AtomicFile
{
    /// <summary>Writes beside the file, forces it to the disk, then renames it over the old one.</summary>
    /// <exception cref="IOException">the folder cannot be written, or the disk is full; the old file is as it was</exception>
    /// <exception cref="UnauthorizedAccessException">no permission; the old file is as it was</exception>
    public static void Write(string path, ReadOnlySpan<byte> bytes)
    {
        ArgumentNullException.ThrowIfNull(path);
        var target = Resolved(path);
        var temporary = $"{target}.{Guid.NewGuid():N}.tmp";
        try
        {
            using (var stream = new FileStream(temporary, FileMode.CreateNew, FileAccess.Write, FileShare.None))
            {
                stream.Write(bytes);
                stream.Flush(flushToDisk: true);
            }

            if (!OperatingSystem.IsWindows() && File.Exists(target)) File.SetUnixFileMode(temporary, File.GetUnixFileMode(target));
            File.Move(temporary, target, overwrite: true);
        }
        catch
        {
            File.Delete(temporary);
            throw;
        }
    }

    /// <summary>The file behind a symbolic link, so that the link stays one.</summary>
    private static string Resolved(string path) => new FileInfo(path) is { LinkTarget: not null } link ? link.ResolveLinkTarget(true)?.FullName ?? path : path;
}
