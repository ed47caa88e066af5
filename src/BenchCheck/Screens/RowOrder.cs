namespace BenchCheck.Screens;

/// <summary>How the readings table is sorted.</summary>
internal enum RowOrder
{
    /// <summary>nodes as the parts list names them</summary>
    Board,

    /// <summary>the reading furthest off first</summary>
    Worst,

    /// <summary>as entered; unmeasured nodes last</summary>
    Entered,
}
