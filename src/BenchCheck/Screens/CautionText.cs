using System.Collections.Immutable;
using BenchCheck.Core.Checking;

namespace BenchCheck.Screens;

/// <summary>The cautions as they stand on the screen: the usual ones, and those of the board on the bench.</summary>
internal static class CautionText
{
    public static ImmutableArray<ScreenLine> Lines(BenchSession? session, int width)
    {
        var lines = ImmutableArray.CreateBuilder<ScreenLine>();
        var cautions = session?.Result?.Cautions ?? session?.Prediction?.Cautions ?? Cautions.Usual;
        foreach (var caution in cautions)
        {
            var isHazard = caution.StartsWith("HAZARD", StringComparison.Ordinal);
            lines.AddRange(ScreenLine.Paragraph(caution, width, isHazard ? Tone.Bad : Tone.Plain, "! "));
        }

        lines.Add(ScreenLine.Empty);
        lines.AddRange(ScreenLine.Paragraph(
            "This program judges readings against a parts list. It does not know whether a board is safe to touch: what it calls \"in\" can still be live.", width));
        foreach (var assumed in session?.Result?.Assumed ?? session?.Bench.Assumed ?? []) lines.AddRange(ScreenLine.Paragraph(assumed, width, Tone.Dim, "Assumed: "));
        foreach (var remark in session?.Result?.Remarks ?? []) lines.AddRange(ScreenLine.Paragraph(remark, width, Tone.Doubt, "Remark: "));
        return lines.ToImmutable();
    }
}
