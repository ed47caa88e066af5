namespace BenchCheck.Core.Tests.Fitting;

/// <summary>One data set of the NIST Statistical Reference Datasets with its certified answer.</summary>
/// <remarks>Source: NIST/ITL StRD, linear and nonlinear regression; VERIFIED against stored copies and recomputed at 60 digits.</remarks>
internal sealed record CertifiedSet(
    string Name, double[] Y, double[][] X, double[] Start1, double[] Start2, double[] Estimates, double[] Deviations, double ResidualDeviation,
    double SumOfSquares)
{
    public int Rows => Y.Length;

    public int Columns => Estimates.Length;

    public static CertifiedSet Load(string name)
    {
        var data = ReferenceData.Numbers($"nist-strd-{name.ToLowerInvariant()}");
        var parameters = ReferenceData.Rows("nist-strd-certified-parameters").Where(r => r[0] == name).ToList();
        var summary = ReferenceData.Rows("nist-strd-certified-summary").Single(r => r[0] == name);
        double[] Column(int i) => [.. parameters.Where(r => r[i].Length > 0).Select(r => ReferenceData.Number(r[i]))];
        return new CertifiedSet(
            name, [.. data.Select(r => r[0])], [.. data.Select(r => r[1..])], Column(2), Column(3), Column(4), Column(5),
            ReferenceData.Number(summary[5]), ReferenceData.Number(summary[4]));
    }
}
