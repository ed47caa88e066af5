using System.Collections.Immutable;
using BenchCheck.Core.Quantities;
using BenchCheck.Files;

namespace BenchCheck.Screens;

/// <content>Parts and connections: edited, added, removed.</content>
internal sealed partial class BenchScreen
{
    private const string Designator = "designator";
    private const string NodeHint = "the node that this pin is soldered to; a new name makes a new node";

    private void EditPart()
    {
        if (bench is not { } b || PartAtCursor(b) is not { } designator) return;
        if (b.Session.Board.Part(designator) is { } part) Put(PartForm(b, $"Edit {designator}, {part.Kind}", part, text => b.EnterBoard(t => t.Changed(designator, text))));
        else Say($"{designator} is written in a way that this form does not change: edit the board file by hand.", Tone.Doubt);
    }

    private void AddPart()
    {
        if (bench is not { } b) return;
        ShowView(ScreenView.Parts);
        Put(new ChoicePanel(palette, "Which kind of part is added?", _ => [],
        [
            .. PartKeys.Kinds.Select(kind => new Choice(kind, string.Join(", ", PartKeys.PinsOf(kind)), () =>
            {
                var part = new PartText(Unused(b, PartKeys.LetterOf(kind)), kind, [.. PartKeys.PinsOf(kind).Select(_ => "")], ImmutableSortedDictionary<string, string>.Empty);
                Put(PartForm(b, $"Add a part: {kind}", part, text => b.EnterBoard(t => t.Added(text))));
            })),
        ], Close));
    }

    private void RemovePart()
    {
        if (bench is not { } b || PartAtCursor(b) is not { } designator) return;
        var refused = b.EnterBoard(t => t.Removed(designator));
        Look(s => s);
        if (refused is not null) Say($"{designator} stays: {refused}", Tone.Bad);
        else Say($"{designator} removed; Ctrl+U brings it back, Ctrl+S saves the board file.");
    }

    private string? PartAtCursor(Workbench b)
    {
        if (view != ScreenView.Parts)
        {
            ShowView(ScreenView.Parts);
            Say("Choose a part first.", Tone.Doubt);
            return null;
        }

        var rows = PartsPane.Rows(b.Session);
        return rows.IsEmpty ? null : rows[Math.Clamp(partCursor, 0, rows.Length - 1)].Part.Designator;
    }

    private FormPanel PartForm(Workbench b, string title, PartText part, Func<PartText, string?> enter)
    {
        var pins = PartKeys.PinsOf(part.Kind);
        var keys = PartKeys.Of(part.Kind);
        var nodes = $"{NodeHint}. There are {string.Join(", ", b.Session.Bench.Board.Nodes)}";
        return new FormPanel(palette, title,
        [
            new(Designator, part.Designator, "as printed on the board: R7, Q2"),
            .. pins.Select((pin, i) => new FormField(pin.Length == 1 ? $"pin {pin}" : pin, part.Nodes[i], nodes)),
            .. keys.Select(k => new FormField(k.Name.Replace('_', ' '), part.Value(k.Name), k.Example + (k.IsRequired ? "" : "; may be empty"))),
        ],
        values =>
        {
            string[] typed = [.. values.Select(v => v.Trim())];
            var stated = keys.Select((k, i) => (k.Name, Text: typed[1 + pins.Length + i])).Where(k => k.Text.Length > 0);
            var text = new PartText(typed[0], part.Kind, [.. typed[1..(1 + pins.Length)]], stated.ToImmutableSortedDictionary(k => k.Name, k => k.Text, StringComparer.Ordinal));
            if (enter(text) is { } refused) return refused;
            Close();
            Look(s => s);
            partCursor = Math.Max(0, Array.FindIndex([.. PartsPane.Rows(b.Session)], r => r.Part.Designator == text.Designator));
            Say($"{text.Designator} taken; Ctrl+U undoes it, Ctrl+S saves the board file.");
            return null;
        }, Close);
    }

    private static string Unused(Workbench b, string letter)
    {
        var number = 1;
        while (b.Session.Bench.Board.Find($"{letter}{number}") is not null) number++;
        return $"{letter}{number}";
    }

    private void AskAboutBoard(Workbench b) => Put(new ChoicePanel(palette, "The board file was changed by another program",
        w => [.. ScreenLine.Paragraph($"{b.BoardPath} is no longer what was opened here. Nothing was overwritten.", w)],
    [
        new Choice("Write mine beside it", "under another name, to be compared; then take theirs", () => WriteBoardCopy(b)),
        new Choice("Take theirs", "the parts as they are on disk now; Ctrl+U goes back to yours", () => TakeBoard(b)),
        new Choice("Back", "nothing is written", Close),
    ], Close));

    private void WriteBoardCopy(Workbench b)
    {
        var path = Path.Combine(Path.GetDirectoryName(b.BoardPath) ?? "", Path.GetFileNameWithoutExtension(b.BoardPath) + "-2.toml");
        Put(new FormPanel(palette, "Write this board under another name", [new("file", path, "a name that is not in use")], values =>
        {
            if (b.WriteBoardCopy(values[0].Trim()) is { } refused) return refused;
            TakeBoard(b);
            return null;
        }, Close));
    }

    private void TakeBoard(Workbench b)
    {
        Close();
        var refused = b.RereadBoard();
        Look(s => s);
        Say(refused is null ? "The board is as on disk now; Ctrl+U goes back." : $"The board stays as it is here: {refused}", refused is null ? Tone.Doubt : Tone.Bad);
    }
}
