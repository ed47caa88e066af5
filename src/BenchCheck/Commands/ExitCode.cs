namespace BenchCheck.Commands;

/// <summary>Exit codes of the program.</summary>
internal static class ExitCode
{
    public const int Agrees = 0;

    /// <summary>At least one board disagrees or is undecided.</summary>
    public const int Disagrees = 1;

    /// <summary>Unusable input, or a command line that was not understood.</summary>
    public const int Unusable = 2;

    /// <summary>A fault of the program itself.</summary>
    public const int Fault = 3;

    /// <summary>Stopped by Ctrl-C, as a shell expects it.</summary>
    public const int Cancelled = 130;
}
