namespace BenchCheck.Core.Equations;

/// <summary>How a conducting junction's voltage depends on its current.</summary>
public enum JunctionLaw
{
    /// <summary>the drop follows the current (Shockley)</summary>
    Exponential,

    /// <summary>the drop is the same at any current</summary>
    ConstantDrop,
}
