using System.Reflection;
using System.Text;
using BenchCheck.Core.Checking;
using BenchCheck.Files;
using BenchCheck.Plots;
using BenchCheck.Records;

namespace BenchCheck.Commands.Log;

/// <summary>Files checks of one board file and one readings file as they come.</summary>
internal sealed class CheckFiling : IDisposable
{
    private readonly BenchLog log;
    private readonly string settings;
    private readonly byte[] board;
    private readonly byte[] readings;
    private readonly byte[]? rates;

    /// <exception cref="IOException">the log or one of the files cannot be used</exception>
    public CheckFiling(LogPlace place, CheckSettings settings, bool skipBadRows, string boardPath, string readingsPath, string? ratesPath)
    {
        this.settings = FiledSettings.Text(settings, skipBadRows);
        board = File.ReadAllBytes(boardPath);
        readings = File.ReadAllBytes(readingsPath);
        rates = ratesPath is null ? null : File.ReadAllBytes(ratesPath);
        log = BenchLog.Open(place);
    }

    /// <summary>Name and version of this program, as records show it.</summary>
    public static string Program { get; } =
        "benchcheck " + (Assembly.GetExecutingAssembly().GetCustomAttribute<AssemblyInformationalVersionAttribute>()?.InformationalVersion ?? "");

    /// <exception cref="BenchLogException">it could not be filed</exception>
    public LogEntry Add(CheckResult result) => log.Append(new Filing(
        DateTimeOffset.UtcNow, Program, result.BoardTitle, result.Serial, ResultWords.Of(result.Verdict), settings, ResultJson.Line(result), board, readings,
        rates is null ? default(ReadOnlyMemory<byte>?) : rates, Encoding.UTF8.GetBytes(ReadingPlot.Of(result).ToSvg())))[0];

    public void Dispose() => log.Dispose();
}
