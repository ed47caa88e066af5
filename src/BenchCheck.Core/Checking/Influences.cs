using System.Collections.Immutable;
using BenchCheck.Core.Fitting;

namespace BenchCheck.Core.Checking;

/// <summary>Ranks the parameters by how much of a predicted reading's band each accounts for.</summary>
internal static class Influences
{
    private const double LeastShare = 1e-4;

    /// <param name="row">the reading's p derivatives, in units of φ</param>
    public static ImmutableArray<Influence> Of(BoardModel model, ReadOnlySpan<double> row)
    {
        var total = PredictedBand.Variance(model, row);
        if (!(total > 0)) return [];
        var found = new List<Influence>();
        for (var k = 0; k < model.BoardParameterCount; k++)
        {
            var parameter = model.Parameters[k];
            if (parameter.IsUnknown) continue;
            var share = row[k] * row[k] * parameter.Sigma * parameter.Sigma / total;
            if (share > LeastShare) found.Add(new Influence(parameter.Owner, parameter.Kind, share, row[k] * 0.01));
        }

        return [.. found.OrderByDescending(i => i.Share)];
    }
}
