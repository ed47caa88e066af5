using System.Collections.Immutable;
using ScottPlot;

namespace BenchCheck.Plots.Figures;

/// <summary>The colours of every picture: dark enough on white to be told apart in grey; shape carries the meaning, colour repeats it.</summary>
internal static class Ink
{
    public static readonly Color Paper = new("#FFFFFF");
    public static readonly Color Text = new("#1B2430");
    public static readonly Color Quiet = new("#566171");
    public static readonly Color Grid = new("#DCE1E8");
    public static readonly Color Frame = new("#9AA5B4");

    /// <summary>Where a value is expected to lie.</summary>
    public static readonly Color Expected = new("#E9EFF6");

    /// <summary>A range: the predicted band, a coverage interval, the box of a batch.</summary>
    public static readonly Color Band = new("#9DB6D3");

    public static readonly Color Limit = new("#3D5A80");
    public static readonly Color In = new("#1F6B4F");
    public static readonly Color Doubtful = new("#8A5A00");
    public static readonly Color Out = new("#B3261E");

    /// <summary>Each colour with what stands for it on a dark page.</summary>
    public static readonly ImmutableArray<(Color OnPaper, Color OnDark)> OnDarkPages =
    [
        (Paper, new("#161B22")), (Text, new("#E6EAF0")), (Quiet, new("#A9B4C2")), (Grid, new("#2C343F")), (Frame, new("#6B7788")), (Expected, new("#222C39")),
        (Band, new("#4A6C94")), (Limit, new("#A3C1E6")), (In, new("#6FCBA6")), (Doubtful, new("#F0B44C")), (Out, new("#FF8A80")),
    ];
}
