using System.Collections.Immutable;
using SkiaSharp;

namespace BenchCheck.Plots.Figures;

/// <summary>A finished picture of a fixed size.</summary>
/// <remarks>The same figure gives the same bytes each time.</remarks>
public sealed class Figure
{
    /// <summary>Pixels of a PNG to each pixel of the layout, so that it is sharp on paper too.</summary>
    public const int PngScale = 2;

    private readonly ImmutableArray<FigureItem> items;

    internal Figure(int width, int height, string title, string description, ImmutableArray<FigureItem> items)
    {
        Width = width;
        Height = height;
        Title = title;
        Description = description;
        this.items = items;
    }

    /// <summary>Width of the layout in pixels; that of an SVG.</summary>
    public int Width { get; }

    public int Height { get; }

    /// <summary>What the picture is of, for those who cannot see it.</summary>
    public string Title { get; }

    /// <summary>What the picture shows, in a sentence, for those who cannot see it.</summary>
    public string Description { get; }

    /// <summary>PNG of <see cref="PngScale"/> pixels to one of the layout.</summary>
    public byte[] ToPng()
    {
        using var surface = SKSurface.Create(new SKImageInfo(Width * PngScale, Height * PngScale, SKColorType.Rgba8888, SKAlphaType.Premul));
        surface.Canvas.Scale(PngScale);
        Draw(surface.Canvas, items);
        using var pixels = surface.PeekPixels();
        using var data = pixels!.Encode(new SKPngEncoderOptions(SKPngEncoderFilterFlags.Sub, 6));
        return data!.ToArray();
    }

    /// <summary>SVG with real text.</summary>
    /// <param name="idPrefix">put before every id in it, so that several can stand on one page</param>
    public string ToSvg(string idPrefix = "figure-")
    {
        using var stream = new MemoryStream();
        // The drawing library writes only letters that its own font has; names from files may be in any script.
        using (var canvas = SKSvgCanvas.Create(new SKRect(0, 0, Width, Height), stream)) Draw(canvas, items.Where(i => i is not TextItem));
        stream.Position = 0;
        return SvgDocument.Finished(stream, this, items.OfType<TextItem>(), idPrefix);
    }

    /// <summary>Writes the picture whole or not at all, as PNG or SVG by the name's ending.</summary>
    /// <returns>null when written, else what is wrong</returns>
    public FileFault? Save(string path)
    {
        ArgumentNullException.ThrowIfNull(path);
        return Path.GetExtension(path).ToUpperInvariant() switch
        {
            ".PNG" => WholeFile.Write(path, ToPng()),
            ".SVG" => WholeFile.Write(path, System.Text.Encoding.UTF8.GetBytes(ToSvg())),
            _ => new FileFault(path, "a picture is written as .png or .svg; give the file such a name"),
        };
    }

    private static void Draw(SKCanvas canvas, IEnumerable<FigureItem> shown)
    {
        canvas.Clear(Ink.Paper.ToSKColor());
        foreach (var item in shown) item.Draw(canvas);
    }
}
