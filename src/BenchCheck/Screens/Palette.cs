using Terminal.Gui.Drawing;
using Attribute = Terminal.Gui.Drawing.Attribute;

namespace BenchCheck.Screens;

/// <summary>The look of each tone: the sixteen colours on the terminal's own background, or none at all (NO_COLOR) with bold, underline and reverse.</summary>
internal sealed class Palette(bool hasColour)
{
    public static Palette ForEnvironment() => new(string.IsNullOrEmpty(Environment.GetEnvironmentVariable("NO_COLOR")));

    public Attribute Of(Tone tone) => tone switch
    {
        Tone.Dim => Make(ColorName16.DarkGray, TextStyle.None),
        Tone.Strong => Make(null, TextStyle.Bold),
        Tone.Good => Make(ColorName16.Green, TextStyle.None),
        Tone.Doubt => Make(ColorName16.Yellow, TextStyle.Underline),
        Tone.Bad => Make(ColorName16.BrightRed, TextStyle.Bold),
        Tone.Chosen => Make(null, TextStyle.Reverse),
        _ => Make(null, TextStyle.None),
    };

    /// <summary>The same look for the library's own views.</summary>
    public Scheme Scheme() => new(Of(Tone.Plain))
    {
        Normal = Of(Tone.Plain), HotNormal = Make(null, TextStyle.Underline), Focus = Of(Tone.Chosen), HotFocus = Make(null, TextStyle.Reverse | TextStyle.Underline),
        Active = Of(Tone.Chosen), HotActive = Make(null, TextStyle.Reverse | TextStyle.Underline), Highlight = Of(Tone.Strong),
        Editable = Make(null, TextStyle.Underline), ReadOnly = Of(Tone.Dim), Disabled = Of(Tone.Dim),
    };

    /// <summary>The look of an open menu: it stands out from what lies under it without colour.</summary>
    public Scheme MenuScheme() => new(Of(Tone.Chosen))
    {
        Normal = Of(Tone.Chosen), HotNormal = Make(null, TextStyle.Reverse | TextStyle.Underline), Focus = Make(null, TextStyle.Bold), HotFocus = Make(null, TextStyle.Bold | TextStyle.Underline),
        Active = Make(null, TextStyle.Bold), HotActive = Make(null, TextStyle.Bold | TextStyle.Underline), Highlight = Of(Tone.Chosen), Disabled = Of(Tone.Chosen),
    };

    private Attribute Make(ColorName16? colour, TextStyle style) =>
        new(hasColour && colour is { } name ? new Color(name) : Color.None, Color.None, style);
}
