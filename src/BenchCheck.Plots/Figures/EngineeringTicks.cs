using BenchCheck.Core.Quantities;
using ScottPlot;
using ScottPlot.TickGenerators;

namespace BenchCheck.Plots.Figures;

/// <summary>Numbers of an axis in engineering notation, with as many digits as the step between them needs.</summary>
internal sealed class EngineeringTicks(Unit unit) : ITickGenerator
{
    private readonly NumericAutomatic places = new() { MinorTickGenerator = new EvenlySpacedMinorTickGenerator(1) };

    public Tick[] Ticks { get; set; } = [];

    public int MaxTickCount { get => places.MaxTickCount; set => places.MaxTickCount = value; }

    public void Regenerate(CoordinateRange range, Edge edge, PixelLength size, Paint paint, LabelStyle labelStyle)
    {
        places.Regenerate(range, edge, size, paint, labelStyle);
        double[] major = [.. places.Ticks.Where(t => t.IsMajor).Select(t => t.Position)];
        var step = major.Length > 1 ? major[1] - major[0] : Math.Abs(range.Span);
        Ticks = [.. major.Select(at => Tick.Major(at, Label(at, step)))];
    }

    private string Label(double value, double step)
    {
        // What is left of zero after adding steps up.
        if (Math.Abs(value) < step / 1000) value = 0;
        var digits = value == 0 || !(step > 0) ? 1 : Magnitude(value) - Magnitude(step) + 1;
        return EngineeringNotation.Format(value, unit, Math.Clamp(digits, 1, 15));
    }

    /// <summary>Power of ten of the first digit; a hair of rounding below it counts as it.</summary>
    private static int Magnitude(double value) => (int)Math.Floor(Math.Log10(Math.Abs(value)) + 1e-9);
}
