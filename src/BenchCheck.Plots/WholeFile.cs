namespace BenchCheck.Plots;

/// <summary>Writes a file whole or not at all: beside its place first, then moved there.</summary>
internal static class WholeFile
{
    /// <returns>null when written, else what is wrong; an older file of that name is then still there</returns>
    public static FileFault? Write(string path, ReadOnlySpan<byte> bytes)
    {
        string? beside = null;
        try
        {
            var target = Path.GetFullPath(path);
            beside = Path.Combine(Path.GetDirectoryName(target)!, $".{Path.GetRandomFileName()}.part");
            using (var stream = new FileStream(beside, FileMode.CreateNew, FileAccess.Write))
            {
                stream.Write(bytes);
                stream.Flush(true);
            }

            File.Move(beside, target, true);
            return null;
        }
        catch (Exception failure) when (failure is IOException or UnauthorizedAccessException or ArgumentException or NotSupportedException)
        {
            if (beside is not null) Discard(beside);
            return new FileFault(path, $"cannot be written: {Reason(failure, path)}");
        }
    }

    private static string Reason(Exception failure, string path) => failure switch
    {
        DirectoryNotFoundException => "its folder does not exist; make it first or name another",
        UnauthorizedAccessException when Directory.Exists(path) => "it is a folder; name a file",
        UnauthorizedAccessException => "no permission to write there; name a folder of your own",
        PathTooLongException => "its name is too long",
        ArgumentException => "its name is no path of this system",
        _ => "the disk may be full or the place not writable",
    };

    private static void Discard(string path)
    {
        try
        {
            File.Delete(path);
        }
        catch (Exception failure) when (failure is IOException or UnauthorizedAccessException)
        {
            // What cannot be written often cannot be deleted either; the message about the writing is what the user needs.
        }
    }
}
