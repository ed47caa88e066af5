using System.Collections.Immutable;
using System.Globalization;
using BenchCheck.Core.Batches;
using BenchCheck.Core.Boards;
using BenchCheck.Core.Checking;
using BenchCheck.Core.Metering;

namespace BenchCheck.Files;

/// <summary>The results of a batch as CSV (RFC 4180), one row a board, SI units, for spreadsheets; read back to go on with a batch.</summary>
/// <remarks>
/// The columns of the estimates are those of the board, so the header is the same for every batch of it. Text that a spreadsheet would take
/// for a formula is protected by an apostrophe; a line break within text becomes a space, so that a row is a line.
/// </remarks>
public sealed class BatchCsv
{
    private static readonly string[] Fixed =
        ["serial", "verdict", "chi_squared", "degrees_of_freedom", "p_value", "suspect", "probability", "readings", "out", "doubtful", "failure"];

    private const string Between = "; ";

    private static readonly string[] NoEstimate = ["", ""];

    private readonly ImmutableArray<BatchParameter> estimates;
    private readonly ImmutableArray<BatchParameter> withLot;

    private BatchCsv(ImmutableArray<BatchParameter> estimates, ImmutableArray<BatchParameter> withLot) => (this.estimates, this.withLot) = (estimates, withLot);

    public static BatchCsv Of(Board board) => new(BatchParameter.Of(board), []);

    /// <summary>With further columns for what each estimate is together with the lot.</summary>
    public static BatchCsv WithLot(Board board) => new(BatchParameter.Of(board), BatchParameter.Of(board));

    /// <summary>The header, without a line break at its end.</summary>
    public string Header => Line(
    [
        .. Fixed, .. estimates.SelectMany(e => new[] { Safe($"{e.Name} [{e.Kind.Unit.Symbol}]"), Safe($"u({e.Name})") }),
        .. withLot.SelectMany(e => new[] { Safe($"{e.Name} with lot [{e.Kind.Unit.Symbol}]"), Safe($"u({e.Name} with lot)") }),
    ]);

    public string Row(CheckResult result)
    {
        var outcome = BoardOutcome.Of(result);
        var lot = result.Parameters.Where(p => p.WithLot is not null).GroupBy(p => BatchParameter.NameOf(p.Part, p.Kind, p.Condition)).ToDictionary(g => g.Key, g => g.First().WithLot!);
        var values = outcome.Estimates.GroupBy(e => e.Name).ToDictionary(g => g.Key, g => g.First());
        return Line(
        [
            Safe(result.Serial ?? ""), ResultWords.Of(result.Verdict), Digits(result.ChiSquared), result.DegreesOfFreedom.ToString(CultureInfo.InvariantCulture), Digits(result.PValue),
            Safe(outcome.Suspect ?? ""), result.Suspects is [var first, ..] ? Digits(first.Probability) : "",
            Safe(string.Join(Between, outcome.Places.Select(p => p.Place))), Places(outcome, ReadingVerdict.Out), Places(outcome, ReadingVerdict.Doubtful), "",
            .. estimates.SelectMany(e => values.TryGetValue(e.Name, out var v) ? new[] { Digits(v.Value), Digits(v.StandardUncertainty) } : NoEstimate),
            .. withLot.SelectMany(e => lot.TryGetValue(e.Name, out var v) ? new[] { Digits(v.Value), Digits(v.StandardUncertainty) } : NoEstimate),
        ]);
    }

    /// <summary>The row of a board that could not be checked.</summary>
    public string FailureRow(ReadingSet board, string reason)
    {
        ArgumentNullException.ThrowIfNull(board);
        return Line([Safe(board.Serial ?? ""), "", "", "", "", "", "", "", "", "", Safe(reason), .. estimates.Concat(withLot).SelectMany(_ => NoEstimate)]);
    }

    /// <summary>A row read back; null when it is none of this board.</summary>
    public BoardOutcome? Outcome(string line)
    {
        using var text = new StringReader(line);
        if (DelimitedText.Rows(text, ',').FirstOrDefault() is not { Cells: { } raw } || raw.Length != Fixed.Length + 2 * (estimates.Length + withLot.Length)) return null;
        var cells = raw.Select(CellText.Restore).ToArray();
        var serial = cells[0].Length == 0 ? null : cells[0];
        if (cells[10].Length > 0) return BoardOutcome.Failed(serial, cells[10]);
        if (ResultWords.BoardVerdictOf(cells[1]) is not { } verdict) return null;
        var (outside, doubtful) = (Split(cells[8]).ToHashSet(), Split(cells[9]).ToHashSet());
        return new BoardOutcome(
            serial, verdict, cells[5].Length == 0 ? null : cells[5],
            [.. Split(cells[7]).Select(p => new PlaceOutcome(p, outside.Contains(p) ? ReadingVerdict.Out : doubtful.Contains(p) ? ReadingVerdict.Doubtful : ReadingVerdict.In))],
            [.. estimates.Select((e, i) => new EstimateOutcome(e.Name, e.Kind.Unit, Number(cells[Fixed.Length + 2 * i]), Number(cells[Fixed.Length + 2 * i + 1]))).Where(e => !double.IsNaN(e.Value))]);
    }

    /// <summary>A serial as a row can hold it.</summary>
    public static string? Kept(string? serial) => serial is null ? null : OneLine(serial).Trim() is { Length: > 0 } text ? text : null;

    private static string Places(BoardOutcome outcome, ReadingVerdict verdict) => Safe(string.Join(Between, outcome.Places.Where(p => p.Verdict == verdict).Select(p => p.Place)));

    private static string[] Split(string cell) => cell.Split(Between, StringSplitOptions.RemoveEmptyEntries);

    private static double Number(string cell) => double.TryParse(cell, NumberStyles.Float, CultureInfo.InvariantCulture, out var value) ? value : double.NaN;

    private static string Digits(double value) => double.IsFinite(value) ? value.ToString("R", CultureInfo.InvariantCulture) : "";

    private static string OneLine(string text) => string.Concat(text.Select(c => char.IsControl(c) || c is '\u2028' or '\u2029' ? ' ' : c));

    private static string Safe(string text) => CellText.Protect(OneLine(text));

    private static string Line(string[] cells)
    {
        using var text = new StringWriter(CultureInfo.InvariantCulture);
        using (var csv = CsvTarget.Open(text)) csv.WriteRecord(cells);
        return text.ToString().TrimEnd('\r', '\n');
    }
}
