using System.Globalization;
using BenchCheck.Core.Checking;
using BenchCheck.Core.Equations;
using BenchCheck.Core.Fitting;
using BenchCheck.Core.Metering;
using BenchCheck.Core.Quantities;

namespace BenchCheck.Core.Diagnosis;

/// <summary>The board is healthy but one reading is wrong: a sign, a decade, exchanged digits, a neighbouring node, or just wrong.</summary>
/// <remarks>
/// The board is fitted without the reading; the slip that best turns what the others predict into what was written names the error. With E₋ᵢ
/// the evidence of the other readings and q the density of the written value under all slips together, ln E = ln E₋ᵢ + ln q(yᵢ).
/// </remarks>
internal sealed class ReadingErrors(IReadOnlyList<Probe> probes, IReadOnlyList<int> lines, EvidenceFit fit)
{
    private readonly record struct Slip(string Words, double Share, double Density);

    /// <summary>One fault a reading.</summary>
    public IEnumerable<Fault> Of(BoardModel healthy, double[] measured, double[] noise, double logRate, double giveUpAbove)
    {
        var m = measured.Length;
        var found = new List<Fault>();
        if (m < 2 || double.IsNegativeInfinity(logRate)) return found;
        var rate = logRate - Math.Log(m);
        var p = healthy.Parameters.Length;
        if (fit.Linearise(healthy) is not { } start) return found;
        for (var i = 0; i < m; i++)
        {
            var breadth = Breadth(measured, i);
            var altered = (double[])noise.Clone();
            altered[i] = breadth * breadth;
            healthy.Forget();
            var evidence = fit.Fit(healthy, measured, altered, start, giveUpAbove);
            if (!double.IsFinite(evidence.LogEvidence)) continue;
            var covariance = new double[p * p];
            fit.Posterior(p, covariance);
            var spread = noise[i] + Quadratic(covariance, fit.Jacobian.Slice(i * p, p));
            var expected = fit.Predicted[i];

            // The broad noise stood for "anything": take its density out again to get the evidence of the others alone.
            var others = evidence.LogEvidence - LogNormal(measured[i], expected, spread + altered[i]);
            var slips = Slips(measured, i, expected, spread, breadth, fit.Predicted).ToArray();
            var density = slips.Sum(s => s.Share * s.Density);
            var likeliest = slips.MaxBy(s => s.Share * s.Density);
            var chiSquared = evidence.ChiSquared - (measured[i] - expected) * (measured[i] - expected) / altered[i];
            found.Add(new Fault(
                [Name(i, likeliest.Words, healthy.Board.Reference)], [rate], new Evidence(chiSquared, others + Math.Log(density), evidence.Converged), healthy, fit.Phi.ToArray(), altered,
                fit.Predicted.ToArray())
            {
                WrongReading = i,
            });
        }

        return found;
    }

    private NamedFault Name(int i, string words, string reference)
    {
        var probe = probes[i];
        return new NamedFault(
            FaultKind.ReadingError, [], [], [], lines[i] > 0 ? [lines[i]] : [], null, null, null, $"reading at {probe.Words(reference)} ({probe.Condition}) {words}");
    }

    private List<Slip> Slips(double[] measured, int i, double expected, double spread, double breadth, ReadOnlySpan<double> explained)
    {
        var y = measured[i];
        var slips = new List<Slip>
        {
            new("is just wrong", 0.4, Math.Exp(LogNormal(y, expected, breadth * breadth))),
            new("has the wrong sign", 0.15, Math.Exp(LogNormal(-y, expected, spread))),
            new("is a decade too high", 0.075, 0.1 * Math.Exp(LogNormal(y / 10, expected, spread))),
            new("is a decade too low", 0.075, 10 * Math.Exp(LogNormal(y * 10, expected, spread))),
        };
        var exchanged = Exchanged(y, probes[i].Range / probes[i].Meter.FullScaleCounts).Distinct().ToArray();
        foreach (var other in exchanged)
            slips.Add(new("has two digits exchanged", 0.15 / exchanged.Length, Math.Exp(LogNormal(other, expected, spread))));

        var neighbours = Enumerable.Range(0, measured.Length)
            .Where(k => k != i && probes[k].IsLike(probes[i]) && probes[k].Condition == probes[i].Condition && probes[k].Against == probes[i].Against).ToArray();
        foreach (var k in neighbours)
        {
            var tolerance = spread + 1e-6 * explained[k] * explained[k];
            slips.Add(new($"may be that of {probes[k].At}", 0.15 / neighbours.Length, Math.Exp(LogNormal(y, explained[k], tolerance))));
        }

        return slips;
    }

    /// <summary>The values that come of exchanging two digits side by side as the meter shows them.</summary>
    private static IEnumerable<double> Exchanged(double value, double resolution)
    {
        if (!(resolution > 0) || value == 0) yield break;
        var counts = Math.Round(Math.Abs(value) / resolution);
        if (counts is < 10 or > 1e9) yield break;
        var digits = counts.ToString("F0", CultureInfo.InvariantCulture).ToCharArray();
        for (var k = 0; k + 1 < digits.Length; k++)
        {
            if (digits[k] == digits[k + 1]) continue;
            (digits[k], digits[k + 1]) = (digits[k + 1], digits[k]);
            yield return Math.CopySign(double.Parse(digits, CultureInfo.InvariantCulture) * resolution, value);
            (digits[k], digits[k + 1]) = (digits[k + 1], digits[k]);
        }
    }

    /// <summary>How far off a wrong reading may be: as large as anything read of its kind.</summary>
    private double Breadth(double[] measured, int i)
    {
        var largest = Enumerable.Range(0, measured.Length).Where(k => probes[k].IsLike(probes[i])).Max(k => Math.Abs(measured[k]));
        return Math.Max(2 * largest, probes[i].Quantity.Unit() == Unit.Volt ? 2 : 1e-6);
    }

    private static double Quadratic(double[] matrix, ReadOnlySpan<double> v)
    {
        var sum = 0.0;
        for (var k = 0; k < v.Length; k++) sum += v[k] * LuFactor.Dot(matrix.AsSpan(k * v.Length, v.Length), v);
        return sum;
    }

    internal static double LogNormal(double x, double mean, double variance) =>
        -0.5 * ((x - mean) * (x - mean) / variance + Math.Log(2 * Math.PI * variance));
}
