using BenchCheck.Core.Quantities;

namespace BenchCheck.Files;

/// <summary>Finds what a mistyped name was probably meant to be.</summary>
internal static class NearMiss
{
    private const int LongestName = 40;
    private const int MostListed = 12;

    /// <summary>"did you mean "C1"?" for the closest known names; null when none is close.</summary>
    public static string? Suggest(string name, IEnumerable<string> known)
    {
        if (name.Length is 0 or > LongestName) return null;
        var limit = Math.Max(1, name.Length / 3);
        var close = known.Where(k => k.Length <= LongestName)
            .Select(k => (Name: k, Distance: Distance(name.ToUpperInvariant(), k.ToUpperInvariant())))
            .Where(x => x.Distance <= limit && x.Distance < Math.Max(2, x.Name.Length))
            .OrderBy(x => x.Distance).ToList();
        if (close.Count == 0) return null;
        var best = close.TakeWhile(x => x.Distance == close[0].Distance).Take(3).Select(x => TextFault.Quote(x.Name));
        return $"did you mean {string.Join(" or ", best)}?";
    }

    /// <summary>The known names as a sentence lists them, the long tail cut off with its count.</summary>
    public static string List(IEnumerable<string> known)
    {
        var all = known.ToList();
        var shown = string.Join(", ", all.Take(MostListed).Select(k => TextFault.Quote(k).Trim('"')));
        return all.Count > MostListed ? $"{shown} or {all.Count - MostListed} more" : shown;
    }

    /// <summary>Insertions, deletions, replacements and exchanges of neighbours between two names (optimal string alignment).</summary>
    public static int Distance(ReadOnlySpan<char> a, ReadOnlySpan<char> b)
    {
        Span<int> before = stackalloc int[b.Length + 1];
        Span<int> previous = stackalloc int[b.Length + 1];
        Span<int> current = stackalloc int[b.Length + 1];
        for (var j = 0; j <= b.Length; j++) previous[j] = j;
        for (var i = 1; i <= a.Length; i++)
        {
            current[0] = i;
            for (var j = 1; j <= b.Length; j++)
            {
                var cost = a[i - 1] == b[j - 1] ? 0 : 1;
                current[j] = Math.Min(Math.Min(current[j - 1], previous[j]) + 1, previous[j - 1] + cost);
                if (i > 1 && j > 1 && a[i - 1] == b[j - 2] && a[i - 2] == b[j - 1]) current[j] = Math.Min(current[j], before[j - 2] + 1);
            }

            previous.CopyTo(before);
            current.CopyTo(previous);
        }

        return previous[b.Length];
    }
}
