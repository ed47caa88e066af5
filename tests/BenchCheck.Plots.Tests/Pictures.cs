using System.Xml.Linq;
using BenchCheck.Plots.Figures;
using SkiaSharp;

namespace BenchCheck.Plots.Tests;

/// <summary>What a picture says, read back from its files.</summary>
internal static class Pictures
{
    private static readonly XNamespace Svg = "http://www.w3.org/2000/svg";

    public static string[] Texts(this Figure figure) => [.. XDocument.Parse(figure.ToSvg()).Descendants(Svg + "text").Select(t => t.Value)];

    public static SKBitmap Pixels(this Figure figure) => SKBitmap.Decode(figure.ToPng());
}
