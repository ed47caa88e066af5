using System.Globalization;

namespace BenchCheck.Commands;

/// <summary>Names for several files of which the user named the first.</summary>
internal static class NumberedPath
{
    /// <param name="number">from zero: each further file gets its number before the ending, so that none overwrites another</param>
    public static string Of(string path, int number) => number == 0
        ? path
        : Path.Combine(Path.GetDirectoryName(path) ?? "", string.Create(CultureInfo.InvariantCulture, $"{Path.GetFileNameWithoutExtension(path)}-{number + 1}{Path.GetExtension(path)}"));
}
