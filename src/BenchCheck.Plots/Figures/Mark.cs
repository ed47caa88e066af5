using BenchCheck.Core.Checking;
using ScottPlot;
using SkiaSharp;

namespace BenchCheck.Plots.Figures;

/// <summary>The marks of the pictures: each meaning has a shape of its own that is still told apart in grey and at a few pixels.</summary>
internal sealed class Mark : IMarker
{
    /// <summary>A value that is in tolerance: a disc.</summary>
    public static readonly Mark In = new(Ink.In, Disc);

    /// <summary>A doubtful value: a hollow diamond.</summary>
    public static readonly Mark Doubtful = new(Ink.Doubtful, HollowDiamond);

    /// <summary>A value out of tolerance: a square with a cross cut out of it.</summary>
    public static readonly Mark Out = new(Ink.Out, CutSquare);

    /// <summary>An estimate that the readings determined.</summary>
    public static readonly Mark Determined = new(Ink.Limit, Disc);

    /// <summary>An estimate that they determined in part.</summary>
    public static readonly Mark PartlyDetermined = new(Ink.Limit, HalfDisc);

    /// <summary>An estimate that stands where the parts list put it.</summary>
    public static readonly Mark Undetermined = new(Ink.Limit, Ring);

    /// <summary>The median of many values: an upright bar.</summary>
    public static readonly Mark Middle = new(Ink.Text, Upright);

    /// <summary>A value far from the many: a small ring.</summary>
    public static readonly Mark Outlier = new(Ink.Out, (canvas, paint, centre, half) => Ring(canvas, paint, centre, half * 0.7f));

    /// <summary>Says that a value lies beyond the left edge.</summary>
    public static readonly Mark BeyondLeft = new(Ink.Text, (canvas, paint, centre, half) => Triangle(canvas, paint, centre, -half));

    /// <summary>Says that a value lies beyond the right edge.</summary>
    public static readonly Mark BeyondRight = new(Ink.Text, Triangle);

    /// <summary>Says that a value lies above the top edge.</summary>
    public static readonly Mark BeyondTop = new(Ink.Out, Wedge);

    /// <summary>Says that a value lies below the bottom edge.</summary>
    public static readonly Mark BeyondBottom = new(Ink.Out, (canvas, paint, centre, half) => Wedge(canvas, paint, centre, -half));

    private readonly Action<SKCanvas, SKPaint, SKPoint, float> draw;

    private Mark(Color color, Action<SKCanvas, SKPaint, SKPoint, float> draw)
    {
        Color = color;
        this.draw = draw;
    }

    public Color Color { get; }

    public static Mark Of(ReadingVerdict verdict) => verdict switch
    {
        ReadingVerdict.In => In,
        ReadingVerdict.Doubtful => Doubtful,
        _ => Out,
    };

    public static Mark Of(BoardVerdict verdict) => verdict switch
    {
        BoardVerdict.Agrees => In,
        BoardVerdict.Undecided => Doubtful,
        _ => Out,
    };

    public static Mark Of(Determination determined) => determined switch
    {
        Determination.Yes => Determined,
        Determination.Partly => PartlyDetermined,
        _ => Undetermined,
    };

    public void Render(SKCanvas canvas, Paint paint, Pixel center, float size, MarkerStyle markerStyle) => Draw(canvas, center.ToSKPoint(), size);

    /// <param name="size">width and height in pixels</param>
    public void Draw(SKCanvas canvas, SKPoint centre, float size)
    {
        using var paint = new SKPaint { IsAntialias = true, Color = Color.ToSKColor(), StrokeWidth = size / 5 };
        draw(canvas, paint, centre, size / 2);
    }

    private static void Disc(SKCanvas canvas, SKPaint paint, SKPoint centre, float half) => canvas.DrawCircle(centre, half * 0.9f, paint);

    private static void Ring(SKCanvas canvas, SKPaint paint, SKPoint centre, float half)
    {
        Paper(canvas, paint, () => canvas.DrawCircle(centre, half * 0.8f, paint));
        paint.Style = SKPaintStyle.Stroke;
        canvas.DrawCircle(centre, half * 0.8f, paint);
    }

    private static void HalfDisc(SKCanvas canvas, SKPaint paint, SKPoint centre, float half)
    {
        Ring(canvas, paint, centre, half);
        paint.Style = SKPaintStyle.Fill;
        using var lower = new SKPath();
        lower.AddArc(new SKRect(centre.X - half * 0.8f, centre.Y - half * 0.8f, centre.X + half * 0.8f, centre.Y + half * 0.8f), 0, 180);
        lower.Close();
        canvas.DrawPath(lower, paint);
    }

    private static void HollowDiamond(SKCanvas canvas, SKPaint paint, SKPoint centre, float half)
    {
        using var diamond = Polygon((centre.X, centre.Y - half), (centre.X + half, centre.Y), (centre.X, centre.Y + half), (centre.X - half, centre.Y));
        Paper(canvas, paint, () => canvas.DrawPath(diamond, paint));
        paint.Style = SKPaintStyle.Stroke;
        canvas.DrawPath(diamond, paint);
    }

    private static void CutSquare(SKCanvas canvas, SKPaint paint, SKPoint centre, float half)
    {
        canvas.DrawRect(centre.X - half, centre.Y - half, 2 * half, 2 * half, paint);
        var arm = half * 0.62f;
        Paper(canvas, paint, () =>
        {
            paint.Style = SKPaintStyle.Stroke;
            canvas.DrawLine(centre.X - arm, centre.Y - arm, centre.X + arm, centre.Y + arm, paint);
            canvas.DrawLine(centre.X - arm, centre.Y + arm, centre.X + arm, centre.Y - arm, paint);
        });
    }

    private static void Triangle(SKCanvas canvas, SKPaint paint, SKPoint centre, float half)
    {
        using var triangle = Polygon((centre.X - half, centre.Y - Math.Abs(half)), (centre.X + half, centre.Y), (centre.X - half, centre.Y + Math.Abs(half)));
        canvas.DrawPath(triangle, paint);
    }

    private static void Wedge(SKCanvas canvas, SKPaint paint, SKPoint centre, float half)
    {
        using var wedge = Polygon((centre.X - Math.Abs(half), centre.Y + half), (centre.X, centre.Y - half), (centre.X + Math.Abs(half), centre.Y + half));
        canvas.DrawPath(wedge, paint);
    }

    private static void Upright(SKCanvas canvas, SKPaint paint, SKPoint centre, float half) => canvas.DrawRect(centre.X - 1.5f, centre.Y - half, 3, 2 * half, paint);

    /// <summary>Draws in the colour of the paper, then takes the mark's own up again.</summary>
    private static void Paper(SKCanvas canvas, SKPaint paint, Action action)
    {
        var color = paint.Color;
        paint.Color = Ink.Paper.ToSKColor();
        action();
        paint.Color = color;
    }

    private static SKPath Polygon(params ReadOnlySpan<(float X, float Y)> corners)
    {
        var path = new SKPath();
        path.MoveTo(corners[0].X, corners[0].Y);
        foreach (var (x, y) in corners[1..]) path.LineTo(x, y);
        path.Close();
        return path;
    }
}
