using BenchCheck.Plots.Typefaces;

namespace BenchCheck.Plots.Figures;

/// <summary>A column of text beside the panels of a figure in rows, set flush right as numbers are.</summary>
internal sealed record RowColumn(string Header, IReadOnlyList<string> Texts)
{
    public const float Size = 12.5f;

    /// <summary>Room of the widest text, in pixels.</summary>
    public float Width => Texts.Append(Header).Max(t => FigureText.Width(t, Size, FigureText.Regular));
}
