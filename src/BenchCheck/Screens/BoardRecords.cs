using System.Collections.Immutable;
using System.Text;
using BenchCheck.Commands.Log;
using BenchCheck.Core.Checking;
using BenchCheck.Core.Diagnosis;
using BenchCheck.Core.Quantities;
using BenchCheck.Files;
using BenchCheck.Plots;
using BenchCheck.Records;

namespace BenchCheck.Screens;

/// <summary>The bench log as the screen uses it: the records of one board, one more filed. Slow, where benches share a log: not for the thread that draws.</summary>
internal sealed class BoardRecords(Func<LogPlace> place)
{
    private const int Most = 200;

    /// <summary>Records of boards of this title, the newest first; or why there is no telling.</summary>
    public Parsed<ImmutableArray<LogEntry>> Of(string boardTitle) => Told(() =>
    {
        using var log = BenchLog.Open(place());
        return log.List(new LogQuery { Board = boardTitle }, Most).Where(e => e.BoardTitle == boardTitle).Reverse().ToImmutableArray();
    });

    /// <summary>One record with its result.</summary>
    public Parsed<(LogRecord Record, ResultSummary Result)> Find(long number)
    {
        var found = Told(() =>
        {
            using var log = BenchLog.Open(place());
            return log.Find(number);
        });
        if (found.Fault is { } fault) return fault;
        if (found.Value is not { } record) return new TextFault($"no record {number} in the log", "");
        return ResultSummary.Parse(record.Result) is { } result ? (record, result) : new TextFault($"the result of record {number} is not one that this program can read", "");
    }

    /// <summary>Files the check of the board on the bench, with the board and the readings as they stand on the screen.</summary>
    public Parsed<LogEntry> File(BenchSession session)
    {
        // Checked anew from the very bytes that are filed, so that the record can be repeated from itself to the last digit.
        var readings = ReadingsCsv.Text(session.Readings);
        var set = ReadingsFile.Parse(readings, "readings", session.Bench).Sets.First();
        var settings = CheckSettings.Default;
        return Told(() =>
        {
            var result = new Reconciliation(session.Bench, settings).Run(set);
            using var log = BenchLog.Open(place());
            return log.Append(new Filing(
                DateTimeOffset.UtcNow, CheckFiling.Program, result.BoardTitle, result.Serial, ResultWords.Of(result.Verdict), FiledSettings.Text(settings, false), ResultJson.Line(result),
                Encoding.UTF8.GetBytes(session.Board.Text), Encoding.UTF8.GetBytes(readings), Plot: Encoding.UTF8.GetBytes(ReadingPlot.Of(result).ToSvg())))[0];
        });
    }

    private static Parsed<T> Told<T>(Func<T> work)
    {
        try
        {
            return work();
        }
        catch (Exception failure) when (failure is BenchLogException || Workbench.IsFileFailure(failure))
        {
            return new TextFault(failure.Message, "");
        }
    }
}
