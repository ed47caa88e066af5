using BenchCheck.Core.Checking;
using BenchCheck.Plots.Typefaces;

namespace BenchCheck.Plots.Figures;

/// <summary>What stands over a picture: the board, and what was found.</summary>
/// <param name="Title">board and serial</param>
/// <param name="Finding">a sentence; empty for none</param>
/// <param name="Mark">of the finding; null for none</param>
internal sealed record Heading(string Title, string Finding, Mark? Mark)
{
    private const float TitleSize = 18;
    private const float FindingSize = 14;
    private const float LineSpacing = 1.35f;
    private const float MarkRoom = 20;
    private const int MostLines = 2;

    public static Heading Of(CheckResult result) => new(BoardAndSerial(result), $"{Words.Of(result.Verdict)}: {FigureText.Clean(result.Reason)}", Mark.Of(result.Verdict));

    public static string BoardAndSerial(CheckResult result) =>
        FigureText.Clean(result.BoardTitle) + (result.Serial is null ? "" : $", serial {FigureText.Clean(result.Serial)}");

    /// <summary>Sets the heading below <paramref name="top"/>.</summary>
    /// <returns>where the room below it starts</returns>
    public float Place(ICollection<FigureItem> items, float left, float top, float width)
    {
        var y = top;
        foreach (var line in FigureText.Lines(Title, width, TitleSize, FigureText.Bold, MostLines))
        {
            items.Add(new TextItem(line, left, y + TitleSize * LineSpacing / 2, TitleSize, Ink.Text, Weight: FigureText.Bold));
            y += TitleSize * LineSpacing;
        }

        var indent = Mark is null ? 0 : MarkRoom;
        if (Mark is not null) items.Add(new MarkItem(Mark, left + MarkRoom / 3, y + FindingSize * LineSpacing / 2, FindingSize * 0.85f));
        foreach (var line in FigureText.Lines(Finding, width - indent, FindingSize, FigureText.Regular, MostLines))
        {
            items.Add(new TextItem(line, left + indent, y + FindingSize * LineSpacing / 2, FindingSize, Ink.Text));
            y += FindingSize * LineSpacing;
        }

        return y;
    }
}
