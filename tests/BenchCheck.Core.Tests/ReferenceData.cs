using System.Globalization;

namespace BenchCheck.Core.Tests;

/// <summary>Published numbers kept beside the tests in reference-data; the first line of each file names its source.</summary>
internal static class ReferenceData
{
    /// <summary>Rows of a file, without its source line and its header.</summary>
    public static List<string[]> Rows(string name)
    {
        using var stream = typeof(ReferenceData).Assembly.GetManifestResourceStream(name) ?? throw new InvalidOperationException($"no reference data {name}");
        using var reader = new StreamReader(stream);
        var lines = reader.ReadToEnd().Split('\n', StringSplitOptions.RemoveEmptyEntries | StringSplitOptions.TrimEntries);
        return [.. lines.Skip(2).Select(line => line.Split(','))];
    }

    public static double Number(string text) => double.Parse(text, NumberStyles.Float, CultureInfo.InvariantCulture);

    /// <summary>Every field of a file as a number.</summary>
    public static double[][] Numbers(string name) => [.. Rows(name).Select(row => row.Select(Number).ToArray())];

    /// <summary>Significant digits that agree: −log₁₀ of the relative error (McCullough, The American Statistician 52 (1998) 358), 16 at most.</summary>
    public static double Digits(double value, double published)
    {
        var error = published == 0 ? Math.Abs(value) : Math.Abs(value - published) / Math.Abs(published);
        return error == 0 ? 16 : Math.Min(16, -Math.Log10(error));
    }
}
