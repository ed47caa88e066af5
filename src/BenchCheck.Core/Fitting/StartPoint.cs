namespace BenchCheck.Core.Fitting;

/// <summary>A model linearised where a fit begins: it depends on the board and the places of its readings only, so it serves any number of boards.</summary>
/// <param name="Phi">p parameters</param>
/// <param name="Predicted">m predictions there</param>
/// <param name="Jacobian">m×p derivatives there</param>
/// <param name="Moved">the parameter that was moved off its prior mean to get here; −1 for none</param>
public sealed record StartPoint(double[] Phi, double[] Predicted, double[] Jacobian, int Moved);
