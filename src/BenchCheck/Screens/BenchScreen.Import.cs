using System.Collections.Immutable;
using BenchCheck.Files;

namespace BenchCheck.Screens;

/// <content>Readings from another file.</content>
internal sealed partial class BenchScreen
{
    private void Import()
    {
        if (bench is not { } b) return;
        Put(new FormPanel(palette, "Take readings from a file",
            [new("file", Path.GetDirectoryName(b.ReadingsPath) + Path.DirectorySeparatorChar, "a CSV file; nothing is taken before you have seen it")], values => LookAt(b, values[0].Trim()), Close));
    }

    /// <summary>Shows what a file would bring, or asks what its columns are. Null, or why it can be neither.</summary>
    private string? LookAt(Workbench b, string path)
    {
        var preview = ImportPreview.Of(path, b.Session.Bench, null);
        if (preview.IsUsable) ShowPreview(b, preview);
        else if (ReadingsFile.Glance(path, b.Session.Bench) is { IsEmpty: false } rows) AskForColumns(b, path, rows, preview.Problems, ColumnMap.Guess(rows, b.Session.Bench));
        else return preview.Problems.FirstOrDefault(p => p.IsError)?.ToString() ?? "no readings in this file";
        return null;
    }

    private void AskForColumns(Workbench b, string path, ImmutableArray<ImmutableArray<string>> rows, ImmutableArray<FileProblem> problems, ColumnMap columns) =>
        Put(new ColumnsPanel(palette, $"What are the columns of {Path.GetFileName(path)}?", rows, problems, columns, b.Session.Bench, chosen =>
        {
            var preview = ImportPreview.Of(path, b.Session.Bench, chosen);
            if (preview.IsUsable) ShowPreview(b, preview);
            else AskForColumns(b, path, rows, preview.Problems, chosen);
        }, Close));

    private void ShowPreview(Workbench b, ImportPreview preview)
    {
        var bad = preview.Problems.Count(p => p.IsError);
        Ask($"Take readings from {Path.GetFileName(preview.Path)}", w => preview.Lines(b.Session, w),
        [
            new Choice("Take nothing", "", Close),
            new Choice(bad == 0 ? "Take them" : "Take the readings understood", "one change; Ctrl+U undoes it", () =>
            {
                Close();
                var refused = b.Enter((s, _) => preview.Into(s));
                Say(refused ?? "Taken. Ctrl+U undoes it.", refused is null ? Tone.Plain : Tone.Bad);
            }),
            new Choice("Say what the columns are", "where they were taken for something else", () =>
            {
                var rows = ReadingsFile.Glance(preview.Path, b.Session.Bench);
                if (!rows.IsEmpty) AskForColumns(b, preview.Path, rows, [], preview.Columns ?? ColumnMap.Guess(rows, b.Session.Bench));
            }),
        ], Close);
    }

    /// <summary>A question about a text that may be long: as much of it as there is room for, all of it on request.</summary>
    private void Ask(string title, Func<int, ImmutableArray<ScreenLine>> lines, ImmutableArray<Choice> choices, Action back)
    {
        Put(new ChoicePanel(palette, title, Shown, [.. choices, new Choice("Look at every line", "with nothing cut", ShowAll)], back));

        ImmutableArray<ScreenLine> Shown(int width)
        {
            var all = lines(width);
            var room = Math.Max(3, Viewport.Height - choices.Length - 7);
            return all.Length <= room ? all : [.. all.Take(room), ScreenLine.Of($"… {all.Length - room} lines more", Tone.Doubt)];
        }

        void ShowAll() => Put(new TextPanel(palette, title, lines, "Up Down PgUp PgDn scroll   Esc back", () => Ask(title, lines, choices, back)));
    }
}
