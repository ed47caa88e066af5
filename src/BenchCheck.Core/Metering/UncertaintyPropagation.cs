namespace BenchCheck.Core.Metering;

/// <summary>Combined standard uncertainty of y = f(x₁ … x_n), first order (JCGM 100:2008, clause 5 and annex G).</summary>
/// <remarks>c_i = ∂f/∂x_i in the unit of y over that of x_i; contributions c_i u(x_i) are in the unit of y.</remarks>
public static class UncertaintyPropagation
{
    /// <summary>Independent inputs: u_c² = Σ (c_i u_i)², eq. (10).</summary>
    /// <param name="contributions">c_i u_i</param>
    public static double Independent(ReadOnlySpan<double> contributions)
    {
        var sum = 0.0;
        foreach (var contribution in contributions) sum += contribution * contribution;
        return Math.Sqrt(sum);
    }

    /// <summary>Correlated inputs: u_c² = Σ_i Σ_j c_i u_i c_j u_j r_ij, eq. (16).</summary>
    /// <param name="contributions">c_i u_i with the sign of c_i, n</param>
    /// <param name="correlations">r, n×n row-major, symmetric with ones on the diagonal</param>
    public static double Correlated(ReadOnlySpan<double> contributions, ReadOnlySpan<double> correlations)
    {
        var n = contributions.Length;
        ArgumentOutOfRangeException.ThrowIfNotEqual(correlations.Length, n * n);
        var sum = 0.0;
        for (var i = 0; i < n; i++)
        {
            for (var j = 0; j < n; j++) sum += contributions[i] * contributions[j] * correlations[i * n + j];
        }

        // Inputs that cancel exactly may leave a negative zero of rounding.
        return Math.Sqrt(Math.Max(0, sum));
    }

    /// <summary>
    /// Effective degrees of freedom by Welch and Satterthwaite, ν_eff = u_c⁴ / Σ (c_i u_i)⁴/ν_i, eq. (G.2b); independent inputs only. Not
    /// truncated: Student's t is used at the fraction, between the two entries of Table G.2.
    /// </summary>
    /// <param name="contributions">c_i u_i</param>
    /// <param name="degreesOfFreedom">ν_i; infinite for a value taken as known</param>
    public static double EffectiveDegreesOfFreedom(ReadOnlySpan<double> contributions, ReadOnlySpan<double> degreesOfFreedom)
    {
        ArgumentOutOfRangeException.ThrowIfNotEqual(degreesOfFreedom.Length, contributions.Length);
        var sum = 0.0;
        for (var i = 0; i < contributions.Length; i++) sum += Math.Pow(contributions[i], 4) / degreesOfFreedom[i];
        return Math.Pow(Independent(contributions), 4) / sum;
    }

    /// <summary>Degrees of freedom of an uncertainty that is itself in doubt by a fraction: ν = 1/(2 (Δu/u)²), eq. (G.3).</summary>
    public static double DegreesOfFreedomOfDoubt(double relativeDoubt) => 1 / (2 * relativeDoubt * relativeDoubt);
}
