namespace BenchCheck.Screens;

/// <summary>What a piece of text means; the palette gives it its look. Nothing is said by tone alone: a word or mark says it too.</summary>
internal enum Tone
{
    Plain,
    Dim,
    Strong,
    Good,
    Doubt,
    Bad,

    /// <summary>the row that the cursor is on, a bar across the screen</summary>
    Chosen,
}
