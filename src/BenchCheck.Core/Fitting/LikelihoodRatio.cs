namespace BenchCheck.Core.Fitting;

/// <summary>The generalised likelihood ratio of one explanation of a discrepancy: that it is noise plus an unknown multiple of a known signature.</summary>
/// <remarks>
/// With r ~ N(b f, V): d = fᵀ V⁻¹ r, C = fᵀ V⁻¹ f, T = d²/C, b̂ = d/C with u(b̂) = 1/√C. T is how much rᵀ V⁻¹ r falls when b is free, and
/// is χ²(1) when b is zero. r may be readings less predictions, V then holding meters and tolerances, or the imbalance A y of
/// constraints, V = A S Aᵀ and f = A e_i for a bias in reading i.
/// Source: Narasimhan and Mah, AIChE J. 33 (1987) 1514-1521.
/// </remarks>
/// <param name="Statistic">T</param>
/// <param name="Magnitude">b̂, NaN for a signature that shows nowhere</param>
/// <param name="Uncertainty">u(b̂)</param>
internal readonly record struct LikelihoodRatio(double Statistic, double Magnitude, double Uncertainty)
{
    /// <param name="discrepancy">L⁻¹ r with V = L Lᵀ</param>
    /// <param name="signature">L⁻¹ f</param>
    public static LikelihoodRatio Of(ReadOnlySpan<double> discrepancy, ReadOnlySpan<double> signature)
    {
        double d = 0, c = 0;
        for (var i = 0; i < signature.Length; i++)
        {
            d += signature[i] * discrepancy[i];
            c += signature[i] * signature[i];
        }

        return c > 0 ? new LikelihoodRatio(d * d / c, d / c, 1 / Math.Sqrt(c)) : new LikelihoodRatio(0, double.NaN, double.PositiveInfinity);
    }
}
