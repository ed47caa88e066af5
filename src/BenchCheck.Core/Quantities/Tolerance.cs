namespace BenchCheck.Core.Quantities;

/// <summary>How far a value may lie from its nominal: a half-width, never negative, relative or absolute.</summary>
public readonly record struct Tolerance
{
    private Tolerance(double halfWidth, bool relative)
    {
        if (!(halfWidth >= 0) || double.IsInfinity(halfWidth))
            throw new ArgumentOutOfRangeException(nameof(halfWidth), halfWidth, "a tolerance is a finite half-width, zero or more");
        HalfWidth = halfWidth;
        IsRelative = relative;
    }

    /// <summary>Half-width: a fraction of the nominal when <see cref="IsRelative"/>, else in the unit of the nominal.</summary>
    public double HalfWidth { get; }

    public bool IsRelative { get; }

    public static Tolerance Percent(double percent) => new(percent / 100, true);

    public static Tolerance Absolute(double halfWidth) => new(halfWidth, false);

    /// <summary>Half-width in the unit of <paramref name="nominal"/>.</summary>
    public double Around(double nominal) => IsRelative ? Math.Abs(nominal) * HalfWidth : HalfWidth;
}
