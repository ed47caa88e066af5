namespace BenchCheck.Files;

/// <summary>Text cells that a spreadsheet would take for a formula.</summary>
/// <remarks>
/// A cell that begins with = + - @, a tab or a line break, also behind apostrophes, is written with one apostrophe more, which a spreadsheet
/// shows as text; reading takes exactly that one off again, so every text comes back as it was.
/// </remarks>
internal static class CellText
{
    /// <summary>The text as it is safe in a cell.</summary>
    public static string Protect(string text) => IsFormulaLike(text) ? "'" + text : text;

    /// <summary>The text behind a cell.</summary>
    public static string Restore(string cell) => cell.StartsWith('\'') && IsFormulaLike(cell[1..]) ? cell[1..] : cell;

    private static bool IsFormulaLike(string text)
    {
        var behind = text.AsSpan().TrimStart('\'').TrimStart(' ');
        return !behind.IsEmpty && behind[0] is '=' or '+' or '-' or '@' or '\t' or '\r' or '\n';
    }
}
