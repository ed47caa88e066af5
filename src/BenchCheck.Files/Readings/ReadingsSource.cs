using System.Collections.Immutable;
using System.Globalization;
using BenchCheck.Core.Metering;
using BenchCheck.Core.Quantities;
using CsvHelper;

namespace BenchCheck.Files;

/// <summary>One readings file that can be opened again and again: surveyed once, then streamed board by board.</summary>
internal sealed class ReadingsSource(Func<TextReader> open, string file, Bench bench, ReadingsOptions options)
{
    private const int MostListed = 200;

    private readonly BoardNames names = new(bench);
    private readonly Dictionary<string, Extent> boards = new(StringComparer.Ordinal);
    private readonly List<FileProblem> problems = [];
    private int errors;
    private int warnings;

    /// <summary>Reads the whole file, keeping problems and serials only.</summary>
    /// <param name="known">problems found before</param>
    public ReadingsFileResult Survey(IEnumerable<FileProblem> known)
    {
        foreach (var problem in known) Report(problem);
        try
        {
            SurveyRows();
        }
        catch (CsvFormatException tooLong)
        {
            Report(Problem((int)Math.Min(tooLong.LineNumber, int.MaxValue), true,
                new TextFault($"a row of more than {DelimitedText.LongestRow} bytes", "rows of a table", "a quotation mark is probably not closed")));
        }

        if (problems.Count == 0 && boards.Count == 0) Report(Problem(0, true, new TextFault("no readings", "at least one row with a value")));
        var scattered = boards.Values.Where(b => b.IsScattered).Sum(b => b.Readings);
        if (scattered > ReadingsFile.MostScatteredReadings)
        {
            Report(Problem(0, true, new TextFault(
                $"{scattered} readings of serials whose rows are scattered over the file", $"at most {ReadingsFile.MostScatteredReadings}", "sort the file by serial")));
        }

        if (!problems.Exists(p => p.IsError) && boards.Count == 0) Report(Problem(0, true, new TextFault("no row that can be used", "at least one row with a value")));
        if (errors > MostListed) problems.Add(Problem(0, true, new TextFault($"{errors - MostListed} more errors", "the first ones put right")));
        if (warnings > MostListed) problems.Add(Problem(0, false, new TextFault($"{warnings - MostListed} more warnings like these", "")) with { Expected = null });
        return new ReadingsFileResult([.. problems.OrderBy(p => p.Line == 0 ? int.MaxValue : p.Line)], boards.Count, Stream());
    }

    private static FileProblem RowLeftOut(FileProblem problem) => problem with { IsError = false, Read = $"row left out: {problem.Read}" };

    private FileProblem Problem(int line, bool isError, TextFault fault) => new(file, line, 0, isError, fault.Read, fault.Expected, fault.Hint);

    private void Report(FileProblem problem)
    {
        if ((problem.IsError ? ++errors : ++warnings) <= MostListed) problems.Add(problem);
    }

    private void SurveyRows()
    {
        using var text = open();
        using var rows = Rows(text).GetEnumerator();
        if (!rows.MoveNext())
        {
            Report(Problem(0, true, new TextFault("an empty file", "a readings file: a header row such as at,value and a row a reading")));
            return;
        }

        if (ReadingsHeader.Read(rows.Current, names, Report, file) is not { } header) return;
        var reader = new RowReader(header, names);
        string? previous = null;
        var count = 0;
        while (rows.MoveNext())
        {
            if (++count > ReadingsFile.MostRows)
            {
                Report(Problem(rows.Current.Line, true, new TextFault($"more than {ReadingsFile.MostRows} rows", "a smaller file", "split the file")));
                return;
            }

            reader.Read(rows.Current);
            var serial = SerialOf(reader, header, rows.Current);
            foreach (var fault in reader.Faults)
            {
                var problem = Problem(rows.Current.Line, true, fault);
                Report(options.SkipBadRows ? RowLeftOut(problem) : problem);
            }

            foreach (var remark in reader.Remarks) Report(Problem(rows.Current.Line, false, remark));
            if (reader.Readings.Count == 0 || reader.Faults.Count > 0) continue;
            if (!Count(serial, reader.Readings.Count, rows.Current.Line, serial != previous)) return;
            previous = serial;
        }

        if (header.HasSerial && boards.Count > 1 && boards.TryGetValue("", out var nameless))
            Report(Problem(nameless.FirstLine, false, new TextFault("rows without a serial beside rows with one: they are taken as one board without serial", "a serial in every row")));
    }

    /// <summary>Counts a row's readings to its board; false when the board has too many.</summary>
    private bool Count(string serial, int readings, int line, bool isNewRun)
    {
        if (!boards.TryGetValue(serial, out var extent)) boards[serial] = extent = new Extent(line);
        else if (isNewRun && !extent.IsScattered)
        {
            extent.IsScattered = true;
            Report(Problem(line, false, new TextFault(
                $"serial {TextFault.Quote(serial)} comes back after rows of other boards: all its rows are taken as one board", "the rows of a serial together")));
        }

        extent.LastLine = line;
        extent.Readings += readings;
        if (extent.Readings <= ReadingsFile.MostReadingsOfBoard) return true;
        Report(Problem(line, true, new TextFault(
            $"more than {ReadingsFile.MostReadingsOfBoard} readings of one board", "readings of one board, or a column serial that tells the boards apart")));
        return false;
    }

    /// <summary>In the wide form every row is a board; where no column names it, its line does.</summary>
    private static string SerialOf(RowReader reader, ReadingsHeader header, DelimitedRow row) =>
        header.IsWide && !header.HasSerial ? string.Create(CultureInfo.InvariantCulture, $"line {row.Line}") : reader.Serial;

    /// <summary>The first rows as they stand, the header with them.</summary>
    public ImmutableArray<ImmutableArray<string>> Glance(int rows)
    {
        using var text = open();
        return [.. DelimitedText.Rows(text, Delimiter()).Take(rows).Select(r => r.Cells.ToImmutableArray())];
    }

    private IEnumerable<DelimitedRow> Rows(TextReader text)
    {
        var rows = DelimitedText.Rows(text, Delimiter());
        return options.Columns is { } columns ? columns.Under(rows) : rows;
    }

    private char Delimiter()
    {
        using var text = open();
        return DelimitedText.DelimiterOf(text);
    }

    private IEnumerable<ReadingSet> Stream()
    {
        using var text = open();
        using var rows = Rows(text).GetEnumerator();
        if (!rows.MoveNext() || ReadingsHeader.Read(rows.Current, names, _ => { }, file) is not { } header) throw Changed();
        var reader = new RowReader(header, names);
        var pending = new Dictionary<string, RepeatCombiner>(StringComparer.Ordinal);
        var left = boards.Count;
        while (left > 0)
        {
            if (!rows.MoveNext()) throw Changed();
            reader.Read(rows.Current);
            if (reader.Faults.Count > 0 && !options.SkipBadRows) throw Changed();
            if (reader.Readings.Count == 0 || reader.Faults.Count > 0) continue;
            var serial = SerialOf(reader, header, rows.Current);
            if (!boards.TryGetValue(serial, out var extent) || rows.Current.Line > extent.LastLine) throw Changed();
            if (!pending.TryGetValue(serial, out var combiner)) pending[serial] = combiner = new RepeatCombiner();
            foreach (var reading in reader.Readings) combiner.Add(reading);
            if (rows.Current.Line != extent.LastLine) continue;
            pending.Remove(serial);
            left--;
            var isNameless = serial.Length == 0 || (header.IsWide && !header.HasSerial && boards.Count == 1);
            yield return new ReadingSet(isNameless ? null : serial, combiner.Readings());
        }
    }

    private IOException Changed() => new($"{file} was changed while it was being read");

    private sealed class Extent(int firstLine)
    {
        public int FirstLine { get; } = firstLine;

        public int LastLine { get; set; } = firstLine;

        public int Readings { get; set; }

        public bool IsScattered { get; set; }
    }
}
