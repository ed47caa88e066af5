namespace BenchCheck.Core.Boards;

/// <summary>The signal generator of a small-signal condition.</summary>
/// <param name="At">node that it drives</param>
/// <param name="Against">its other lead</param>
/// <param name="Volts">RMS voltage that it is set to, unloaded; null when only ratios are read</param>
/// <param name="Ohms">its source resistance</param>
public sealed record Drive(string At, string Against, double? Volts, double Ohms);
