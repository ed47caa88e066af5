namespace BenchCheck.Core.Diagnosis;

/// <summary>Probabilities of the faults given the readings: prior rate times evidence, normalised.</summary>
internal static class Posterior
{
    /// <summary>Faults with their probabilities, likeliest first.</summary>
    public static List<(Fault Fault, double Probability)> Of(IEnumerable<Fault> faults)
    {
        var ordered = faults.OrderByDescending(f => f.LogWeight).ToList();
        if (ordered.Count == 0) return [];
        var top = ordered[0].LogWeight;
        var total = ordered.Sum(f => Math.Exp(f.LogWeight - top));
        return [.. ordered.Select(f => (f, Math.Exp(f.LogWeight - top) / total))];
    }
}
