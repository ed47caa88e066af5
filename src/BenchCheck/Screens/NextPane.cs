using System.Collections.Immutable;
using System.Globalization;

namespace BenchCheck.Screens;

/// <summary>The readings that would tell most, with what each is worth and the caution that goes with it.</summary>
internal static class NextPane
{
    private const int Most = 6;

    public static ImmutableArray<ScreenLine> Lines(BenchSession session, int width)
    {
        var lines = ImmutableArray.CreateBuilder<ScreenLine>();
        lines.Add(ScreenLine.Of(ScreenLine.Fit("Next reading" + (session.IsGuided ? "  (guided: the cursor goes there)" : ""), width), Tone.Strong));
        var next = session.Result?.Next ?? [];
        if (next.IsEmpty) lines.Add(ScreenLine.Of(session.IsChecked ? "No further reading would tell more." : "Checking …", Tone.Dim));
        foreach (var reading in next.Take(Most))
        {
            var bits = reading.Bits.ToString("0.00", CultureInfo.InvariantCulture) + " bit ";
            lines.AddRange(ScreenLine.Paragraph(reading.Text, width, Tone.Plain, bits));
            if (reading.Caution is { } caution) lines.AddRange(ScreenLine.Paragraph("! " + caution, width, Tone.Doubt, new string(' ', bits.Length)));
        }

        return lines.ToImmutable();
    }
}
