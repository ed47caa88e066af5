using System.Text;
using CsvHelper;

namespace BenchCheck.Files;

/// <summary>A row of a delimited text.</summary>
/// <param name="Line">line on which it begins, counted from 1</param>
/// <param name="Malformed">what is wrong with its quotation marks; null when they are well formed or stand inside plain text</param>
internal readonly record struct DelimitedRow(int Line, string[] Cells, CsvMalformedReason? Malformed)
{
    public bool IsBlank => Array.TrueForAll(Cells, string.IsNullOrWhiteSpace);
}

/// <summary>Rows of a text parted by comma, semicolon or tab (RFC 4180 quoting), without blank and comment rows.</summary>
internal static class DelimitedText
{
    /// <summary>Longest row in bytes; a longer one is an unclosed quotation mark or no table at all.</summary>
    public const int LongestRow = 1 << 18;

    /// <summary>The delimiter, from the first row that says something; a decimal comma in the rows below does not mislead it.</summary>
    public static char DelimiterOf(TextReader text)
    {
        var head = new char[1 << 16];
        var length = text.ReadBlock(head, 0, head.Length);
        foreach (var line in head.AsSpan(0, length).EnumerateLines())
        {
            var row = line.Trim('\uFEFF');
            if (row.IsWhiteSpace() || row.TrimStart().StartsWith('#')) continue;
            if (row.Length == 5 && row.StartsWith("sep=", StringComparison.OrdinalIgnoreCase) && char.IsAscii(row[4])) return row[4];
            var (tabs, semicolons, commas) = (row.Count('\t'), row.Count(';'), row.Count(','));
            return tabs >= Math.Max(1, Math.Max(semicolons, commas)) ? '\t' : semicolons >= Math.Max(1, commas) ? ';' : ',';
        }

        return ',';
    }

    /// <exception cref="CsvFormatException">a row is longer than <see cref="LongestRow"/></exception>
    /// <exception cref="DecoderFallbackException">the text is not in the encoding that it was opened with</exception>
    public static IEnumerable<DelimitedRow> Rows(TextReader text, char delimiter)
    {
        CsvMalformedReason? malformed = null;
        var options = new CsvReaderOptions
        {
            Separator = delimiter,
            HasHeader = false,
            CommentPrefix = '#',
            TrimWhitespace = true,
            TrackLineNumbers = true,
            MaxRecordSize = LongestRow,
            PoolStrings = true,
            OnMalformedRecord = record => malformed = record.Reason == CsvMalformedReason.StrayQuote ? malformed : record.Reason,
        };
        using var reader = CsvReader.Create(text, options, leaveOpen: true);
        while (reader.Read())
        {
            var cells = new string[reader.FieldCount];
            for (var i = 0; i < cells.Length; i++) cells[i] = reader.GetString(i).Trim();
            var row = new DelimitedRow((int)Math.Min(reader.LineNumber, int.MaxValue), cells, malformed);
            malformed = null;
            var isSeparatorLine = row.Line == 1 && cells.Length <= 2 && cells[0].StartsWith("sep=", StringComparison.OrdinalIgnoreCase);
            if (!row.IsBlank && !isSeparatorLine && !IsComment(reader)) yield return row;
        }
    }

    /// <summary>A comment behind blanks; a # in quotation marks is text.</summary>
    private static bool IsComment(CsvReader reader) => reader.RawRecord.TrimStart(" \t"u8).StartsWith((byte)'#');
}
