namespace BenchCheck.Core.Diagnosis;

/// <summary>Information that a reading gives about which of several hypotheses is true, before it is taken.</summary>
/// <remarks>
/// I = Σ p_h ∫ N_h(y) log₂ (N_h(y) / Σ p_k N_k(y)) dy: the mutual information of hypothesis and reading (Lindley, Ann. Math. Stat. 27 (1956)
/// 986), in bits. The integral is a trapezoidal sum over the union of the points mean ± j·σ/4 of every normal, so that narrow and broad ones
/// are both seen; normals that coincide are one, which changes nothing, since a reading cannot tell them apart.
/// </remarks>
internal static class MixtureInformation
{
    private const double Reach = 5;
    private const double Spacing = 0.25;

    /// <summary>Normals closer than this share of their standard deviation, in mean and in width, count as the same.</summary>
    private const double Same = 0.03;

    private readonly record struct Normal(double Probability, double Mean, double Sigma)
    {
        /// <summary>Zero beyond the reach of the sum.</summary>
        public double Density(double y)
        {
            var t = (y - Mean) / Sigma;
            return Math.Abs(t) > Reach + 1 ? 0 : Math.Exp(-0.5 * t * t) / (Sigma * Math.Sqrt(2 * Math.PI));
        }
    }

    /// <summary>Bits; between zero and the entropy of the probabilities.</summary>
    /// <param name="probability">of each hypothesis; positive, they sum to one</param>
    /// <param name="mean">what each predicts</param>
    /// <param name="variance">how sure each is, the meter's uncertainty included</param>
    public static double Bits(ReadOnlySpan<double> probability, ReadOnlySpan<double> mean, ReadOnlySpan<double> variance)
    {
        var normals = Distinct(probability, mean, variance);
        if (normals.Count < 2) return 0;
        var points = new List<double>();
        foreach (var normal in normals)
        {
            for (var t = -Reach; t <= Reach; t += Spacing) points.Add(normal.Mean + t * normal.Sigma);
        }

        points.Sort();
        var (total, last, lastAt) = (0.0, 0.0, points[0]);
        var densities = new double[normals.Count];
        foreach (var y in points)
        {
            var mixture = 0.0;
            for (var h = 0; h < densities.Length; h++) mixture += normals[h].Probability * (densities[h] = normals[h].Density(y));
            var here = 0.0;
            for (var h = 0; h < densities.Length; h++)
            {
                if (densities[h] > 0) here += normals[h].Probability * densities[h] * Math.Log2(densities[h] / mixture);
            }

            total += (here + last) * (y - lastAt) / 2;
            (last, lastAt) = (here, y);
        }

        // No reading tells more than which hypothesis it is.
        return Math.Clamp(total, 0, normals.Sum(n => -n.Probability * Math.Log2(n.Probability)));
    }

    private static List<Normal> Distinct(ReadOnlySpan<double> probability, ReadOnlySpan<double> mean, ReadOnlySpan<double> variance)
    {
        var result = new List<Normal>();
        for (var h = 0; h < probability.Length; h++)
        {
            var sigma = Math.Sqrt(variance[h]);
            var at = mean[h];
            var same = result.FindIndex(n => Math.Abs(n.Mean - at) < Same * Math.Min(n.Sigma, sigma) && Math.Abs(n.Sigma - sigma) < Same * sigma);
            if (same < 0) result.Add(new Normal(probability[h], at, sigma));
            else result[same] = result[same] with { Probability = result[same].Probability + probability[h] };
        }

        return result;
    }
}
