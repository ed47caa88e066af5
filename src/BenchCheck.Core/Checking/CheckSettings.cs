using BenchCheck.Core.Equations;

namespace BenchCheck.Core.Checking;

/// <summary>How a predicted band is computed.</summary>
public enum BandMethod
{
    /// <summary>first-order propagation (JCGM 100:2008, 5.1.2)</summary>
    FirstOrder,

    /// <summary>Monte Carlo (JCGM 101:2008)</summary>
    MonteCarlo,

    /// <summary>worst case at the corners of the tolerance box</summary>
    WorstCase,
}

/// <summary>What the user may choose about a check.</summary>
public sealed record CheckSettings
{
    public static CheckSettings Default { get; } = new();

    /// <summary>Confidence of the verdict and of the coverage intervals.</summary>
    public double Confidence { get; init; } = 0.95;

    public BandMethod Bands { get; init; } = BandMethod.FirstOrder;

    public JunctionLaw Law { get; init; } = JunctionLaw.Exponential;

    /// <summary>Draws of a Monte Carlo band.</summary>
    public int Draws { get; init; } = 10_000;

    /// <summary>Seed of everything drawn at random, so that a check can be repeated to the digit.</summary>
    public int Seed { get; init; } = 1;

    /// <summary>Search for faults and next readings; without it the check is faster and its suspects are empty.</summary>
    public bool FindFaults { get; init; } = true;
}
