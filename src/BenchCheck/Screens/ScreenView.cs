namespace BenchCheck.Screens;

/// <summary>What the work area shows.</summary>
internal enum ScreenView
{
    Readings,
    Parts,
    Plot,
}
