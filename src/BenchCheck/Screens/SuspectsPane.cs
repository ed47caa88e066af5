using System.Collections.Immutable;

namespace BenchCheck.Screens;

/// <summary>The suspects, likeliest first.</summary>
internal static class SuspectsPane
{
    public static ImmutableArray<ScreenLine> Lines(BenchSession session, int width)
    {
        var suspects = session.Result?.Suspects ?? [];
        var lines = ImmutableArray.CreateBuilder<ScreenLine>();
        lines.Add(ScreenLine.Of(ScreenLine.Fit("Suspects" + (suspects.IsEmpty ? "" : session.Suspect is null ? "  (F7: shown in the table)" : "  (table: as the marked one)"), width), Tone.Strong));
        if (session.Failure is { } failure)
        {
            lines.AddRange(ScreenLine.Paragraph($"The board cannot be solved: {failure}", width, Tone.Bad));
            return lines.ToImmutable();
        }

        if (suspects.IsEmpty)
            lines.Add(ScreenLine.Of(session.IsChecked ? "Nothing suspected yet: enter a reading." : "Checking …", Tone.Dim));
        for (var i = 0; i < suspects.Length; i++)
        {
            var isChosen = session.Suspect == i;
            var label = $"{(isChosen ? "> " : "  ")}{Words.Percent(suspects[i].Probability),5} ";
            lines.AddRange(ScreenLine.Paragraph(suspects[i].Text, width, isChosen ? Tone.Strong : Tone.Plain, label));
        }

        return lines.ToImmutable();
    }
}
