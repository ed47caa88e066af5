using System.Collections.Immutable;
using System.Globalization;
using BenchCheck.Files;

namespace BenchCheck.Screens;

/// <content>Opening, saving, leaving.</content>
internal sealed partial class BenchScreen
{
    private const int MostBoardsListed = 20;

    private void ShowStart()
    {
        var choices = ImmutableArray.CreateBuilder<Choice>();
        foreach (var path in folder.Recent()) choices.Add(new Choice(Path.GetFileName(path), $"again, from {Path.GetDirectoryName(path)}", () => Open(path, null, false)));
        foreach (var path in BoardsHere()) choices.Add(new Choice(Path.GetFileName(path), "in this folder", () => Open(path, null, false)));
        foreach (var sample in UserFolder.Samples()) choices.Add(new Choice(sample, "sample board with readings, to try out", () => OpenSample(sample)));
        choices.Add(new Choice("Open a file", "a board file (TOML)", AskForFile));
        choices.Add(new Choice("New board", "a board file to fill in, with an example of each line", MakeBoard));
        choices.Add(new Choice("Cautions", "for work on live boards", ShowCautions));
        choices.Add(new Choice("Quit", "", () => App?.RequestStop()));
        Put(new ChoicePanel(palette, "Which board is on the bench?", _ => [], choices.ToImmutable(), bench is null ? null : Close));
    }

    private ImmutableArray<string> BoardsHere()
    {
        try
        {
            var recent = folder.Recent();
            return [.. Directory.EnumerateFiles(Environment.CurrentDirectory, "*.toml").Where(f => !recent.Contains(f)).Order(StringComparer.Ordinal).Take(MostBoardsListed)];
        }
        catch (Exception failure) when (Screens.Workbench.IsFileFailure(failure))
        {
            return [];
        }
    }

    private void AskForFile() => Put(new FormPanel(palette, "Open a board",
        [new("board file", "", "the TOML file with the parts"), new("readings", "", "the CSV file; empty takes the one beside the board with the same name, or begins it")],
        values =>
        {
            if (string.IsNullOrWhiteSpace(values[0])) return "the name of a board file is needed";
            Open(values[0].Trim(), string.IsNullOrWhiteSpace(values[1]) ? null : values[1].Trim(), false);
            return null;
        }, ShowStart));

    private void MakeBoard() => Put(new FormPanel(palette, "A new board",
        [new("board file", "", "a name that is not in use; .toml is added"), new("title", "", "what the board is called")],
        values =>
        {
            var path = values[0].Trim();
            if (BoardTemplate.Write(ref path, values[1].Trim()) is { } refused) return refused;
            Open(path, null, false);
            Say($"F3 puts your parts in place of the examples; or edit {Path.GetFileName(path)}: it is taken over as you save it.", Tone.Doubt);
            return null;
        }, ShowStart));

    private void OpenSample(string name)
    {
        try
        {
            Open(folder.CopySample(name), null, false);
        }
        catch (Exception failure) when (Screens.Workbench.IsFileFailure(failure))
        {
            ShowProblem("The sample cannot be put anywhere", failure.Message);
        }
    }

    private void ShowProblem(string title, string text) =>
        Put(new TextPanel(palette, title, w => [.. ScreenLine.Paragraph(text, w, Tone.Bad)], "Enter back", Back));

    private void Open(string boardPath, string? readingsPath, bool skipBadRows)
    {
        Opening opening;
        try
        {
            // Nobody, not even this screen, may hold the readings that are opened.
            if (bench is { } held && held.ReadingsPath == Path.GetFullPath(readingsPath ?? Path.ChangeExtension(boardPath, ".csv")))
            {
                bench = null;
                held.Dispose();
            }

            opening = Screens.Workbench.Open(boardPath, readingsPath, skipBadRows, clock);
        }
        catch (Exception failure) when (Screens.Workbench.IsFileFailure(failure) || failure is ArgumentException)
        {
            ShowProblem("This cannot be opened", failure.Message);
            return;
        }

        if (opening.Workbench is not { } next)
        {
            ShowProblems(boardPath, readingsPath, opening);
            return;
        }

        bench?.Dispose();
        bench = next;
        next.Reported += report => App?.Invoke(() =>
        {
            if (bench == next) Take(report);
        });
        folder.Remember(boardPath);
        (view, partCursor, awaitsGuidance, saysChanged, hasOnlooker) = (ScreenView.Readings, 0, false, false, false);
        entry.Text = "";
        message = next.IsOurs
            ? opening.Problems.IsEmpty ? ("", Tone.Plain) : (opening.Problems[0].ToString(), Tone.Doubt)
            : ("Another screen has this readings file open: look, but enter there.", Tone.Doubt);
        Close();
        next.Start();
        if (next.Left is { } left) OfferLeft(next, left);
    }

    /// <summary>For a screen that looked on: the readings as they are now, to be entered here where the other screen is gone.</summary>
    private void OpenAnew(Workbench b)
    {
        var (cursor, shown) = (b.Session.Cursor, view);
        Open(b.BoardPath, b.ReadingsPath, false);
        if (bench is not { } next || next == b) return;
        if (panel is null) ShowView(shown);
        next.Look(s => s.InCondition(cursor.Condition) is var there && there.Rows.Any(r => r.Place == cursor) ? there.MoveTo(cursor) : there);
        Say(next.IsOurs ? "The other screen is closed: readings are entered here now." : "The readings were saved in the other screen: shown as they are now.", Tone.Doubt);
    }

    private void ShowProblems(string boardPath, string? readingsPath, Opening opening)
    {
        ImmutableArray<ScreenLine> Lines(int width) => [.. opening.Problems.SelectMany(p => ScreenLine.Paragraph(p.ToString(), width, p.IsError ? Tone.Bad : Tone.Doubt))];
        if (!opening.CanSkipRows)
        {
            Put(new TextPanel(palette, "This board cannot be opened", Lines, "Up Down scroll   Enter back", Back));
            return;
        }

        Ask("Some rows of the readings cannot be used", Lines,
        [
            new Choice("Go back", "nothing is taken; put the file right first", ShowStart),
            new Choice("Open without these rows", "the file as it is now is kept beside as .bak when you save", () => Open(boardPath, readingsPath, true)),
        ], ShowStart);
    }

    private void OfferLeft(Workbench b, LeftWork left)
    {
        var board = left.Board is null ? "" : $" Parts of {Path.GetFileName(b.BoardPath)} were changed.";
        var text = left.Readings is not { } entries ? $"An earlier session ended before its changes were saved.{board}"
            : $"An earlier session ended before its {entries.Entries} {(entries.Entries == 1 ? "entry was" : "entries were")} saved{When(entries.Time)}; {entries.Sets.Sum(s => s.Readings.Length)} readings in all.{board}";
        Put(new ChoicePanel(palette, "Entries were left unsaved", w => [.. ScreenLine.Paragraph(text, w)],
        [
            new Choice("Take them back", "go on where it ended", () =>
            {
                Close();
                Say(b.TakeLeft() ?? "Taken back; Ctrl+S puts them into the file.", Tone.Doubt);
            }),
            new Choice("Leave them", "begin with the files as they are; what was entered is kept beside them as .journal.declined", () =>
            {
                b.SetLeftAside();
                Close();
            }),
        ], null));
    }

    private static string When(DateTimeOffset? time) => time is { } t ? t.ToLocalTime().ToString("', the last at' yyyy-MM-dd HH:mm", CultureInfo.InvariantCulture) : "";

    /// <summary>Saves; where a file was changed meanwhile, asks first.</summary>
    /// <param name="then">what follows a save that succeeded</param>
    private void Save(Action? then)
    {
        if (bench is not { } b) return;
        try
        {
            var isBoard = b.Session.IsBoardDirty;
            var isReadings = b.Session.AreReadingsDirty || !isBoard;
            switch (b.Save())
            {
                case (SaveOutcome.Saved, _):
                    saysChanged = false;
                    Close();
                    Say($"Saved to {(isBoard && isReadings ? $"{b.ReadingsPath} and {Path.GetFileName(b.BoardPath)}" : isBoard ? b.BoardPath : b.ReadingsPath)}.");
                    then?.Invoke();
                    break;
                case (SaveOutcome.HeldElsewhere, _):
                    Close();
                    Say("Another screen has the readings file open; Ctrl+W saves under another name.", Tone.Bad);
                    break;
                case (_, true):
                    AskAboutBoard(b);
                    break;
                default:
                    AskAboutChange(b);
                    break;
            }
        }
        catch (Exception failure) when (Screens.Workbench.IsFileFailure(failure))
        {
            Close();
            Say($"Not saved: {failure.Message} Your entries are kept in the journal.", Tone.Bad);
        }
    }

    private void AskAboutChange(Workbench b) => Put(new ChoicePanel(palette, "The readings file was changed by another program",
        w => [.. ScreenLine.Paragraph($"{b.ReadingsPath} is no longer what was opened here. Nothing was overwritten.", w)],
    [
        new Choice("Bring both together", "their readings and yours; yours where both changed the same", () =>
        {
            Close();
            saysChanged = false;
            Say(b.Reconcile(), Tone.Doubt);
        }),
        new Choice("Save under another name", "leave their file alone", SaveAs),
        new Choice("Back", "nothing is written", Close),
    ], Close));

    private void SaveAs()
    {
        if (bench is not { } b) return;
        var path = Path.Combine(Path.GetDirectoryName(b.ReadingsPath) ?? "", Path.GetFileNameWithoutExtension(b.ReadingsPath) + "-2.csv");
        Put(new FormPanel(palette, "Save the readings under another name", [new("file", path, "a name that is not in use")],
            values =>
            {
                if (b.SaveAs(values[0].Trim()) is { } refused) return refused;
                saysChanged = false;
                Close();
                Say($"Saved to {b.ReadingsPath}.");
                return null;
            }, Close));
    }

    /// <summary>Leaves the board; asks when entries are not in the file.</summary>
    private void Leave(Action then)
    {
        if (bench is not { Session.IsDirty: true } b)
        {
            then();
            return;
        }

        Put(new ChoicePanel(palette, "Changes are not yet saved", w => [.. ScreenLine.Paragraph(b.Session.AreReadingsDirty ? b.ReadingsPath : "", w, Tone.Dim), .. ScreenLine.Paragraph(b.Session.IsBoardDirty ? b.BoardPath : "", w, Tone.Dim)],
        [
            new Choice("Save and leave", "", () => Save(then)),
            new Choice("Leave, keep the changes", "they are offered again at the next start", then),
            new Choice("Leave, drop the changes", "the files stay as they are", () =>
            {
                b.Abandon();
                then();
            }),
            new Choice("Back", "", Close),
        ], Close));
    }
}
