using System.Collections.Immutable;
using BenchCheck.Core.Boards;
using BenchCheck.Core.Checking;
using BenchCheck.Core.Quantities;

namespace BenchCheck.Screens;

/// <summary>One row of the parts view: a number of a part, or a part without any.</summary>
internal sealed record PartRow(Part Part, PartParameter? Parameter, Estimate? Estimate, Dissipation? Dissipation);

/// <summary>The parts: what the list says, what the readings make of it, how far they determine it, and the power.</summary>
internal static class PartsPane
{
    public static ImmutableArray<PartRow> Rows(BenchSession session)
    {
        var result = session.Result;
        return
        [
            .. session.Bench.Board.Parts.SelectMany(part =>
            {
                var heat = result?.Dissipation.FirstOrDefault(d => d.Part == part.Designator);
                PartParameter[] shown = [.. part.Parameters.Where(p => p.Kind.IsReported)];
                return shown.Length == 0
                    ? [new PartRow(part, null, null, heat)]
                    : shown.Select((p, i) => new PartRow(part, p, EstimateOf(result, session.Condition, part, p), i == 0 ? heat : null));
            }),
        ];
    }

    public static ImmutableArray<ScreenLine> Lines(BenchSession session, int cursor, int width, int height)
    {
        var rows = Rows(session);
        var lines = ImmutableArray.CreateBuilder<ScreenLine>(height);
        lines.Add(Line(width, "  part", "", "parts list", "estimate", "interval", "found", "power", Tone.Dim, Tone.Dim));
        var first = FirstRow(session, cursor, height);
        for (var i = first; i < rows.Length && i < first + height - 1; i++)
        {
            var line = Row(rows[i], i == cursor, width);
            lines.Add(i == cursor ? line.AsChosen() : line);
        }

        return lines.ToImmutable();
    }

    public static int FirstRow(BenchSession session, int cursor, int height) =>
        Math.Clamp(cursor - (height - 1) / 2, 0, Math.Max(0, Rows(session).Length - (height - 1)));

    /// <summary>What stands under the table for the part at the cursor.</summary>
    public static ImmutableArray<ScreenLine> Detail(BenchSession session, int cursor, int width)
    {
        var rows = Rows(session);
        if (cursor < 0 || cursor >= rows.Length) return [];
        var part = rows[cursor].Part;
        var lines = ImmutableArray.CreateBuilder<ScreenLine>();
        lines.Add(ScreenLine.Of($"{part.Designator}, {part.Kind.Name}" + (part.Note is null ? "" : $": {part.Note}"), Tone.Strong));
        lines.AddRange(ScreenLine.Paragraph(string.Join(", ", part.Kind.Pins.Select((pin, i) => $"{pin} on {part.Nodes[i]}")), width, Tone.Plain, "Pins   "));
        foreach (var state in session.Result?.States.Where(s => s.Part == part.Designator) ?? [])
            lines.AddRange(ScreenLine.Paragraph($"{state.State} in {state.Condition}" + (state.Remark is null ? "" : $" ({state.Remark})"), width, Tone.Plain, "State  "));
        foreach (var pair in session.Result?.Correlated.Where(c => c.First.Part == part.Designator || c.Second.Part == part.Designator).Take(3) ?? [])
            lines.AddRange(ScreenLine.Paragraph($"{pair.First.Part} {pair.First.Kind} and {pair.Second.Part} {pair.Second.Kind} are told only together", width, Tone.Dim, "       "));
        if (session.Result?.Dissipation.FirstOrDefault(d => d.Part == part.Designator) is { } heat)
        {
            var rated = heat.RatedWatts is { } watts ? $", rated {Words.Number(watts, Unit.Watt)}" : "";
            lines.AddRange(ScreenLine.Paragraph($"{Words.Number(heat.Watts, Unit.Watt)} in {heat.Condition}{rated}{(heat.IsOver ? ": OVER !" : "")}", width, heat.IsOver ? Tone.Bad : Tone.Plain, "Power  "));
        }

        return lines.ToImmutable();
    }

    private static ScreenLine Row(PartRow row, bool isCursor, int width)
    {
        var name = (isCursor ? "> " : "  ") + row.Part.Designator;
        var (power, heat) = row.Dissipation is { } d ? ((d.IsOver ? "!" : "") + EngineeringNotation.Format(d.Watts, Unit.Watt, 3), d.IsOver ? Tone.Bad : Tone.Plain) : ("", Tone.Plain);
        if (row.Parameter is not { } p) return Line(width, name, row.Part.Kind.Name, "", "", "", "", power, Tone.Plain, heat);
        // A supply that the condition sets has the condition's value, not that of the list.
        var (low, high) = row.Estimate is { } found ? (found.NominalLow, found.NominalHigh) : (p.Nominal.Low, p.Nominal.High);
        var listed = p.Nominal.IsUnknown ? "?" : EngineeringNotation.Range(low, high, p.Kind.Unit);
        return row.Estimate is { } e
            ? Line(width, name, p.Kind.Name, listed, EngineeringNotation.FormatWithUncertainty(e.Value, e.StandardUncertainty, p.Kind.Unit), EngineeringNotation.Range(e.Low, e.High, p.Kind.Unit),
                e.Determined switch { Determination.Yes => "yes", Determination.Partly => "partly", _ => "no" }, power, e.Determined == Determination.No ? Tone.Dim : Tone.Plain, heat)
            : Line(width, name, p.Kind.Name, listed, "", "", "", power, Tone.Plain, heat);
    }

    private static ScreenLine Line(int width, string name, string kind, string listed, string estimate, string interval, string found, string power, Tone plain, Tone heat)
    {
        var spare = Math.Clamp((width - 80) / 5, 0, 8);
        var hasInterval = width >= 80;
        return ScreenLine.Cells(
        [
            new Cell(name, 6 + spare, plain), new Cell(kind, 11 + spare, plain), new Cell(listed, 13 + spare, plain, true), new Cell(estimate, 17 + spare, plain, true),
            .. hasInterval ? [new Cell(interval, 14 + spare, plain, true)] : Array.Empty<Cell>(), new Cell(found, 6, plain), .. width >= 66 ? [new Cell(power, 7, heat, true)] : Array.Empty<Cell>(),
        ]);
    }

    private static Estimate? EstimateOf(CheckResult? result, string condition, Part part, PartParameter parameter)
    {
        var estimates = result?.Parameters.Where(e => e.Part == part.Designator && e.Kind == parameter.Kind).ToList() ?? [];
        return estimates.FirstOrDefault(e => e.Condition == condition) ?? estimates.FirstOrDefault();
    }
}
