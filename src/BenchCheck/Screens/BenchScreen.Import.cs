using System.Collections.Immutable;

namespace BenchCheck.Screens;

/// <content>Readings from another file.</content>
internal sealed partial class BenchScreen
{
    private void Import()
    {
        if (bench is not { } b) return;
        Put(new FormPanel(palette, "Import readings", [new("file", Path.GetDirectoryName(b.ReadingsPath) + Path.DirectorySeparatorChar, "a CSV file; nothing is taken before you have seen it")], values =>
        {
            var preview = ImportPreview.Of(values[0].Trim(), b.Session.Bench);
            if (!preview.IsUsable) return preview.Problems.FirstOrDefault(p => p.IsError)?.ToString() ?? "no readings in this file";
            ShowPreview(b, preview);
            return null;
        }, Close));
    }

    private void ShowPreview(Workbench b, ImportPreview preview)
    {
        var bad = preview.Problems.Count(p => p.IsError);
        Put(new ChoicePanel(palette, $"Import from {Path.GetFileName(preview.Path)}", w => [.. preview.Lines(b.Session, w).Take(Math.Max(4, Viewport.Height - 9))],
        [
            new Choice("Take nothing", "", Close),
            new Choice(bad == 0 ? "Take them" : "Take the readings understood", "one change; Ctrl+U undoes it", () =>
            {
                Close();
                var refused = b.Enter((s, _) => preview.Into(s));
                Say(refused ?? "Taken. Ctrl+U undoes it.", refused is null ? Tone.Plain : Tone.Bad);
            }),
        ], Close));
    }
}
