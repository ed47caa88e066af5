using Terminal.Gui.Input;
using Terminal.Gui.Views;

namespace BenchCheck.Screens;

/// <summary>A field to type in that lets its owner see every key first.</summary>
internal sealed class EntryField : TextField
{
    private const int Longest = 500;
    private readonly Func<Key, bool> before;

    /// <param name="before">true when the key was not meant for the field</param>
    public EntryField(Palette palette, Func<Key, bool> before)
    {
        this.before = before;
        SetScheme(palette.Scheme());
    }

    protected override bool OnKeyDown(Key key)
    {
        if (before(key)) return true;
        if (Text.Length >= Longest && !key.IsCtrl && key.AsRune.Value >= ' ') return true;
        return base.OnKeyDown(key);
    }
}
