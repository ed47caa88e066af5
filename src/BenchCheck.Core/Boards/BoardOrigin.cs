namespace BenchCheck.Core.Boards;

/// <summary>Where the board comes from, which decides the faults that are likelier.</summary>
public enum BoardOrigin
{
    /// <summary>fresh from assembly: wrong, swapped and unsoldered parts</summary>
    NewBuild,

    /// <summary>worked once and came back: open, shorted and drifted parts</summary>
    Service,
}
