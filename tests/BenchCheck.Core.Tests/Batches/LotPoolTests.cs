using BenchCheck.Core.Batches;
using BenchCheck.Core.Boards;
using BenchCheck.Core.Checking;
using BenchCheck.Core.Equations;
using BenchCheck.Core.Fitting;
using BenchCheck.Core.Metering;
using BenchCheck.Core.Quantities;
using Xunit;

namespace BenchCheck.Core.Tests.Batches;

public sealed class LotPoolTests
{
    private const double Stated = 20;

    private static readonly Bench Bench = new(
        new Board(
            "Divider", "GND", BoardOrigin.NewBuild,
            [
                new Resistor("R1", ["A", "GND"], Nominal.Within(1000, Tolerance.Percent(5))), new Supply("V1", ["B", "GND"], Nominal.Exactly(5)),
                new Resistor("R2", ["B", "GND"], Nominal.Exactly(1000)),
            ],
            [Condition.Powered, Condition.Unpowered]),
        [Meter.Usual], []);

    [Fact]
    public void Resistances_read_with_a_poor_meter_are_tightened_by_their_lot()
    {
        // A lot 0.5 % high that spreads by 3 Ω; readings good to 20 Ω.
        var draw = new Random(5);
        var truths = Enumerable.Range(0, 200).Select(_ => 1005 + 3 * Normal(draw)).ToArray();
        ReadingSet[] boards = [.. truths.Select(r => Board(r + Stated * Normal(draw)))];
        var lot = new LotPool(Bench, JunctionLaw.Exponential).LotOf(new BatchRun(Bench, Settings, null, 2), boards, _ => { }, TestContext.Current.CancellationToken)!;
        var parameter = lot.Parameters.Single(p => p.Parameter.Owner == "R1");
        Assert.Equal(1005, parameter.Value, 3 * parameter.Scaled(parameter.MeanUncertainty));
        Assert.InRange(parameter.Scaled(parameter.MeanUncertainty), 1, 2.5);
        Assert.InRange(parameter.Scaled(parameter.Spread), 1, 12);

        var run = new BatchRun(Bench, Settings, null, 2);
        var estimates = run.Run(boards, (result, fit) => lot.Tighten(result, fit).Parameters.Single(p => p.Part == "R1"), (_, _) => null!, TestContext.Current.CancellationToken).ToArray();
        Assert.InRange(estimates.Count(e => e.WithLot is null), 0, 5);
        Assert.All(estimates.Where(e => e.WithLot is not null), e => Assert.True(e.WithLot!.StandardUncertainty < 0.6 * e.StandardUncertainty));
        Assert.True(Error(estimates.Select(e => e.WithLot?.Value ?? e.Value)) < 0.5 * Error(estimates.Select(e => e.Value)));

        double Error(IEnumerable<double> values) => values.Zip(truths, (v, t) => (v - t) * (v - t)).Sum();
    }

    [Fact]
    public void A_board_that_disagrees_is_neither_taken_into_the_lot_nor_tightened()
    {
        ReadingSet[] boards = [Board(1000), Board(1002), Board(998), Board(1001), Board(1500)];
        var run = new BatchRun(Bench, Settings, null, 1);
        var lot = new LotPool(Bench, JunctionLaw.Exponential).LotOf(run, boards, _ => { }, TestContext.Current.CancellationToken)!;
        Assert.Equal(4, lot.Boards);
        var tightened = run.Run(boards, (result, fit) => lot.Tighten(result, fit).Parameters.Any(p => p.WithLot is not null), (_, _) => false, TestContext.Current.CancellationToken);
        Assert.Equal([true, true, true, true, false], tightened);
    }

    [Fact]
    public void Two_boards_are_no_lot_and_of_very_many_a_sample_is_kept()
    {
        var pool = new LotPool(Bench, JunctionLaw.Exponential);
        for (var i = 0; i < 2; i++) pool.Add(ReadingPlan.Of(Bench, Board(1000 + i)));
        Assert.Null(pool.Solve(TestContext.Current.CancellationToken));
        var draw = new Random(3);
        for (var i = 2; i < 3000; i++) pool.Add(ReadingPlan.Of(Bench, Board(1020 + 25 * Normal(draw))));
        var lot = pool.Solve(TestContext.Current.CancellationToken)!;
        Assert.Equal(3000, lot.Boards);
        var parameter = lot.Parameters.Single(p => p.Parameter.Owner == "R1");
        Assert.Equal(1020, parameter.Value, 4.0);
        // 25 Ω as read, of which 20 Ω are the meter's.
        Assert.Equal(15, parameter.Scaled(parameter.Spread), 3.5);
    }

    private static CheckSettings Settings => CheckSettings.Default with { FindFaults = false };

    private static ReadingSet Board(double ohms) => new(
        "x", [new Reading([], Condition.Unpowered.Name, ReadingQuantity.Resistance, "A", "GND", ohms) { StatedUncertainty = Stated }]);

    private static double Normal(Random draw) => Math.Sqrt(-2 * Math.Log(1 - draw.NextDouble())) * Math.Cos(2 * Math.PI * draw.NextDouble());
}
