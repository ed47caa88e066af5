using BenchCheck.Plots.Typefaces;
using ScottPlot;

namespace BenchCheck.Plots.Figures;

/// <summary>One entry of the key below a picture: a sign and what it means.</summary>
internal abstract record KeyEntry(string Text)
{
    /// <summary>Room of the sign, in pixels.</summary>
    public const float SignWidth = 22;

    public abstract FigureItem Sign(float x, float y);
}

internal sealed record MarkKey(Mark Mark, string Text) : KeyEntry(Text)
{
    public override FigureItem Sign(float x, float y) => new MarkItem(Mark, x + SignWidth / 2, y, 11);
}

/// <summary>A bar of some height, or with a height of a pixel or two a line.</summary>
internal sealed record BarKey(Color Color, float Height, string Text) : KeyEntry(Text)
{
    public override FigureItem Sign(float x, float y) => new RectItem(x, y - Height / 2, SignWidth, Height, Color);
}

/// <summary>An upright line across the rows.</summary>
internal sealed record UprightKey(Color Color, float Width, string Text) : KeyEntry(Text)
{
    public override FigureItem Sign(float x, float y) => new RectItem(x + (SignWidth - Width) / 2, y - 8, Width, 16, Color);
}

/// <summary>Sets key entries in lines as a paragraph.</summary>
internal static class Key
{
    private const float Size = 12;
    private const float LineHeight = 22;
    private const float SignGap = 6;
    private const float EntryGap = 20;

    /// <returns>where the room below the key starts</returns>
    public static float Place(ICollection<FigureItem> items, IReadOnlyList<KeyEntry> entries, float left, float top, float right)
    {
        var x = left;
        var y = top + LineHeight / 2;
        foreach (var entry in entries)
        {
            var width = KeyEntry.SignWidth + SignGap + FigureText.Width(entry.Text, Size, FigureText.Regular);
            if (x > left && x + width > right)
            {
                x = left;
                y += LineHeight;
            }

            items.Add(entry.Sign(x, y));
            items.Add(new TextItem(entry.Text, x + KeyEntry.SignWidth + SignGap, y, Size, Ink.Quiet));
            x += width + EntryGap;
        }

        return entries.Count == 0 ? top : y + LineHeight / 2;
    }
}
