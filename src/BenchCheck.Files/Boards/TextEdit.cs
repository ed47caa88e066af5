using System.Text;

namespace BenchCheck.Files;

/// <summary>A stretch of a text and what is to stand there instead.</summary>
internal readonly record struct TextEdit(int Offset, int Length, string Text)
{
    /// <summary>Applies edits that do not overlap.</summary>
    public static string Apply(string text, IEnumerable<TextEdit> edits)
    {
        var result = new StringBuilder(text);
        foreach (var edit in edits.OrderByDescending(e => e.Offset)) result.Remove(edit.Offset, edit.Length).Insert(edit.Offset, edit.Text);
        return result.ToString();
    }
}
