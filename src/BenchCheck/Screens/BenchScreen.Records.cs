using BenchCheck.Commands.Log;
using BenchCheck.Core.Checking;
using BenchCheck.Files;
using BenchCheck.Plots.Reports;

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
