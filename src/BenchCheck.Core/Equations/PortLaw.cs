namespace BenchCheck.Core.Equations;

/// <summary>How the voltage of a port hangs on its current z.</summary>
internal enum PortLaw : byte
{
    /// <summary>v ≤ drop, z ≥ 0, one of them exactly: the constant-drop law</summary>
    Corner,

    /// <summary>the same at an output that stays on one side of a supply</summary>
    Limit,

    /// <summary>a smooth curve: the junction law</summary>
    Junction,

    /// <summary>v in proportion to z, of either sign: what takes a prop away again</summary>
    Line,
}
