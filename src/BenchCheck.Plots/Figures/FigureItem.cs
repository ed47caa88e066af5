using BenchCheck.Plots.Typefaces;
using ScottPlot;
using SkiaSharp;

namespace BenchCheck.Plots.Figures;

/// <summary>Something that stands on a figure; positions are pixels from its top left corner.</summary>
internal abstract record FigureItem
{
    public abstract void Draw(SKCanvas canvas);
}

/// <summary>A plot with its axes.</summary>
/// <param name="Place">of the plot with the room for its axes</param>
internal sealed record PlotItem(Plot Plot, PixelRect Place) : FigureItem
{
    public override void Draw(SKCanvas canvas)
    {
        // The library clears all that it may draw on.
        canvas.Save();
        canvas.ClipRect(Place.ToSKRect());
        Plot.Render(canvas, Place);
        canvas.Restore();
    }
}

/// <summary>One line of text.</summary>
/// <param name="X">left end, middle or right end, by <paramref name="Align"/></param>
/// <param name="Y">vertical middle of the small letters</param>
internal sealed record TextItem(string Text, float X, float Y, float Size, Color Color, SKTextAlign Align = SKTextAlign.Left, int Weight = FigureText.Regular) : FigureItem
{
    /// <summary>Half the height of small letters, as a fraction of the size.</summary>
    private const float MiddleAboveBaseline = 0.36f;

    public float Width => FigureText.Width(Text, Size, Weight);

    public float Left => Align switch { SKTextAlign.Center => X - Width / 2, SKTextAlign.Right => X - Width, _ => X };

    public float Baseline => Y + MiddleAboveBaseline * Size;

    public override void Draw(SKCanvas canvas)
    {
        using var font = FigureText.Font(Text, Size, Weight);
        using var paint = new SKPaint { IsAntialias = true, Color = Color.ToSKColor() };
        canvas.DrawText(Text, Left, Baseline, SKTextAlign.Left, font, paint);
    }
}

/// <summary>A mark, as in a key.</summary>
internal sealed record MarkItem(Mark Mark, float X, float Y, float Size) : FigureItem
{
    public override void Draw(SKCanvas canvas) => Mark.Draw(canvas, new SKPoint(X, Y), Size);
}

/// <summary>A filled rectangle.</summary>
internal sealed record RectItem(float X, float Y, float Width, float Height, Color Color) : FigureItem
{
    public override void Draw(SKCanvas canvas)
    {
        using var paint = new SKPaint { Color = Color.ToSKColor() };
        canvas.DrawRect(X, Y, Width, Height, paint);
    }
}
