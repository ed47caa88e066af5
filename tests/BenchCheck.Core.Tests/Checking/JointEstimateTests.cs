using BenchCheck.Core.Boards;
using BenchCheck.Core.Checking;
using BenchCheck.Core.Equations;
using BenchCheck.Core.Fitting;
using BenchCheck.Core.Metering;
using BenchCheck.Core.Quantities;
using Xunit;

namespace BenchCheck.Core.Tests.Checking;

/// <summary>One fit of readings at rest and readings of signals: what the second kind adds.</summary>
public class JointEstimateTests
{
    [Fact]
    public void The_gain_of_a_transistor_is_known_better_with_an_input_resistance_among_the_readings()
    {
        var bench = WorkshopBoards.TwoStageAmplifier();
        var all = Nominal(bench, WorkshopBoards.Everything(bench));
        double Uncertainty(string part, Func<Reading, bool> isTaken) =>
            Estimate(bench, [.. all.Where(isTaken)], part, ParameterKind.Gain) is var e ? e.StandardUncertainty / e.Value : double.NaN;
        var atRest = Uncertainty("Q1", r => r.Quantity == ReadingQuantity.Voltage);
        var joint = Uncertainty("Q1", r => r.Quantity is ReadingQuantity.Voltage or ReadingQuantity.InputResistance);
        Assert.True(joint < 0.75 * atRest, $"{joint} with, {atRest} without");

        // Seen from the output, the follower's gain stands between the collector resistor and the load.
        Assert.True(Uncertainty("Q2", r => r.Quantity is ReadingQuantity.Voltage or ReadingQuantity.OutputResistance) < 0.9 * Uncertainty("Q2", r => r.Quantity == ReadingQuantity.Voltage));
    }

    [Theory]
    [InlineData(0.47e-6)]
    [InlineData(22e-9)]
    public void A_capacitor_of_unknown_value_is_found_from_the_gain_at_a_frequency(double farads)
    {
        var signal = Condition.Powered with { Name = "signal", OperatingPoint = Condition.DefaultName, Hertz = 1000, Drive = new Drive("IN", "0", null, 600) };
        Board With(Nominal value) => new BoardSketch().Resistor("R1", "IN", "OUT", 1e3, 1).Resistor("R2", "OUT", "0", 10e3, 1).Add(new Capacitor("C1", ["OUT", "0"], value))
            .In(Condition.Powered).In(signal).Board;
        var bench = new Bench(With(Core.Quantities.Nominal.Unknown), [Meter.Usual], []);
        Reading[] places = [new([], "signal", ReadingQuantity.Gain, "OUT", "IN", 1)];
        var readings = Nominal(new Bench(With(Core.Quantities.Nominal.Exactly(farads)), [Meter.Usual], []), [.. places]);
        var estimate = Estimate(bench, readings, "C1", ParameterKind.Capacitance);
        Assert.InRange(farads, estimate.Low, estimate.High);
        if (farads > 100e-9) Assert.Equal(farads, estimate.Value, 0.05 * farads);
    }

    private static Reading[] Nominal(Bench bench, IReadOnlyList<Reading> places)
    {
        var probes = places.Select(r => Probe.Of(bench, r)).ToArray();
        var model = new BoardModel(bench.Board, probes, new bool[probes.Length], new NetworkSolver(JunctionLaw.Exponential));
        var values = new double[probes.Length];
        model.Predict([.. model.Parameters.Select(p => p.Mean)], values, []);
        return [.. places.Select((r, i) => r with { Value = values[i] })];
    }

    private static Estimate Estimate(Bench bench, Reading[] readings, string part, ParameterKind kind)
    {
        var plan = ReadingPlan.Of(bench, new ReadingSet(null, [.. readings]));
        var model = new BoardModel(bench.Board, plan.Probes, plan.HasScaleError, new NetworkSolver(JunctionLaw.Exponential));
        return Estimates.Of(BoardFit.Of(model, plan, new EvidenceFit()), 0.95).Single(e => e.Part == part && e.Kind == kind);
    }
}
