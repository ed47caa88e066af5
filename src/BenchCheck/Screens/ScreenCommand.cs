using Terminal.Gui.Input;

namespace BenchCheck.Screens;

/// <summary>One thing that the screen can do: its key, its place in the menus, its words in the help.</summary>
/// <param name="Key">null for one that only the menu offers</param>
/// <param name="Menu">heading under which the menu lists it; null for one that only the help lists</param>
/// <param name="Label">short, for the menu; the underscore stands before its letter</param>
/// <param name="Help">one line for the help</param>
internal sealed record ScreenCommand(Key? Key, string KeyName, string? Menu, string Label, string Help, Action Run);
