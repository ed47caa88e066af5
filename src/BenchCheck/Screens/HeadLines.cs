using System.Collections.Immutable;
using System.Globalization;

namespace BenchCheck.Screens;

/// <summary>The lines on top: board, file and state of saving; the verdict and why.</summary>
internal static class HeadLines
{
    public static ImmutableArray<ScreenLine> Of(Workbench bench, int width)
    {
        var session = bench.Session;
        var saved = !bench.IsOurs ? "look only: open in another screen" : session.IsDirty ? "not yet saved (Ctrl+S)" : "saved";
        var serial = session.Readings.Serial is { } s ? $", serial {s}" : "";
        var boards = session.Sets.Length > 1 ? string.Create(CultureInfo.InvariantCulture, $" ({session.Active + 1} of {session.Sets.Length}, Ctrl+B next)") : "";
        var filter = session.OnlyFlagged ? "  only flagged" : "";
        var order = session.Order switch { RowOrder.Worst => "  worst first", RowOrder.Entered => "  as entered", _ => "" };
        var files = session.IsBoardDirty ? Path.GetFileName(bench.BoardPath) + (session.AreReadingsDirty ? $", {Path.GetFileName(bench.ReadingsPath)}" : "") : Path.GetFileName(bench.ReadingsPath);
        var right = $"{files}: {saved}";
        var left = $"{session.Bench.Board.Title}{serial}{boards}{filter}{order}";
        var room = Math.Max(10, width - right.Length - 1);
        var top = ScreenLine.Cells(new Cell(left, room, Tone.Strong), new Cell(right, width - room - 1, session.IsDirty || !bench.IsOurs ? Tone.Doubt : Tone.Dim));
        if (session.Failure is { } failure) return [top, ScreenLine.Of($"NO CHECK !  {failure}", Tone.Bad)];
        if (session.Result is not { } result) return [top, ScreenLine.Of("Checking …", Tone.Dim)];
        if (session.Readings.Readings.IsEmpty) return [top, ScreenLine.Of("No reading yet. Type what the meter shows at the marked row and press Enter.")];
        var (word, tone) = Words.Of(result.Verdict);
        var busy = session.IsChecked ? "" : "  (checking …)";
        return [top, .. ScreenLine.Paragraph(result.Reason + busy, width, Tone.Plain, word + "  ").Select((line, i) => i > 0 ? line : new ScreenLine(line.Pieces.SetItem(0, line.Pieces[0] with { Tone = tone })))];
    }
}
