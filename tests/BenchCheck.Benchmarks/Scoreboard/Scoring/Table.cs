using System.Globalization;

namespace BenchCheck.Benchmarks.Scoreboard.Scoring;

/// <summary>A table of text on the console: the first column to the left, the others to the right.</summary>
internal sealed class Table(params string[] head)
{
    private readonly List<string[]> rows = [head];

    public Table Row(params string[] cells)
    {
        rows.Add(cells);
        return this;
    }

    public void Write(TextWriter output, string title)
    {
        output.WriteLine();
        output.WriteLine(title);
        var widths = Enumerable.Range(0, rows.Max(r => r.Length)).Select(c => rows.Max(r => c < r.Length ? r[c].Length : 0)).ToArray();
        foreach (var row in rows)
            output.WriteLine("  " + string.Join("  ", row.Select((cell, c) => c == 0 || (c == row.Length - 1 && cell.Contains(' ')) ? cell.PadRight(widths[c]) : cell.PadLeft(widths[c]))).TrimEnd());
    }

    /// <summary>"93.4 %"; a dash when there is nothing to count.</summary>
    public static string Share(int part, int whole) =>
        whole == 0 ? "-" : string.Create(CultureInfo.InvariantCulture, $"{100.0 * part / whole:F1} %");

    public static string Share<T>(IReadOnlyCollection<T> all, Func<T, bool> holds) => Share(all.Count(holds), all.Count);
}
