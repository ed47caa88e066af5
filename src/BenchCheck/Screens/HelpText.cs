using System.Collections.Immutable;

namespace BenchCheck.Screens;

/// <summary>The help: what to do first, then every key of the view it was asked from.</summary>
internal static class HelpText
{
    private const int KeyWidth = 14;

    private static readonly (string Key, string Help)[] Readings =
    [
        ("a value", "type it where the lead is: 6.42, 652m, 4k7, 12 V; a decimal comma is understood"),
        ("Enter", "take the value: it is on the disk, and the board is checked anew"),
        ("Up Down", "the row that the next value goes to; PgUp, PgDn by ten; a click does the same"),
        ("Esc", "empty the field"),
        ("Del", "remove the reading of the row (field empty); Ctrl+U brings it back"),
        ("Tab", "below the table: suspects and next reading, or the reading in detail"),
    ];

    private static readonly (string Key, string Help)[] Parts = 
    [
        ("Up Down", "choose a part; its pins, state and power stand below"),
        ("Enter", "edit it: values, tolerances, the nodes of its pins; the board is checked anew at once"),
        ("F6", "add a part"),
        ("Del", "remove it; Ctrl+U brings it back"),
        ("Ctrl+S", "save the board file: only what was changed in it changes, comments stay"),
    ];

    private static readonly (string Key, string Help)[] Plot = [("Up Down", "scroll to the next reading")];

    public static ImmutableArray<ScreenLine> Lines(ScreenView view, IEnumerable<ScreenCommand> commands, int width)
    {
        var lines = ImmutableArray.CreateBuilder<ScreenLine>();
        lines.AddRange(ScreenLine.Paragraph(
            "Put the lead on the node of the marked row, type what the meter shows, press Enter. Verdict, suspects and the most telling next reading follow at once. "
            + "Entries are kept on disk from that moment; Ctrl+S puts them into the readings file.", width));
        lines.Add(ScreenLine.Empty);
        var (name, here) = view switch { ScreenView.Parts => ("In the parts view", Parts), ScreenView.Plot => ("In the plot", Plot), _ => ("In the readings view", Readings) };
        lines.Add(ScreenLine.Of(name, Tone.Strong));
        foreach (var (key, help) in here) lines.AddRange(ScreenLine.Paragraph(help, width, Tone.Plain, ScreenLine.Fit(key, KeyWidth)));
        lines.Add(ScreenLine.Empty);
        lines.Add(ScreenLine.Of("Everywhere", Tone.Strong));
        foreach (var command in commands.Where(c => c.Key is not null)) lines.AddRange(ScreenLine.Paragraph(command.Help, width, Tone.Plain, ScreenLine.Fit(command.KeyName, KeyWidth)));
        lines.Add(ScreenLine.Empty);
        lines.Add(ScreenLine.Of("Words", Tone.Strong));
        foreach (var (word, meaning) in Words) lines.AddRange(ScreenLine.Paragraph(meaning, width, Tone.Plain, ScreenLine.Fit(word, KeyWidth)));
        return lines.ToImmutable();
    }

    private static readonly (string Word, string Meaning)[] Words =
    [
        ("predicted", "what this meter shows on a board of nominal parts, its loading included"),
        ("band", "what the tolerances of the parts allow"),
        ("En", "difference over its expanded uncertainty (ISO 13528): within ±1 is in"),
        ("in", "in tolerance; \"doubtful ?\" lies in the guard band; \"OUT !\" is out of tolerance"),
        ("bit", "what a reading is expected to tell about the suspects; one bit halves them"),
    ];
}
