#pragma warning disable CA1050 // the runtime asks for this name, outside any namespace
/// <summary>What the runtime starts before the program when DOTNET_STARTUP_HOOKS names this assembly: throws where nobody catches, once a file asks for it.</summary>
internal static class StartupHook
{
    public static void Initialize()
    {
        if (Environment.GetEnvironmentVariable("BENCHCHECK_CRASH_WHEN") is not { Length: > 0 } file) return;
        new Thread(() =>
        {
            while (!File.Exists(file)) Thread.Sleep(20);
            throw new InvalidOperationException("thrown on purpose");
        })
        { IsBackground = true }.Start();
    }
}
#pragma warning restore CA1050
