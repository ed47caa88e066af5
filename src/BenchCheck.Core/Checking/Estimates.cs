using System.Collections.Immutable;
using BenchCheck.Core.Boards;
using BenchCheck.Core.Fitting;
using BenchCheck.Core.Metering;

namespace BenchCheck.Core.Checking;

/// <summary>What the fit says of each parameter, and of pairs that it cannot tell apart.</summary>
internal static class Estimates
{
    /// <summary>Posterior over prior standard deviation below which a parameter counts as determined.</summary>
    private const double DeterminedRatio = 0.35;

    /// <summary>Above this ratio the readings said nothing worth mention about the parameter.</summary>
    private const double UndeterminedRatio = 0.9;

    /// <summary>Spread of a logarithm against which the knowledge of an unknown is measured: a factor of about 50.</summary>
    private const double UnknownSpread = 4;

    /// <summary>Standard deviation of a logarithm up to which the readings are near enough a straight line in it.</summary>
    private const double StraightSpread = 0.15;

    /// <summary>How far a profile is followed, as a logarithm: a factor of a million.</summary>
    private const double ProfileReach = 13.8;

    private const double NotableCorrelation = 0.9;

    public static ImmutableArray<Estimate> Of(BoardFit fit, double confidence)
    {
        var k = CoverageFactor.Normal(confidence);
        var p = fit.Model.Parameters.Length;
        var profile = new Lazy<ProfileInterval>(() => fit.Stacked.Profile(fit.Phi, fit.Summary.Cost));
        return [.. fit.Model.Parameters.Select((parameter, i) => One(parameter, i, fit.Phi[i], Math.Sqrt(Math.Max(0, fit.Covariance[i * p + i])), k, profile))];
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

    private static Estimate One(FitParameter parameter, int index, double phi, double sigma, double k, Lazy<ProfileInterval> profile)
    {
        var value = parameter.Value(phi);
        var ratio = parameter.IsUnknown ? sigma / UnknownSpread : sigma / parameter.Sigma;
        var determined = ratio < DeterminedRatio ? Determination.Yes : ratio < UndeterminedRatio ? Determination.Partly : Determination.No;
        var interval = NeedsProfile(parameter, sigma)
            ? profile.Value.Find(index, sigma, k, phi - ProfileReach, phi + ProfileReach)
            : new CoverageInterval(phi - k * sigma, phi + k * sigma);
        return new Estimate(
            parameter.Owner, parameter.Kind, parameter.Condition, parameter.Nominal.Value, parameter.Nominal.Low, parameter.Nominal.High, value,
            parameter.IsLogarithmic ? value * sigma : sigma, parameter.Value(interval.Low), parameter.Value(interval.High), determined);
    }

    /// <summary>
    /// A gain or an unknown that may move by a good part of itself: there the readings are no straight line in it, and the interval is
    /// found by profiling instead of from the curvature.
    /// </summary>
    private static bool NeedsProfile(FitParameter parameter, double sigma) =>
        parameter.IsLogarithmic && parameter.Kind.IsReported && sigma > StraightSpread && (parameter.IsUnknown || parameter.Kind == ParameterKind.Gain);
}
