using BenchCheck.Commands;
using Streams = BenchCheck.Commands.Terminal;

namespace BenchCheck.Tests.Commands;

/// <summary>The command line run as a user runs it, in a folder of its own.</summary>
internal sealed class CommandLine : IDisposable
{
    public string Folder { get; } = Directory.CreateTempSubdirectory("bench ").FullName;

    public string Output { get; private set; } = "";

    public string Error { get; private set; } = "";

    public async Task<int> Run(params string[] args)
    {
        using var output = new StringWriter();
        using var error = new StringWriter();
        var code = await BenchCheckCommand.RunAsync(args, Streams.Of(output, error, true));
        (Output, Error) = (output.ToString(), error.ToString());
        return code;
    }

    public string File(string name, string text)
    {
        var path = Path.Combine(Folder, name);
        System.IO.File.WriteAllText(path, text);
        return path;
    }

    public void Dispose() => Directory.Delete(Folder, true);
}
