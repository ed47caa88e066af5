using System.Globalization;
using System.Text;

namespace BenchCheck.Records;

/// <summary>One check as it is handed to the log: what went in, what came out.</summary>
/// <param name="FiledAt">when, any offset; kept in UTC to the millisecond</param>
/// <param name="Program">name and version of the program that checked</param>
/// <param name="BoardTitle">title of the board</param>
/// <param name="Serial">which board it was; null when nobody said</param>
/// <param name="Verdict">agrees, disagrees or undecided</param>
/// <param name="Settings">settings of the check, JSON</param>
/// <param name="Result">result of the check, JSON</param>
/// <param name="BoardFile">the board file, byte for byte</param>
/// <param name="ReadingsFile">the readings file, byte for byte</param>
/// <param name="RatesFile">the file of fault rates, when there was one</param>
/// <param name="Plot">picture of readings and residuals, SVG; null for none</param>
public sealed record Filing(
    DateTimeOffset FiledAt, string Program, string BoardTitle, string? Serial, string Verdict, string Settings, string Result,
    ReadOnlyMemory<byte> BoardFile, ReadOnlyMemory<byte> ReadingsFile, ReadOnlyMemory<byte>? RatesFile = null, ReadOnlyMemory<byte>? Plot = null)
{
    internal string FiledText => TimeText(FiledAt);

    /// <summary>A time as it is kept: text of one width, so that it sorts as time does.</summary>
    internal static string TimeText(DateTimeOffset time) => time.UtcDateTime.ToString("yyyy-MM-dd'T'HH:mm:ss.fff'Z'", CultureInfo.InvariantCulture);

    /// <summary>Text as every database can keep it: NUL and half surrogates become U+FFFD.</summary>
    internal static string Storable(string text) => Encoding.UTF8.GetString(Encoding.UTF8.GetBytes(text)).Replace('\0', '\uFFFD');
}
