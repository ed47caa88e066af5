namespace BenchCheck.Core.Diagnosis;

/// <summary>Information that a reading gives about which of several hypotheses is true, before it is taken.</summary>
/// <remarks>
/// I = Σ p_h ∫ N_h(y) log₂ (N_h(y) / Σ p_k N_k(y)) dy: the mutual information of hypothesis and reading (Lindley, Ann. Math. Stat. 27 (1956)
/// 986), in bits. Gauss-Hermite quadrature of 20 points at each normal (Abramowitz and Stegun, table 25.10).
/// </remarks>
internal static class MixtureInformation
{
    private static readonly double[] Nodes =
    [
        0.2453407083009012, 0.7374737285453944, 1.2340762153953231, 1.7385377121165861, 2.2549740020892757, 2.7888060584281305, 3.3478545673832163, 3.9447640401156252,
        4.6036824495507442, 5.3874808900112328,
    ];

    private static readonly double[] Weights =
    [
        4.622436696006101e-1, 2.866755053628341e-1, 1.090172060200233e-1, 2.481052088746361e-2, 3.243773342237862e-3, 2.283386360163540e-4, 7.802556478532064e-6,
        1.086069370769282e-7, 4.399340992273181e-10, 2.229393645534151e-13,
    ];

    /// <summary>Bits; between zero and the entropy of the probabilities.</summary>
    /// <param name="probability">of each hypothesis; positive, they sum to one</param>
    /// <param name="mean">what each predicts</param>
    /// <param name="variance">how sure each is, the meter's uncertainty included</param>
    public static double Bits(ReadOnlySpan<double> probability, ReadOnlySpan<double> mean, ReadOnlySpan<double> variance)
    {
        var total = 0.0;
        for (var h = 0; h < probability.Length; h++)
        {
            var sigma = Math.Sqrt(2 * variance[h]);
            var sum = 0.0;
            for (var k = 0; k < Nodes.Length; k++)
            {
                sum += Weights[k] * (Surprise(h, mean[h] + sigma * Nodes[k], probability, mean, variance)
                    + Surprise(h, mean[h] - sigma * Nodes[k], probability, mean, variance));
            }

            total += probability[h] * sum / Math.Sqrt(Math.PI);
        }

        return Math.Max(0, total / Math.Log(2));
    }

    /// <summary>ln N_h(y) − ln Σ p_k N_k(y).</summary>
    private static double Surprise(int h, double y, ReadOnlySpan<double> probability, ReadOnlySpan<double> mean, ReadOnlySpan<double> variance)
    {
        var own = ReadingErrors.LogNormal(y, mean[h], variance[h]);
        var mixture = 0.0;
        for (var k = 0; k < probability.Length; k++) mixture += probability[k] * Math.Exp(ReadingErrors.LogNormal(y, mean[k], variance[k]) - own);
        return -Math.Log(mixture);
    }
}
