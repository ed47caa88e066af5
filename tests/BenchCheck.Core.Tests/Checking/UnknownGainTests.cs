using System.Collections.Immutable;
using BenchCheck.Core.Boards;
using BenchCheck.Core.Checking;
using BenchCheck.Core.Equations;
using BenchCheck.Core.Fitting;
using BenchCheck.Core.Metering;
using BenchCheck.Core.Quantities;
using BenchCheck.Core.Tests.Equations;
using Xunit;

namespace BenchCheck.Core.Tests.Checking;

/// <summary>What the parts list leaves open, found from readings through the whole check: the gain of each controlled source, a wiper's position.</summary>
public class UnknownGainTests
{
    public static TheoryData<string, double> Sources => new() { { "vcvs", 2.2 }, { "vccs", 1.7e-3 }, { "ccvs", 3.3e3 }, { "cccs", 4.5 } };

    [Theory]
    [MemberData(nameof(Sources))]
    public void Unknown_gain_of_each_controlled_source_is_estimated(string kind, double gain)
    {
        // A divider whose tap, or whose lower resistor's current, drives a load of 1 kΩ.
        Part Source(Nominal value) => new ControlledSource(
            new[] { ControlledSource.VoltageByVoltage, ControlledSource.CurrentByVoltage, ControlledSource.VoltageByCurrent, ControlledSource.CurrentByCurrent }.Single(k => k.Name == kind),
            "K1", ["OUT", "GND"], value, kind[1..3] == "cv" ? new Control.NodePair("TAP", "GND") : new Control.PartCurrent("R2"));
        var result = Check(
            Source, Nominal.Exactly(gain), Resistor("R1", "VCC", "TAP", 10e3), Resistor("R2", "TAP", "GND", 4.7e3), Resistor("R3", "OUT", "GND", 1e3));
        var estimate = Assert.Single(result.Parameters, e => e.Part == "K1");
        Assert.Equal(BoardVerdict.Agrees, result.Verdict);
        Assert.InRange(gain, estimate.Low, estimate.High);
        Assert.Equal(gain, estimate.Value, 0.1 * gain);
    }

    [Theory]
    [InlineData(0.03)]
    [InlineData(0.5)]
    [InlineData(0.97)]
    public void Unknown_position_of_a_potentiometer_is_estimated(double position)
    {
        var result = Check(
            value => new Potentiometer("R2", ["GND", "OUT", "TAP"], Nominal.Within(10e3, Tolerance.Percent(10)), value), Nominal.Exactly(position),
            Resistor("R1", "VCC", "TAP", 4.7e3), Resistor("R3", "OUT", "GND", 1e6));
        var estimate = Assert.Single(result.Parameters, e => e.Part == "R2" && e.Kind == ParameterKind.Position);
        Assert.Equal(BoardVerdict.Agrees, result.Verdict);
        Assert.InRange(position, estimate.Low, estimate.High);
        Assert.Equal(position, estimate.Value, 0.03);
    }

    private static Resistor Resistor(string name, string from, string to, double ohms) => new(name, [from, to], Nominal.Within(ohms, Tolerance.Percent(1)));

    /// <summary>Reads every node of the board with the known value, and checks the board that leaves it open.</summary>
    private static CheckResult Check(Func<Nominal, Part> part, Nominal truth, params Part[] others)
    {
        Board Of(Nominal value) =>
            new("open", "GND", BoardOrigin.NewBuild, [new Supply("V1", ["VCC", "GND"], Nominal.Within(9, Tolerance.Percent(1))), .. others, part(value)], [Condition.Powered]);
        var (known, open) = (Of(truth), Of(Nominal.Unknown));
        var solved = new SolvedBoard(known);
        ImmutableArray<Reading> readings =
            [.. known.Nodes.Where(n => n != "GND").Select(n => new Reading([], Condition.Powered.Name, ReadingQuantity.Voltage, n, "GND", Math.Round(solved.Volts(n, "GND"), 3)))];
        var bench = new Bench(open, [Meter.Usual with { InputOhms = double.PositiveInfinity }], []);
        var plan = ReadingPlan.Of(bench, new ReadingSet(null, readings));
        var model = new BoardModel(open, plan.Probes, plan.HasScaleError, new NetworkSolver(JunctionLaw.Exponential));
        return Checker.Check(bench, new ReadingSet(null, readings), plan, model, new EvidenceFit(), CheckSettings.Default).Result;
    }
}
