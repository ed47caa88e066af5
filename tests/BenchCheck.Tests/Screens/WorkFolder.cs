namespace BenchCheck.Tests.Screens;

/// <summary>A folder of its own with a copy of the samples, gone afterwards.</summary>
internal sealed class WorkFolder : IDisposable
{
    public WorkFolder()
    {
        Path = Directory.CreateTempSubdirectory("benchcheck-").FullName;
        foreach (var file in Directory.EnumerateFiles(Samples)) File.Copy(file, In(System.IO.Path.GetFileName(file)));
    }

    public string Path { get; }

    public static string Samples
    {
        get
        {
            var folder = new DirectoryInfo(AppContext.BaseDirectory);
            while (!Directory.Exists(System.IO.Path.Combine(folder!.FullName, "sample-measurements"))) folder = folder.Parent;
            return System.IO.Path.Combine(folder.FullName, "sample-measurements");
        }
    }

    public string In(string name) => System.IO.Path.Combine(Path, name);

    public void Dispose() => Directory.Delete(Path, true);
}
