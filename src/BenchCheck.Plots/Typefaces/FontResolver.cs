using ScottPlot;
using SkiaSharp;

namespace BenchCheck.Plots.Typefaces;

/// <summary>Hands the carried typeface to the plotting library.</summary>
internal sealed class FontResolver : IFontResolver
{
    public SKTypeface? CreateTypeface(string fontName, FontWeight weight, FontSlant slant, FontSpacing spacing) =>
        fontName == CarriedFaces.Family ? CarriedFaces.Nearest((int)weight) : null;

    public SKTypeface? CreateTypeface(string fontName, bool bold, bool italic) =>
        fontName == CarriedFaces.Family ? CarriedFaces.Nearest(bold ? FigureText.Bold : FigureText.Regular) : null;
}
