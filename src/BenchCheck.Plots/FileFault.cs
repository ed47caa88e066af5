using BenchCheck.Core.Quantities;

namespace BenchCheck.Plots;

/// <summary>Why a file could not be written.</summary>
/// <param name="Path">as the user gave it</param>
/// <param name="Message">what is wrong and what to do</param>
public sealed record FileFault(string Path, string Message)
{
    public override string ToString() => $"{TextFault.Quote(Path).Trim('"')}: {Message}";
}
