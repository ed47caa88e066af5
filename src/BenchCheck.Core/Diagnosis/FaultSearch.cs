using System.Collections.Immutable;
using BenchCheck.Core.Boards;
using BenchCheck.Core.Checking;
using BenchCheck.Core.Equations;
using BenchCheck.Core.Fitting;
using BenchCheck.Core.Metering;

namespace BenchCheck.Core.Diagnosis;

/// <summary>Fits every fault of the catalogue to a set of readings, all tolerances active, and scores it by its evidence.</summary>
/// <remarks>
/// Compiled once for a board and the places where it is read, so that many boards of one kind share the work. A fault that leaves a number
/// free is forecast at several values of it first; the fit starts from the best of them.
/// </remarks>
internal sealed class FaultSearch
{
    /// <summary>χ² above the best so far at which a hypothesis is given up: its probability is then below 1e-20.</summary>
    private const double Hopeless = 100;

    /// <summary>How far off the unexplained alternative lets a reading be, as a share of the largest reading of its kind.</summary>
    private const double UnexplainedShare = 0.3;

    /// <summary>Logarithm of the odds against the likeliest fault up to which a fault's evidence is worth every digit; none less likely is shown.</summary>
    private const double WorthPolishing = 12;

    /// <summary>Probability that a board with one fault has a second: common practice, no source.</summary>
    private const double PairShare = 0.1;

    /// <summary>How many single faults are taken as the first of a pair.</summary>
    private const int PairBases = 10;

    private static readonly ImmutableArray<double> StartsInSigma = [-1.6, -0.8, 0, 0.8, 1.6];

    private readonly NetworkSolver solver;
    private readonly IReadOnlyList<Probe> probes;
    private readonly IReadOnlyList<bool> hasScaleError;
    private readonly EvidenceFit fit = new();
    private readonly List<Compiled> compiled;
    private StartPoint? healthyStart;
    private readonly FaultRates rates;

    public FaultSearch(Board board, IReadOnlyList<Probe> probes, IReadOnlyList<bool> hasScaleError, NetworkSolver solver, FaultRates rates)
    {
        this.solver = solver;
        this.probes = probes;
        this.hasScaleError = hasScaleError;
        this.rates = rates;
        Healthy = new BoardModel(board, probes, hasScaleError, solver);
        compiled = CompileAll(board);
    }

    public BoardModel Healthy { get; }

    /// <summary>Every fault worth naming, the healthy board and the broad alternative included.</summary>
    /// <param name="lines">line of each reading in its file, zero for none: wrong readings are named by it</param>
    public List<Fault> Find(double[] measured, double[] noise, IReadOnlyList<int> lines, CancellationToken cancel)
    {
        var best = double.PositiveInfinity;
        var faults = FitAll(compiled, measured, noise, ref best, cancel);
        if (Alternative(FaultKind.None, "no fault that these readings show", measured, noise, best) is { } none)
        {
            faults.Add(none);
            best = Math.Min(best, none.Evidence.ChiSquared);
        }

        if (Alternative(FaultKind.Unexplained, "something that is not on the list of faults", measured, Broadened(measured, noise), double.PositiveInfinity) is { } other)
            faults.Add(other with { IsBroad = true });
        faults.AddRange(new ReadingErrors(probes, lines, fit).Of(Healthy, measured, noise, Math.Log(rates[FaultKind.ReadingError]), best + Hopeless));
        Polish(faults, measured);
        return faults;
    }

    /// <summary>Brings the likely faults to the very minimum, so that their evidences can be compared.</summary>
    private void Polish(List<Fault> faults, double[] measured)
    {
        var top = faults.Max(f => f.LogWeight);
        for (var i = 0; i < faults.Count; i++)
        {
            var fault = faults[i];
            if (fault.LogWeight < top - WorthPolishing || fault.WrongReading >= 0) continue;
            fault.Model.Forget();
            var evidence = fit.Polish(fault.Model, measured, fault.Noise, fault.Phi);
            if (!double.IsNegativeInfinity(evidence.LogEvidence) && evidence.ChiSquared <= fault.Evidence.ChiSquared + 1e-6)
                faults[i] = fault with { Evidence = evidence, Phi = fit.Phi.ToArray(), Explained = fit.Predicted.ToArray() };
        }
    }

    /// <summary>Fits hypotheses in the order of their forecasts, so that the first fits show which of the others are not worth finishing.</summary>
    private List<Fault> FitAll(List<Compiled> hypotheses, double[] measured, double[] noise, ref double best, CancellationToken cancel)
    {
        var order = new List<(Compiled Hypothesis, double Forecast)>(hypotheses.Count);
        foreach (var c in hypotheses)
        {
            cancel.ThrowIfCancellationRequested();
            if (!double.IsNegativeInfinity(c.LogRate)) order.Add((c, Forecast(c, measured, noise)));
        }

        order.Sort((a, b) => a.Forecast.CompareTo(b.Forecast));
        var faults = new List<Fault>(order.Count);
        foreach (var (c, _) in order)
        {
            cancel.ThrowIfCancellationRequested();
            var evidence = Fit(c, measured, noise, best + Hopeless);
            if (double.IsNegativeInfinity(evidence.LogEvidence)) continue;
            best = Math.Min(best, evidence.ChiSquared);
            faults.Add(Record(c, evidence, noise));
        }

        return faults;
    }

    /// <summary>Two faults together, built on the most promising single ones: for boards that no single fault explains.</summary>
    /// <param name="singles">what <see cref="Find"/> returned for the same readings</param>
    public List<Fault> FindPairs(List<Fault> singles, double[] measured, double[] noise, IReadOnlyList<int> lines, CancellationToken cancel)
    {
        var total = singles.Sum(f => Math.Exp(f.LogRate));
        var pairs = new List<Fault>();
        var bases = singles.Where(f => f.WrongReading < 0 && !f.IsBroad && f.Named[0].Fault != FaultKind.None)
            .OrderBy(f => f.Evidence.ChiSquared).DistinctBy(f => f.Named[0].Text).Take(PairBases).ToArray();
        var best = bases.Length == 0 ? 0 : bases[0].Evidence.ChiSquared;
        foreach (var first in bases)
        {
            var shift = first.LogRate - Math.Log(total) + Math.Log(PairShare);
            List<Compiled> seconds = [.. CompileAll(first.Model.Board).Where(c => !Overlaps(first.Named[0], c.Hypothesis))];
            pairs.AddRange(FitAll(seconds, measured, noise, ref best, cancel).Select(second => Joined(first, second, shift)));
            pairs.AddRange(new ReadingErrors(probes, lines, fit).Of(first.Model, measured, noise, Math.Log(rates[FaultKind.ReadingError]), best + Hopeless)
                .Select(error => Joined(first, error, shift)));
        }

        // A pair and the same pair found the other way round are one.
        return [.. pairs.GroupBy(f => string.Join('\n', new[] { f.Named[0].Text, f.Named[0].With!.Text }.Order(StringComparer.Ordinal))).Select(g => g.MaxBy(f => f.LogWeight)!)];
    }

    private static bool Overlaps(NamedFault first, FaultHypothesis second) =>
        second.Names.Any(n => n.Parts.Any(p => first.Parts.Contains(p) || p.Contains(' ', StringComparison.Ordinal)) || n.Nodes.Any(x => x.Contains(' ', StringComparison.Ordinal)));

    private static Fault Joined(Fault first, Fault second, double shift) => second with
    {
        LogRates = [.. second.LogRates.Select(r => r + shift)],
        Named = [.. second.Named.Select(n => n with { With = first.Named[0], Text = $"{first.Named[0].Text} and {n.Text}" })],
    };

    private List<Compiled> CompileAll(Board board)
    {
        List<Compiled> all = [.. FaultCatalogue.Of(board).Select(Compile)];
        var places = all.SelectMany(c => c.Hypothesis.Names).GroupBy(n => n.Kind).ToDictionary(g => g.Key, g => g.Count());
        foreach (var c in all) c.LogRates = [.. c.Hypothesis.Names.Select(n => Math.Log(rates[n.Kind] / places[n.Kind]))];
        return all;
    }

    private Fault? Alternative(string kind, string words, double[] measured, double[] noise, double best)
    {
        healthyStart ??= fit.Linearise(Healthy);
        if (healthyStart is null) return null;
        Healthy.Forget();
        var evidence = fit.Fit(Healthy, measured, noise, healthyStart, best + Hopeless);
        return double.IsNegativeInfinity(evidence.LogEvidence) ? null : new Fault(
            [new NamedFault(kind, [], [], [], [], null, null, null, words)], [Math.Log(rates[kind])], evidence, Healthy, fit.Phi.ToArray(), noise, fit.Predicted.ToArray());
    }

    /// <summary>Noise of the broad alternative: each reading may be off by a good part of the largest of its kind.</summary>
    private double[] Broadened(double[] measured, double[] noise)
    {
        var result = new double[noise.Length];
        for (var i = 0; i < noise.Length; i++)
        {
            var probe = probes[i];
            var largest = Enumerable.Range(0, noise.Length).Where(k => probes[k].IsLike(probe)).Max(k => Math.Abs(measured[k]));
            var breadth = UnexplainedShare * largest;
            result[i] = noise[i] + breadth * breadth;
        }

        return result;
    }

    private Compiled Compile(FaultHypothesis hypothesis)
    {
        var model = new BoardModel(hypothesis.Board, probes, hasScaleError, solver);
        var free = -1;
        if (hypothesis.Free is { } number)
        {
            for (var i = 0; i < model.BoardParameterCount; i++)
            {
                if (model.Parameters[i].Owner == number.Part && model.Parameters[i].Kind == number.Kind) free = i;
            }
        }

        return new Compiled(hypothesis, model, free);
    }

    /// <summary>χ² to expect of a hypothesis; remembers which two starts promise most.</summary>
    private double Forecast(Compiled c, double[] measured, double[] noise)
    {
        c.Starts ??= Starts(c);
        var (first, second) = (double.PositiveInfinity, double.PositiveInfinity);
        (c.First, c.Second) = (null, null);
        foreach (var start in c.Starts)
        {
            var chiSquared = fit.Forecast(c.Model, measured, noise, start);
            if (chiSquared < first) (second, c.Second, first, c.First) = (first, c.First, chiSquared, start);
            else if (chiSquared < second) (second, c.Second) = (chiSquared, start);
        }

        return first;
    }

    /// <summary>The prior mean, and for a free number several values of it.</summary>
    private StartPoint[] Starts(Compiled c)
    {
        if (c.Free < 0) return fit.Linearise(c.Model) is { } only ? [only] : [];
        var parameter = c.Model.Parameters[c.Free];
        return [.. StartsInSigma.Select(offset => fit.Linearise(c.Model, c.Free, parameter.Mean + offset * parameter.Sigma)).OfType<StartPoint>()];
    }

    private Evidence Fit(Compiled c, double[] measured, double[] noise, double giveUpAbove)
    {
        if (c.First is null) return Evidence.None;
        c.Model.Forget();
        var evidence = fit.Fit(c.Model, measured, noise, c.First, giveUpAbove);

        // A fit can have a minimum on either side of the nominal value: where the first disappoints, the second start is tried too.
        if (evidence.ChiSquared < giveUpAbove - Hopeless || c.Second is null) return evidence;
        var phi = fit.Phi.ToArray();
        c.Model.Forget();
        var other = fit.Fit(c.Model, measured, noise, c.Second, giveUpAbove);
        if (other.ChiSquared < evidence.ChiSquared || double.IsInfinity(evidence.ChiSquared)) return other;
        return evidence.ChiSquared > giveUpAbove ? evidence : fit.Polish(c.Model, measured, noise, phi);
    }

    private Fault Record(Compiled c, Evidence evidence, ReadOnlySpan<double> noise)
    {
        double? value = c.Free < 0 ? null : c.Model.Parameters[c.Free].Value(fit.Phi[c.Free]);
        var order = Enumerable.Range(0, c.LogRates.Length).OrderByDescending(i => c.LogRates[i]).ToArray();
        return new Fault(
            [.. order.Select(i => FaultNaming.Name(c.Hypothesis.Names[i], c.Hypothesis.Free, value))], [.. order.Select(i => c.LogRates[i])], evidence, c.Model,
            fit.Phi.ToArray(), noise.ToArray(), fit.Predicted.ToArray());
    }

    private sealed record Compiled(FaultHypothesis Hypothesis, BoardModel Model, int Free)
    {
        public ImmutableArray<double> LogRates { get; set; } = [];

        /// <summary>Logarithm of the prior rate, all names together.</summary>
        public double LogRate => Math.Log(LogRates.Sum(Math.Exp));

        /// <summary>Where fits may begin, linearised once; null until first needed.</summary>
        public StartPoint[]? Starts { get; set; }

        /// <summary>The start that promises most for the readings at hand.</summary>
        public StartPoint? First { get; set; }

        public StartPoint? Second { get; set; }
    }
}
