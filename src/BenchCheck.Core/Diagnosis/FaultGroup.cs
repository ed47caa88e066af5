namespace BenchCheck.Core.Diagnosis;

/// <summary>Faults that these readings cannot separate.</summary>
/// <param name="Members">likeliest first, each with its own probability</param>
internal sealed record FaultGroup(List<(Fault Fault, double Probability)> Members)
{
    /// <summary>Two faults look alike when one explains the readings no better than by this factor, as a logarithm: about 5 to 1.</summary>
    private const double EvidenceGap = 1.6;

    /// <summary>… and predicts every reading within this many standard uncertainties of the other.</summary>
    private const double SightInSigma = 1.5;

    public Fault Leader => Members[0].Fault;

    public double Probability => Members.Sum(m => m.Probability);

    /// <summary>Groups faults given likeliest first: each joins the first group whose leader it cannot be told from.</summary>
    /// <param name="sigma">standard uncertainty of each reading</param>
    public static List<FaultGroup> Of(IEnumerable<(Fault Fault, double Probability)> faults, double[] sigma)
    {
        var groups = new List<FaultGroup>();
        foreach (var entry in faults)
        {
            var home = groups.Find(g => LooksLike(g.Leader, entry.Fault, sigma));
            if (home is null) groups.Add(new FaultGroup([entry]));
            else home.Members.Add(entry);
        }

        return [.. groups.OrderByDescending(g => g.Probability)];
    }

    private static bool LooksLike(Fault a, Fault b, double[] sigma)
    {
        if (a.IsBroad || b.IsBroad || Math.Abs(a.Evidence.LogEvidence - b.Evidence.LogEvidence) > EvidenceGap) return false;
        for (var i = 0; i < sigma.Length; i++)
        {
            if (i == a.WrongReading || i == b.WrongReading) continue;
            if (Math.Abs(a.Explained[i] - b.Explained[i]) > SightInSigma * sigma[i]) return false;
        }

        return true;
    }
}
