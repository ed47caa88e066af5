using System.Collections.Immutable;
using BenchCheck.Core.Fitting;
using MathNet.Numerics.Distributions;

namespace BenchCheck.Core.Checking;

/// <summary>What the fit says of each parameter, and of pairs that it cannot tell apart.</summary>
internal static class Estimates
{
    /// <summary>Posterior over prior standard deviation below which a parameter counts as determined.</summary>
    private const double DeterminedRatio = 0.35;

    /// <summary>Above this ratio the readings said nothing worth mention about the parameter.</summary>
    private const double UndeterminedRatio = 0.9;

    private const double NotableCorrelation = 0.9;

    public static ImmutableArray<Estimate> Of(BoardFit fit, double confidence)
    {
        var k = Normal.InvCDF(0, 1, (1 + confidence) / 2);
        var p = fit.Model.Parameters.Length;
        return [.. fit.Model.Parameters.Select((parameter, i) => One(parameter, fit.Phi[i], Math.Sqrt(Math.Max(0, fit.Covariance[i * p + i])), k))];
    }

    public static ImmutableArray<CorrelatedPair> Correlated(BoardFit fit, ImmutableArray<Estimate> estimates)
    {
        var p = estimates.Length;
        var pairs = new List<CorrelatedPair>();
        for (var i = 0; i < p; i++)
        {
            for (var j = 0; j < i; j++)
            {
                if (!estimates[i].Kind.IsReported || !estimates[j].Kind.IsReported) continue;
                var rho = fit.Covariance[i * p + j] / Math.Sqrt(fit.Covariance[i * p + i] * fit.Covariance[j * p + j]);
                if (Math.Abs(rho) > NotableCorrelation) pairs.Add(new CorrelatedPair(estimates[j], estimates[i], rho));
            }
        }

        return [.. pairs.OrderByDescending(c => Math.Abs(c.Correlation))];
    }

    private static Estimate One(FitParameter parameter, double phi, double sigma, double k)
    {
        var value = parameter.Value(phi);
        var ratio = parameter.IsUnknown ? sigma / 4 : sigma / parameter.Sigma;
        var determined = ratio < DeterminedRatio ? Determination.Yes : ratio < UndeterminedRatio ? Determination.Partly : Determination.No;
        return new Estimate(
            parameter.Owner, parameter.Kind, parameter.Condition, parameter.Nominal.Value, parameter.Nominal.Low, parameter.Nominal.High, value,
            parameter.IsLogarithmic ? value * sigma : sigma, parameter.Value(phi - k * sigma), parameter.Value(phi + k * sigma), determined);
    }
}
