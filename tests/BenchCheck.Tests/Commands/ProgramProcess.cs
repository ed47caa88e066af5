using System.Diagnostics;
using System.Runtime.CompilerServices;
using BenchCheck.Commands;

namespace BenchCheck.Tests.Commands;

/// <summary>The program as a process of its own, with settings and data folders of its own.</summary>
internal sealed class ProgramProcess(string folder)
{
    /// <summary>No test sees the settings of whoever runs it.</summary>
    [ModuleInitializer]
    internal static void LeaveTheUsersSettingsAlone() => SetFolders(Environment.SetEnvironmentVariable, Directory.CreateTempSubdirectory("bench tests ").FullName);

    public (int Exit, string Output, string Error) Run(params string[] args)
    {
        var start = new ProcessStartInfo("dotnet") { RedirectStandardOutput = true, RedirectStandardError = true, RedirectStandardInput = true, WorkingDirectory = folder };
        start.ArgumentList.Add(typeof(BenchCheckCommand).Assembly.Location);
        foreach (var arg in args) start.ArgumentList.Add(arg);
        SetFolders((name, value) => start.Environment[name] = value, folder);
        start.Environment.Remove("BENCHCHECK_LOG");
        using var process = Process.Start(start)!;
        var error = process.StandardError.ReadToEndAsync();
        var output = process.StandardOutput.ReadToEnd();
        process.WaitForExit();
        return (process.ExitCode, output, error.GetAwaiter().GetResult());
    }

    private static void SetFolders(Action<string, string> set, string root)
    {
        set("XDG_CONFIG_HOME", Path.Combine(root, "config"));
        set("XDG_DATA_HOME", Path.Combine(root, "data"));
    }
}
