using System.Globalization;
using System.Text;
using BenchCheck.Core.Quantities;

namespace BenchCheck.Files;

/// <summary>One thing wrong, or worth a word, in a file: where, what was read, what was expected, what to do.</summary>
/// <param name="File">name as the user gave it</param>
/// <param name="Line">counted from 1; 0 when the file as a whole is meant</param>
/// <param name="Column">counted from 1; 0 when the whole line is meant</param>
/// <param name="IsError">false for a warning, with which the file can be used</param>
/// <param name="Read">what stands there</param>
/// <param name="Expected">what should stand there; null where <paramref name="Read"/> says it all</param>
/// <param name="Hint">what to do; null when that is plain</param>
public sealed record FileProblem(string File, int Line, int Column, bool IsError, string Read, string? Expected = null, string? Hint = null)
{
    /// <summary>One line: <c>board.toml:7:12: error: kind "resistro", expected resistor, … (did you mean "resistor"?)</c>.</summary>
    public override string ToString()
    {
        var text = new StringBuilder(TextFault.Quote(File).Trim('"'));
        if (Line > 0) text.Append(CultureInfo.InvariantCulture, $":{Line}");
        if (Line > 0 && Column > 0) text.Append(CultureInfo.InvariantCulture, $":{Column}");
        text.Append(IsError ? ": error: " : ": warning: ").Append(Read);
        if (Expected is not null) text.Append("; expected ").Append(Expected);
        if (Hint is not null) text.Append(" (").Append(Hint).Append(')');
        return text.ToString();
    }
}
