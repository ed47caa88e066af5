using BenchCheck.Commands.Log;
using BenchCheck.Core.Checking;
using BenchCheck.Core.Quantities;
using BenchCheck.Files;
using BenchCheck.Plots.Reports;
using BenchCheck.Records;

namespace BenchCheck.Screens;

/// <content>What leaves the screen: exports, and checks that go on record.</content>
internal sealed partial class BenchScreen
{
    private void Export()
    {
        if (bench is not { } b || Finished(b) is not { } result) return;
        var path = Path.ChangeExtension(b.ReadingsPath, null) + "-check.png";
        Put(new FormPanel(palette, "Export the check", [new("file", path, CheckExport.Endings)], values =>
        {
            var file = values[0].Trim();
            if (CheckExport.Obstacle(file) is { } obstacle) return obstacle;
            Close();
            var report = new Report(
                result, CheckSettings.Default, [new("board", Path.GetFileName(b.BoardPath), b.Session.Board.Text), new("readings", Path.GetFileName(b.ReadingsPath), ReadingsCsv.Text(b.Session.Readings))],
                CheckFiling.Program, clock.GetLocalNow());
            Aside("Writing …", () => CheckExport.Write(report, file), refused => Say(refused ?? $"Written to {file}.", refused is null ? Tone.Plain : Tone.Bad));
            return null;
        }, Close));
    }

    private void ShowLog()
    {
        if (bench is not { } b) return;
        var title = b.Session.Bench.Board.Title;
        var asked = panel;
        Aside("Reading the bench log …", () => records.Of(title), found =>
        {
            Say("");
            if (panel != asked || bench != b) return;
            Put(new ChoicePanel(palette, "Bench log", w => [.. ScreenLine.Paragraph(
                found.Fault is { } fault ? fault.Read : found.Value.IsEmpty ? $"Nothing is on record of \"{title}\" yet." : $"On record of \"{title}\", the newest first. Records stay as they were filed.", w,
                found.Fault is null ? Tone.Plain : Tone.Bad)],
            [
                new Choice("File this check", "the board, the readings and what came of them, as they stand here", FileCheck),
                .. (found.IsValue ? found.Value : []).Select(e => new Choice(RecordText.Line(e), $"record {e.Number}", () => ShowRecord(e.Number))),
            ], Close));
        });
    }

    private void FileCheck()
    {
        Close();
        if (bench is not { } b || Finished(b) is null) return;
        if (b.Session.Readings.Readings.IsEmpty) Say("Nothing was read yet: there is nothing to file.", Tone.Doubt);
        else FileSession(b.Session);
    }

    private void FileSession(BenchSession session) => Aside("Filing …", () => records.File(session), filed => Say(filed.Fault is { } fault ? $"Not filed: {fault.Read}" : $"Filed as record {filed.Value.Number}.", filed.IsValue ? Tone.Plain : Tone.Bad));

    private void ShowRecord(long number)
    {
        var asked = panel;
        Aside("Reading the record …", () => records.Find(number), found =>
        {
            Say("");
            if (panel == asked) PutRecord(number, found);
        });
    }

    private void PutRecord(long number, Parsed<(LogRecord Record, ResultSummary Result)> found) =>
        Put(new TextPanel(palette, $"Record {number}", w => found.Fault is { } fault ? [.. ScreenLine.Paragraph(fault.Read, w, Tone.Bad)] : RecordText.Lines(found.Value.Record, found.Value.Result, w),
            "Up Down PgUp PgDn scroll   Esc back to the log", ShowLog));

    /// <summary>The check of the present readings; null, which is then said, while there is none.</summary>
    private CheckResult? Finished(Workbench b)
    {
        if (b.Session is { IsChecked: true, Result: { } result }) return result;
        Say(b.Session.Failure is null ? "The check is still running: try again when it is done." : "There is no check: the board cannot be solved.", Tone.Doubt);
        return null;
    }

    /// <summary>Does something slow on another thread; the screen goes on.</summary>
    /// <param name="then">done with what came of it, on the screen's thread</param>
    private void Aside<T>(string doing, Func<T> work, Action<T> then)
    {
        Say(doing);
        _ = Task.Run(() =>
        {
            var outcome = work();
            App?.Invoke(() => then(outcome));
        });
    }
}
