using System.Collections.Immutable;
using System.Globalization;
using BenchCheck.Core.Metering;
using BenchCheck.Files;

namespace BenchCheck.Screens;

/// <summary>What a readings file from elsewhere would bring, seen before anything is taken.</summary>
/// <param name="Sets">the usable readings, a set a board</param>
/// <param name="Problems">rows and columns that cannot be used, with their reasons</param>
/// <param name="Columns">as the user named them; null for the file's own header</param>
internal sealed record ImportPreview(string Path, ImmutableArray<ReadingSet> Sets, ImmutableArray<FileProblem> Problems, ColumnMap? Columns)
{
    private const int MostShown = 200;

    public bool IsUsable => Sets.Any(s => !s.Readings.IsEmpty);

    /// <param name="columns">null for what the file's own header says</param>
    public static ImportPreview Of(string path, Bench bench, ColumnMap? columns)
    {
        var options = new ReadingsOptions { Columns = columns };
        var strict = ReadingsFile.Read(path, bench, options);
        if (strict.IsUsable) return new ImportPreview(path, [.. strict.Sets.Take(Workbench.MostBoards)], strict.Problems, columns);
        var rest = ReadingsFile.Read(path, bench, options with { SkipBadRows = true });
        return new ImportPreview(path, [.. rest.Sets.Take(Workbench.MostBoards)], strict.Problems, columns);
    }

    /// <summary>The readings of the board on the bench with these laid over; repeats of a place that was read stand in its place.</summary>
    public BenchSession Into(BenchSession session)
    {
        var ours = session.Readings;
        var theirs = Sets.FirstOrDefault(s => s.Serial == ours.Serial) ?? Sets[0];
        var kept = ours.Readings.Where(r => !theirs.Readings.Any(r.IsRepeatOf));
        return session.Replace(session.Sets.SetItem(session.Active, ours with { Readings = [.. kept, .. theirs.Readings.Select(r => r with { Lines = [] })] }));
    }

    public ImmutableArray<ScreenLine> Lines(BenchSession session, int width)
    {
        var lines = ImmutableArray.CreateBuilder<ScreenLine>();
        var board = session.Bench.Board;
        var set = Sets.FirstOrDefault(s => s.Serial == session.Readings.Serial) ?? Sets.FirstOrDefault();
        lines.Add(ScreenLine.Of(string.Create(CultureInfo.InvariantCulture, $"{set?.Readings.Length ?? 0} readings understood, {Problems.Count(p => p.IsError)} rows or columns not, {Sets.Length} boards in the file.")));
        foreach (var problem in Problems.Take(MostShown)) lines.AddRange(ScreenLine.Paragraph(problem.ToString(), width, problem.IsError ? Tone.Bad : Tone.Doubt));
        foreach (var reading in set?.Readings.Take(MostShown) ?? [])
        {
            var was = session.Readings.Readings.FirstOrDefault(reading.IsRepeatOf);
            var unit = reading.Quantity.Unit();
            var line = reading.Lines.IsDefaultOrEmpty ? "" : string.Create(CultureInfo.InvariantCulture, $"line {reading.Lines[0]}");
            lines.Add(ScreenLine.Cells(
                new Cell(line, 10, Tone.Dim), new Cell(reading.Condition, 12), new Cell(Place.Of(reading, board).Name(board), 18), new Cell(Words.Number(reading.Value, unit), 12, IsRight: true),
                new Cell(was is null ? "new" : $"in place of {Words.Number(was.Value, unit)}", Math.Max(10, width - 56), was is null ? Tone.Plain : Tone.Doubt)));
        }

        return lines.ToImmutable();
    }
}
