using BenchCheck.Core.Boards;
using BenchCheck.Core.Checking;
using BenchCheck.Core.Diagnosis;
using BenchCheck.Core.Equations;
using BenchCheck.Core.Fitting;
using BenchCheck.Core.Metering;
using BenchCheck.Core.Quantities;
using Xunit;

namespace BenchCheck.Core.Tests.Diagnosis;

/// <summary>The fast search against the slow way of <see cref="FreshRefit"/>: same minimum, same evidence, same ranking.</summary>
public class FaultSearchTests
{
    [Theory]
    [InlineData("R3", 4700)]
    [InlineData("R4", 1500)]
    [InlineData("R1", 22e3)]
    public void Fast_and_fresh_evidence_agree_and_rank_alike(string part, double ohms)
    {
        var bench = WorkshopBoards.FanStage();
        var wrong = bench.Board.With([(Resistor)bench.Board.Find(part)! with { Ohms = Nominal.Within(ohms, Tolerance.Percent(5)) }], []);
        var readings = WorkshopBoards.EveryNode(bench).Where(r => r.Condition == Condition.DefaultName).ToArray();
        Probe[] probes = [.. readings.Select(r => Probe.Of(bench, r))];
        var truth = new BoardModel(wrong, probes, new bool[probes.Length], new NetworkSolver(JunctionLaw.Exponential));
        var values = new double[probes.Length];
        truth.Predict([.. truth.Parameters.Select(p => p.Mean)], values, []);
        double[] measured = [.. values.Select(v => Math.Round(v, 2))];
        double[] noise = [.. values.Select(v => 1e-4 + Math.Pow(0.003 * v, 2))];

        var search = new FaultSearch(bench.Board, probes, new bool[probes.Length], new NetworkSolver(JunctionLaw.Exponential), FaultRates.For(BoardOrigin.NewBuild));
        var faults = search.Find(measured, noise, new int[probes.Length], TestContext.Current.CancellationToken)
            .Where(f => f.WrongReading < 0 && !f.IsBroad && f.Named[0].Fault != FaultKind.None).OrderByDescending(f => f.Evidence.LogEvidence).ToArray();
        faults = [.. faults.Where(f => f.Evidence.LogEvidence > faults[0].Evidence.LogEvidence - 12)];
        var oracle = new FreshRefit(probes);
        var catalogue = FaultCatalogue.Of(bench.Board).ToArray();
        var fresh = new List<double>();
        foreach (var fault in faults)
        {
            // Names carry the value found; the hypothesis is the one whose board the fitted model holds.
            var hypothesis = catalogue.Single(h => h.Names[0].Kind == fault.Named[0].Fault && fault.Named.Any(n => n.Text.StartsWith(h.Names[0].Text, StringComparison.Ordinal)));
            var (chiSquared, logEvidence) = oracle.Score(hypothesis, measured, noise, fault.Phi);
            Assert.Equal(chiSquared, fault.Evidence.ChiSquared, 1e-6 * (1 + chiSquared));
            Assert.Equal(logEvidence, fault.Evidence.LogEvidence, 1e-6 * (1 + Math.Abs(logEvidence)));
            fresh.Add(logEvidence);
        }

        // Hypotheses that are one and the same to these readings may stand in either order.
        Assert.All(fresh.Zip(fresh.Skip(1)), pair => Assert.True(pair.Second <= pair.First + 1e-6, $"{pair.Second} after {pair.First}"));
    }
}
