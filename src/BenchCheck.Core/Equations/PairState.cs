namespace BenchCheck.Core.Equations;

/// <summary>What holds of a pair (z, w) of a linear complementarity problem.</summary>
internal enum PairState : byte
{
    /// <summary>z ≥ 0, w ≥ 0, one of them zero</summary>
    Either,

    /// <summary>w = 0, z of either sign</summary>
    Held,

    /// <summary>z = 0, w of either sign</summary>
    Released,
}
