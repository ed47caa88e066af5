using System.Collections.Immutable;
using BenchCheck.Core.Metering;
using BenchCheck.Files;
using Terminal.Gui.Input;
using Terminal.Gui.Views;

namespace BenchCheck.Screens;

/// <content>What keys and menus do.</content>
internal sealed partial class BenchScreen
{
    private ImmutableArray<ScreenCommand> MakeCommands() =>
    [
        new(Key.F1, "F1", "Help", "_Keys and words", "this help", ShowHelp),
        new(Key.F2, "F2", "View", "_Readings", "readings beside their predictions", () => ShowView(ScreenView.Readings)),
        new(Key.F3, "F3", "View", "_Parts", "parts: list, estimate, interval, power", () => ShowView(ScreenView.Parts)),
        new(Key.F4, "F4", "View", "P_lot", "plot: readings in their bands, residuals", () => ShowView(ScreenView.Plot)),
        new(Key.F5, "F5", "Reading", "_Condition", "the next condition of the board", () => Look(s => s.NextCondition())),
        new(Key.F6, "F6", "Reading", "_Add elsewhere", "add a reading anywhere: node against node, a current, another meter or range; in the parts view: add a part", () => InView(AddReading, AddPart)),
        new(Key.F7, "F7", "View", "_Suspect in table", "show the readings as the next suspect explains them", () => Look(s => s.NextSuspect())),
        new(Key.F8, "F8", "Help", "_Cautions", "cautions, and what was assumed", ShowCautions),
        new(Key.L.WithCtrl, "Ctrl+L", "Board", "Bench _log", "the bench log: file this check, look at what is on record of this board", ShowLog),
        new(Key.F9, "F9", null, "Menu", "the menus", OpenMenu),
        new(Key.U.WithCtrl, "Ctrl+U", "Reading", "_Undo", "undo the last entry", () => EnterHistory(s => s.CanUndo, s => s.Undo(), "Nothing to undo.")),
        new(Key.Y.WithCtrl, "Ctrl+Y", "Reading", "_Redo", "redo what was undone", () => EnterHistory(s => s.CanRedo, s => s.Redo(), "Nothing to redo.")),
        new(Key.R.WithCtrl, "Ctrl+R", "Reading", "Re_peat", "take the typed value as a repeat of the reading, not in its place", () => Commit(true)),
        new(Key.N.WithCtrl, "Ctrl+N", "Reading", "_Note", "a note on the reading", EditNote),
        new(Key.D.WithCtrl, "Ctrl+D", "Reading", "_Edit in full", "edit meter, range, uncertainty and note of the reading; in the parts view: the part", () => InView(EditReading, EditPart)),
        new(null, "Enter", "Part", "_Edit", "", EditPart),
        new(null, "F6", "Part", "_Add", "", AddPart),
        new(null, "Del", "Part", "_Remove", "", RemovePart),
        new(Key.Delete, "Del", "Reading", "De_lete", "remove the reading of the row; in the parts view: the part", () => InView(Delete, RemovePart)),
        new(Key.G.WithCtrl, "Ctrl+G", "Reading", "_Guided order", "guided order on or off: after Enter the cursor goes to the suggested next reading", ToggleGuided),
        new(Key.O.WithCtrl, "Ctrl+O", "View", "S_ort", "sort: as the board, worst first, as entered", () => Look(s => s with { Order = (RowOrder)(((int)s.Order + 1) % 3) })),
        new(Key.F.WithCtrl, "Ctrl+F", "View", "_Flagged only", "only flagged readings, or all", () => Look(s => s with { OnlyFlagged = !s.OnlyFlagged })),
        new(Key.B.WithCtrl, "Ctrl+B", "Board", "_Next of the file", "the next board of a readings file with several", () => Look(s => s.NextBoard())),
        new(Key.K.WithCtrl, "Ctrl+K", "Board", "Serial n_umber", "the serial of the board on the bench, under which its readings are kept and filed", EditSerial),
        new(Key.S.WithCtrl, "Ctrl+S", "Board", "_Save", "put entries into the readings file, changed parts into the board file", () => Save(null)),
        new(Key.W.WithCtrl, "Ctrl+W", "Board", "Save _as", "save the readings under another name and go on there", SaveAs),
        new(Key.T.WithCtrl, "Ctrl+T", "Board", "_Take from a file", "readings from another file, seen before they are taken", Import),
        new(Key.E.WithCtrl, "Ctrl+E", "Board", "_Export check", "the check as a picture (PNG, SVG), a report (HTML), CSV or JSON", Export),
        new(Key.P.WithCtrl, "Ctrl+P", "Board", "_Open another", "another board", () => Leave(ShowStart)),
        new(Key.Z.WithCtrl, "Ctrl+Z", "Board", "To the s_hell", "suspend: back to the shell until \"fg\"", Suspend),
        new(Key.Q.WithCtrl, "Ctrl+Q", "Board", "_Quit", "quit; entries not saved are offered again at the next start", () => Leave(() => App?.RequestStop())),
    ];

    private MenuBar MakeMenu()
    {
        var bar = new MenuBar(
            from heading in (string[])["Board", "Reading", "Part", "View", "Help"]
            select new MenuBarItem("_" + heading, commands.Where(c => c.Menu == heading).Select(c => new MenuItem(c.Label, c.KeyName, () => c.Run()))));
        bar.SetScheme(palette.Scheme());
        bar.Key = Key.F9;
        foreach (var item in bar.SubViews.OfType<MenuBarItem>())
        {
            item.PopoverMenu?.Root?.SetScheme(palette.MenuScheme());

            // Keys go to the field again as soon as a menu is closed and none other opened in its place.
            item.PopoverMenuOpenChanged += (_, change) =>
            {
                if (!change.NewValue) App?.Invoke(ReturnFocus);
            };
        }

        return bar;
    }

    private void InView(Action readings, Action parts)
    {
        if (view == ScreenView.Parts) parts();
        else readings();
    }

    private void OpenMenu()
    {
        menu.SetFocus();
        menu.InvokeCommand(Command.HotKey);
    }

    private bool PressCommand(Key key)
    {
        if (IsMenuOpen) return false;
        if (commands.FirstOrDefault(c => c.Key is { } k && k == key) is not { } command) return false;
        if (command.KeyName == "Del" && entry.Text.Length > 0) return false;
        if (panel is not null && command.KeyName != "Ctrl+Q") return true;
        if (bench is null && command.KeyName is not ("Ctrl+Q" or "F1" or "F8")) return true;
        command.Run();
        return true;
    }

    /// <summary>Hands the terminal to the shell until the user brings the program back; then everything is drawn anew.</summary>
    private void Suspend()
    {
        if (OperatingSystem.IsWindows()) Say("There is no shell to go back to here.", Tone.Doubt);
        else App?.Driver?.Suspend();
        DrawAnew();
    }

    /// <summary>Draws every cell again: what the terminal shows is no longer what was drawn last.</summary>
    public void DrawAnew()
    {
        App?.Driver?.ClearContents();
        SetNeedsLayout();
        App?.LayoutAndDraw(true);
    }

    private void ReturnFocus()
    {
        if (IsMenuOpen) return;
        if (panel is { } p) p.SetFocus();
        else entry.SetFocus();
    }

    private bool IsMenuOpen => App?.Popovers?.GetActivePopover() is not null;

    private bool PressAtEntry(Key key) => panel is null && !IsMenuOpen && (PressCommand(key) || PressInView(key));

    private bool PressInView(Key key)
    {
        if (IsMenuOpen) return false;
        if (bench is null) return key == Key.Esc;
        if (key == Key.CursorDown) MoveCursor(1);
        else if (key == Key.CursorUp) MoveCursor(-1);
        else if (key == Key.PageDown) MoveCursor(10);
        else if (key == Key.PageUp) MoveCursor(-10);
        else if (key == Key.Enter && view == ScreenView.Readings) Commit(false);
        else if (key == Key.Enter && view == ScreenView.Parts) EditPart();
        else if (key == Key.Tab || key == Key.Tab.WithShift) ToggleDetail();
        else if (key == Key.Esc) ClearEntry();
        else return view != ScreenView.Readings && !key.IsCtrl && !key.IsAlt && key.AsRune.Value >= ' ';
        return true;
    }

    private void ClearEntry()
    {
        entry.Text = "";
        if (view != ScreenView.Readings) ShowView(ScreenView.Readings);
        Say("");
    }

    private void ToggleDetail()
    {
        showsDetail = !showsDetail;
        SetNeedsLayout();
        Render();
    }

    private void ShowView(ScreenView next)
    {
        view = next;
        SetNeedsLayout();
        Say("");
    }

    private void MoveCursor(int by)
    {
        if (bench is not { } b) return;
        if (view != ScreenView.Parts)
        {
            Look(s => s.Move(by));
            return;
        }

        partCursor = Math.Clamp(partCursor + by, 0, Math.Max(0, PartsPane.Rows(b.Session).Length - 1));
        Render();
    }

    private void ClickTable(int line)
    {
        if (bench is not { } b || line == 0) return;
        if (view == ScreenView.Parts)
        {
            partCursor = Math.Clamp(PartsPane.FirstRow(b.Session, partCursor, table.Frame.Height) + line - 1, 0, Math.Max(0, PartsPane.Rows(b.Session).Length - 1));
            Render();
        }
        else if (view == ScreenView.Readings)
        {
            var at = ReadingsPane.FirstRow(b.Session, table.Frame.Height) + line - 1;
            if (at < b.Session.Rows.Length) Look(s => s.MoveTo(s.Rows[at].Place));
        }
    }

    /// <summary>Takes the typed value; an empty field moves on.</summary>
    private void Commit(bool asRepeat)
    {
        if (bench is not { } b) return;
        var typed = entry.Text.Trim();
        if (typed.Length == 0)
        {
            if (!asRepeat) MoveCursor(1);
            else Say("Type the value of the repeat first, then press Ctrl+R.", Tone.Doubt);
            return;
        }

        var row = b.Session.Row?.Place;
        if (row is null)
        {
            Say("There is no row to take a value here: F6 adds a reading anywhere.", Tone.Doubt);
            return;
        }

        if (b.Enter((s, time) => s.Type(typed, asRepeat, time)) is { } refused)
        {
            Say(refused, Tone.Bad);
            return;
        }

        entry.Text = "";
        awaitsGuidance = b.Session.IsGuided;
        var taken = b.Session.Row?.Reading;
        if (!asRepeat) b.Look(s => s.Move(1));
        var unit = row.Quantity.Unit();
        Say(taken is null ? "" : $"{row.Name(b.Session.Bench.Board)} = {Words.Number(taken.Value, unit)}{(taken.Repeats > 1 ? $", mean of {taken.Repeats}" : "")}. Ctrl+U undoes it.");
        SetNeedsLayout();
    }

    private void EnterHistory(Func<BenchSession, bool> can, Func<BenchSession, BenchSession> step, string nothing)
    {
        if (bench is not { } b) return;
        if (!can(b.Session)) Say(nothing, Tone.Doubt);
        else Say(b.Enter((s, _) => step(s)), Tone.Bad);
    }

    private void Delete()
    {
        if (bench is not { } b) return;
        if (b.Session.Row?.Reading is null) Say("Nothing was read in this row.", Tone.Doubt);
        else if (b.Enter((s, _) => s.Delete()) is { } refused) Say(refused, Tone.Bad);
        else Say("Removed; Ctrl+U brings it back.");
    }

    private void ToggleGuided()
    {
        Look(s => s with { IsGuided = !s.IsGuided });
        if (bench is not { } b) return;
        if (b.Session is { IsGuided: true, Suggested: { } next } && entry.Text.Length == 0) Look(s => s.MoveTo(next));
        Say(b.Session.IsGuided ? "Guided order: the cursor goes to the most telling reading after each entry." : "Guided order is off.");
    }

    private void ShowHelp() => Put(new TextPanel(palette, "Help", w => HelpText.Lines(view, commands, w), "Up Down PgUp PgDn scroll   Esc back", Back));

    private void ShowCautions() => Put(new TextPanel(palette, "Cautions", w => CautionText.Lines(bench?.Session, w), "Esc back", Back));

    private void Back()
    {
        Close();
        if (bench is null) ShowStart();
    }
}
