using System.Collections.Immutable;
using BenchCheck.Core.Batches;
using BenchCheck.Core.Boards;
using BenchCheck.Core.Checking;
using BenchCheck.Core.Diagnosis;
using BenchCheck.Core.Equations;
using BenchCheck.Core.Fitting;
using BenchCheck.Core.Metering;
using BenchCheck.Core.Quantities;
using Xunit;

namespace BenchCheck.Core.Tests.Batches;

public class BatchRunTests
{
    private static readonly Bench Bench = WorkshopBoards.FanStage();

    [Theory]
    [InlineData(true, 5)]
    [InlineData(false, 40)]
    public void A_board_gives_the_same_digits_whichever_boards_were_checked_before_it(bool ranks, int count)
    {
        var settings = CheckSettings.Default with { FindFaults = ranks };
        var boards = Shelf(count);
        string[] alone = [.. boards.Select(b => Digits(new Reconciliation(Bench, settings).Run(b, TestContext.Current.CancellationToken)))];
        var worker = new Reconciliation(Bench, settings);
        string[] backwards = [.. boards.Reverse().Select(b => Digits(worker.Run(b, TestContext.Current.CancellationToken))).ToArray().Reverse()];
        Assert.Equal(alone, backwards);
    }

    [Fact]
    public void Results_come_in_the_order_of_the_boards_and_do_not_depend_on_the_number_of_workers()
    {
        var boards = Shelf(40);
        var settings = CheckSettings.Default with { FindFaults = false };
        string[] Run(int workers) =>
            [.. new BatchRun(Bench, settings, null, workers)
                .Run(boards, (result, _) => Digits(result), (b, reason) => $"{b.Serial} {reason}", TestContext.Current.CancellationToken)];
        var one = Run(1);
        Assert.Equal(boards.Select(b => b.Serial), one.Select(r => r.Split(' ')[0]));
        Assert.Equal(one, Run(5));
    }

    [Fact]
    public void No_more_boards_are_taken_than_a_few_a_worker_before_their_results_are_asked_for()
    {
        var taken = 0;
        var run = new BatchRun(Bench, CheckSettings.Default with { FindFaults = false }, null, 2);
        using var results = run.Run(
            Enumerable.Repeat(Shelf(1)[0], 100_000).Select(b =>
            {
                taken++;
                return b;
            }), (r, _) => r.Verdict, (_, _) => default, TestContext.Current.CancellationToken).GetEnumerator();
        for (var i = 0; i < 3; i++) Assert.True(results.MoveNext());
        Assert.InRange(taken, 3, 40);
    }

    /// <summary>Every number that a face may show, to the last digit.</summary>
    private static string Digits(CheckResult r)
    {
        string?[] texts =
        [
            r.Serial, r.Verdict.ToString(), Text(r.ChiSquared), Text(r.PValue),
            .. r.Readings.SelectMany(x => new[] { Text(x.Predicted), Text(x.En), Text(x.Fitted), Text(x.NormalisedResidual), Text(x.BandLow) }),
            .. r.Parameters.SelectMany(p => new[] { Text(p.Value), Text(p.StandardUncertainty), Text(p.Low), Text(p.High) }),
            .. r.Unmeasured.Select(u => Text(u.Fitted)), .. r.Dissipation.Select(d => Text(d.Watts)),
            .. r.Suspects.SelectMany(s => new[] { Text(s.Probability), Text(s.ChiSquared), s.Text }),
            .. r.Next.SelectMany(n => (string[])[n.At, Text(n.Bits), .. n.Expect.Select(e => Text(e.Value))]),
        ];
        return string.Join(' ', texts);
    }

    private static string Text(double value) => value.ToString("R", System.Globalization.CultureInfo.InvariantCulture);

    /// <summary>Boards drawn from their tolerances; every fourth has R4 a decade too high, and readings lie at either side of a range's end.</summary>
    private static ImmutableArray<ReadingSet> Shelf(int count)
    {
        var healthy = Bench.Board;
        var faulty = healthy.With([(Resistor)healthy.Find("R4")! with { Ohms = Nominal.Within(6800, Tolerance.Percent(5)) }], []);
        var draw = new Random(11);
        var boards = ImmutableArray.CreateBuilder<ReadingSet>();
        for (var i = 0; i < count; i++)
        {
            var readings = WorkshopBoards.EveryNode(Bench);
            Probe[] probes = [.. readings.Select(r => Probe.Of(Bench, r))];
            var model = new BoardModel(i % 4 == 3 ? faulty : healthy, probes, new bool[probes.Length], new NetworkSolver(JunctionLaw.Exponential));
            double[] phi = [.. model.Parameters.Select(p => p.Mean + p.Sigma * (2 * draw.NextDouble() - 1))];
            var volts = new double[probes.Length];
            model.Predict(phi, volts, []);
            boards.Add(new ReadingSet($"{i:000}", [.. readings.Select((r, k) => r with { Value = Math.Round(volts[k], 3) })]));
        }

        return boards.ToImmutable();
    }
}
