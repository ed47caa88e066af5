using System.Collections.Immutable;
using BenchCheck.Core.Checking;
using BenchCheck.Files;
using Terminal.Gui.Input;
using Terminal.Gui.ViewBase;
using Terminal.Gui.Views;

namespace BenchCheck.Screens;

/// <summary>The bench screen: menus, the view chosen, the field to type in, what is at hand in the line below. Draws a <see cref="Workbench"/>.</summary>
internal sealed partial class BenchScreen : Runnable
{
    private const int PanesFrom = 112;
    private const int MostMessageLines = 4;
    private static readonly TimeSpan LookAtDisk = TimeSpan.FromSeconds(2);

    private readonly UserFolder folder;
    private readonly BoardRecords records;
    private readonly TimeProvider clock;
    private readonly Palette palette;
    private readonly ImmutableArray<ScreenCommand> commands;
    private readonly PaneView head;
    private readonly PaneView table;
    private readonly PaneView below;
    private readonly PaneView beside;
    private readonly PaneView third;
    private readonly PaneView prompt;
    private readonly PaneView foot;
    private readonly EntryField entry;
    private readonly MenuBar menu;
    private Workbench? bench;
    private Panel? panel;
    private ScreenView view = ScreenView.Readings;
    private bool showsDetail;
    private bool awaitsGuidance;
    private bool saysChanged;
    private bool hasOnlooker;
    private int partCursor;
    private (string Text, Tone Tone) message = ("", Tone.Plain);

    public BenchScreen(UserFolder folder, BoardRecords records, TimeProvider clock, Palette palette)
    {
        (this.folder, this.records, this.clock, this.palette) = (folder, records, clock, palette);
        Width = Dim.Fill();
        Height = Dim.Fill();
        SetScheme(palette.Scheme());
        commands = MakeCommands();
        head = new PaneView(palette);
        table = new PaneView(palette);
        below = new PaneView(palette);
        beside = new PaneView(palette);
        third = new PaneView(palette);
        prompt = new PaneView(palette);
        foot = new PaneView(palette);
        entry = new EntryField(palette, PressAtEntry);
        menu = MakeMenu();
        Add(menu, head, table, below, beside, third, prompt, entry, foot);
        table.Clicked += ClickTable;
        table.Wheeled += MoveCursor;
        below.Clicked += line => { if (view == ScreenView.Readings && !showsDetail && line > 0) Look(s => s.NextSuspect()); };
        SubViewLayout += (_, _) => Arrange();
        SubViewsLaidOut += (_, _) => Render();
    }

    /// <summary>The board on the bench; null while none is open.</summary>
    public Workbench? Workbench => bench;

    /// <summary>Begins with a board, or with the choice of one.</summary>
    public void Begin(string? boardPath, string? readingsPath)
    {
        entry.SetFocus();
        App?.AddTimeout(LookAtDisk, LookForChange);
        Action go = boardPath is null ? ShowStart : () => Open(boardPath, readingsPath, false);
        if (folder.HasAcknowledgedCautions) go();
        else
        {
            Put(new TextPanel(palette, "BenchCheck: before the lead touches a board", w => CautionText.Lines(null, w), "Enter I have read this", () =>
            {
                folder.AcknowledgeCautions();
                Close();
                go();
            }));
        }
    }

    /// <summary>Draws everything anew from the session.</summary>
    public void Render()
    {
        var width = Math.Max(20, Viewport.Width);
        foot.Lines = [ScreenLine.Of(" " + (panel?.Keys ?? FootKeys(width)), Tone.Chosen)];
        var shows = panel is null && bench is not null;
        foreach (var pane in (ReadOnlySpan<View>)[head, table, below, beside, third, prompt, entry]) pane.Visible = shows;
        if (panel is null && bench is { } b) RenderWork(b, width);
        SetNeedsDraw();
    }

    protected override bool OnKeyDown(Key key) => !IsMenuOpen && (panel is { } p ? p.Press(key) || PressCommand(key) || key == Key.Esc : PressCommand(key) || PressInView(key));

    protected override void Dispose(bool disposing)
    {
        if (disposing) bench?.Dispose();
        base.Dispose(disposing);
    }

    private void RenderWork(Workbench b, int width)
    {
        var session = b.Session;
        head.Lines = HeadLines.Of(b, width);
        var at = session.Row?.Place.Name(session.Bench.Board) ?? session.Cursor.At;
        prompt.Lines =
        [
            view switch
            {
                ScreenView.Readings => ScreenLine.Of($"{at}, {session.Condition}:", Tone.Strong),
                ScreenView.Parts => ScreenLine.Of("Enter edit   F6 add   Del remove   Ctrl+U undo   Esc back to the readings", Tone.Dim),
                _ => ScreenLine.Of("Up Down choose   F5 next condition   Ctrl+E export   Esc back to the readings", Tone.Dim),
            },
            .. message.Text.Length > 0 ? MessageLines(width) : [ScreenLine.Of(OutOfSight(session), Tone.Dim)],
        ];
        entry.Visible = view == ScreenView.Readings;
        (table.Lines, below.Lines, beside.Lines, third.Lines) = view switch
        {
            ScreenView.Parts => (PartsPane.Lines(session, partCursor, width, table.Frame.Height), PartsPane.Detail(session, partCursor, width), [], []),
            ScreenView.Plot => (PlotPane.Lines(session, width, table.Frame.Height), DetailPane.Lines(session, width), [], []),
            _ when width >= PanesFrom => (ReadingsPane.Lines(session, width, table.Frame.Height), SuspectsPane.Lines(session, below.Frame.Width), NextPane.Lines(session, beside.Frame.Width), DetailPane.Lines(session, third.Frame.Width)),
            _ when showsDetail => (ReadingsPane.Lines(session, width, table.Frame.Height), DetailPane.Lines(session, width), [], []),
            _ => (ReadingsPane.Lines(session, width, table.Frame.Height), SuspectsPane.Lines(session, below.Frame.Width), NextPane.Lines(session, beside.Frame.Width), ImmutableArray<ScreenLine>.Empty),
        };
    }

    /// <summary>Shares the screen out: menu, head, table, prompt, panes, foot; the table gets what the others leave.</summary>
    private void Arrange()
    {
        var (width, height) = (Viewport.Width, Viewport.Height);
        var said = MessageLines(width).Length;
        var free = height - 1 - 3 - (1 + said) - 1;
        var rows = Math.Clamp(RowsWanted(), 2, Math.Max(2, free - (view == ScreenView.Readings ? Math.Clamp(height / 3, 5, 18) : 6)));
        var panes = Math.Max(1, free - rows);
        var y = Put(menu, 0, 0, width, 1);
        y = Put(head, 0, y, width, 3);
        y = Put(table, 0, y, width, rows);
        var label = Math.Min(width / 2, prompt.Lines is [var first, ..] ? first.Text.Length + 1 : 20);
        Put(entry, label, y, Math.Max(1, Math.Min(24, width - label)), 1);
        y = Put(prompt, 0, y, width, 1 + said);
        var isWide = width >= PanesFrom;
        var hasThree = view == ScreenView.Readings && isWide;
        var hasTwo = view == ScreenView.Readings && !showsDetail;
        var part = hasThree ? width / 3 : hasTwo ? width / 2 : width;
        Put(below, 0, y, hasThree || hasTwo ? part - 1 : width, panes);
        Put(beside, part, y, hasThree ? part - 1 : hasTwo ? width - part : 0, panes);
        y = Put(third, 2 * part, y, hasThree ? width - 2 * part : 0, panes);
        Put(foot, 0, height - 1, width, 1);
        if (panel is { } p) Put(p, 0, 1, width, Math.Max(1, height - 2));

        static int Put(View view, int x, int y, int width, int height)
        {
            view.X = x;
            view.Y = y;
            view.Width = width;
            view.Height = height;
            return y + height;
        }
    }

    /// <summary>Says what the table does not show: rows for which there is no room, flagged readings of other conditions.</summary>
    private string OutOfSight(BenchSession session)
    {
        var elsewhere = (session.Result?.Readings ?? []).Where(r => r.Verdict != ReadingVerdict.In && r.Reading.Condition != session.Condition)
            .GroupBy(r => r.Reading.Condition).Select(c => $"{c.Count()} flagged in {c.Key}").ToArray();
        return string.Join("   ", [.. RowsNotShown(session), .. elsewhere.Length == 0 || view == ScreenView.Parts ? [] : new[] { string.Join(", ", elsewhere) + " (F5)" }]);
    }

    private string[] RowsNotShown(BenchSession session)
    {
        var (at, count) = view switch
        {
            ScreenView.Parts => (partCursor, PartsPane.Rows(session).Length),
            ScreenView.Readings => (session.RowIndex, session.Rows.Length),
            _ => (0, 0),
        };
        return count >= table.Frame.Height ? [$"row {at + 1} of {count}"] : [];
    }

    private int RowsWanted() => bench is not { } b ? 0 : view switch
    {
        ScreenView.Parts => PartsPane.Rows(b.Session).Length + 1,
        ScreenView.Plot => PlotPane.Height(b.Session),
        _ => Math.Max(b.Session.Rows.Length, 1) + 1,
    };

    private static string FootKeys(int width) => width < 80
        ? "F1 help  F2 F3 F4 views  F9 menu  ^L log  ^Q quit"
        : "F1 help  F2 readings  F3 parts  F4 plot  F8 cautions  F9 menu  ^L log  ^Q quit";

    private void Put(Panel next)
    {
        Close();
        panel = next;
        Add(next);
        next.SetFocus();
        if (next is FormPanel form) form.Begin();
        SetNeedsLayout();
        next.Show();
        Render();
    }

    private void Close()
    {
        if (panel is { } p)
        {
            panel = null;
            Remove(p);
            p.Dispose();
        }

        entry.SetFocus();
        SetNeedsLayout();
        Render();
    }

    /// <summary>A message is said whole, on as many lines as it takes.</summary>
    private ImmutableArray<ScreenLine> MessageLines(int width) => [.. ScreenLine.Paragraph(message.Text, Math.Max(20, width), message.Tone).Take(MostMessageLines)];

    private void Say(string? text, Tone tone = Tone.Plain)
    {
        message = (text ?? "", tone);
        SetNeedsLayout();
        Render();
    }

    private void Look(Func<BenchSession, BenchSession> command)
    {
        if (bench is null) return;
        bench.Look(command);
        SetNeedsLayout();
        Render();
    }

    private void Take(CheckReport report)
    {
        if (bench is not { } b) return;
        var isComplete = b.Take(report);
        if (isComplete && awaitsGuidance)
        {
            awaitsGuidance = false;
            if (b.Session.IsGuided) message = Guide(b);
        }

        SetNeedsLayout();
        Render();
    }

    /// <summary>Moves the cursor to the suggested reading, unless a value for another row is being typed; says what was done.</summary>
    private (string Text, Tone Tone) Guide(Workbench b)
    {
        if (b.Session.Suggested is not { } next) return ("No further reading would tell more.", Tone.Plain);
        var name = $"{next.Name(b.Session.Bench.Board)}, {next.Condition}";
        if (entry.Text.Length > 0) return ($"Next would be {name}; you are typing, so the cursor stays.", Tone.Doubt);
        b.Look(s => s.MoveTo(next));
        return ($"Next: {name}.", Tone.Plain);
    }

    /// <summary>Looks at what others do to the files of the board on the bench.</summary>
    private bool LookForChange()
    {
        if (bench is not { } b || panel is not null) return true;
        if (!b.IsOurs)
        {
            if (b.MayOpenAnew) OpenAnew(b);
            return true;
        }

        if (b.HasChangedOnDisk() != saysChanged)
        {
            saysChanged = !saysChanged;
            if (saysChanged) Say("The readings file was changed by another program: Ctrl+S brings both together.", Tone.Doubt);
        }

        if (b.HasOnlooker != hasOnlooker)
        {
            hasOnlooker = !hasOnlooker;
            Say(hasOnlooker ? "Another screen has opened these readings too; it looks on." : "The other screen is closed.", Tone.Doubt);
        }

        if (b.FollowBoard() is { } news)
        {
            SetNeedsLayout();
            Say(news, Tone.Doubt);
        }

        return true;
    }
}
