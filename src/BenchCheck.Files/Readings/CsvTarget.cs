using CsvHelper;

namespace BenchCheck.Files;

/// <summary>How CSV is written: RFC 4180, comma, CRLF, quotation marks where needed. Cells are protected by <see cref="CellText"/> beforehand.</summary>
internal static class CsvTarget
{
    public static CsvWriter Open(TextWriter target) =>
        CsvWriter.Create(target, new CsvWriterOptions { Separator = ',', NewLine = "\r\n", HasHeader = false, CommentPrefix = '#', Quoting = CsvQuoting.WhenNeededOrWhitespace, Injection = CsvInjection.None }, leaveOpen: true);
}
