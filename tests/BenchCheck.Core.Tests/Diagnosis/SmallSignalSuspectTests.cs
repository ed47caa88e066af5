using BenchCheck.Core.Boards;
using BenchCheck.Core.Checking;
using BenchCheck.Core.Diagnosis;
using BenchCheck.Core.Equations;
using BenchCheck.Core.Fitting;
using BenchCheck.Core.Metering;
using BenchCheck.Core.Quantities;
using Xunit;

namespace BenchCheck.Core.Tests.Diagnosis;

/// <summary>Faults that only the signal shows, and gains that join the DC readings in one fit.</summary>
public class SmallSignalSuspectTests
{
    private static readonly Condition Signal = Condition.Powered with
    {
        Name = "signal", OperatingPoint = Condition.DefaultName, Hertz = 1000, Drive = new Drive("IN", "0", 0.005, 600),
    };

    [Fact]
    public void An_open_bypass_capacitor_is_named_though_every_voltage_is_right()
    {
        var bench = Stage();
        var dry = (Capacitor)bench.Board.Find("C2")! with { Farads = Nominal.Exactly(1e-12) };
        var result = Check(bench, Readings(bench, bench.Board.With([dry], [])));
        Assert.Equal(BoardVerdict.Disagrees, result.Verdict);
        Assert.All(result.Readings.Where(r => r.Reading.Condition == Condition.DefaultName), r => Assert.Equal(ReadingVerdict.In, r.Verdict));
        Assert.Equal("C2", result.Suspects[0].Fault.Parts[0]);
        Assert.True(result.Suspects[0].Probability > 0.9);
    }

    [Fact]
    public void A_dried_out_capacitor_is_named_with_the_capacitance_that_is_left()
    {
        var bench = Stage();
        var dry = (Capacitor)bench.Board.Find("C2")! with { Farads = Nominal.Exactly(1.5e-6) };
        var first = Check(bench, Readings(bench, bench.Board.With([dry], []))).Suspects[0];
        Assert.Equal((FaultKind.WrongValue, "C2"), (first.Fault.Fault, first.Fault.Parts[0]));
        Assert.InRange(first.Fault.Value!.Value, 1.3e-6, 1.7e-6);
        Assert.Equal(Unit.Farad, first.Fault.Unit);
    }

    [Fact]
    public void A_gain_typed_without_its_sign_is_compared_without_it_and_a_wrong_sign_is_flagged()
    {
        var bench = Stage();
        var readings = Readings(bench, bench.Board);
        var plain = readings with { Readings = [.. readings.Readings.Select(r => r.Quantity == ReadingQuantity.Gain ? r with { Value = Math.Abs(r.Value) } : r)] };
        Assert.Equal(BoardVerdict.Agrees, Check(bench, plain).Verdict);
        var follower = new BoardSketch().Supply("V1", "VCC", 12, percent: 1).Resistor("R1", "VCC", "IN", 100e3, 1).Resistor("R2", "IN", "0", 100e3, 1)
            .Npn("Q1", "VCC", "IN", "OUT", 100, 400, 0.65).Resistor("R3", "OUT", "0", 2.2e3, 1).In(Condition.Powered).In(Signal with { Hertz = null }).Board;
        var other = new Bench(follower, [Meter.Usual], []);
        var inverted = new Reading([], "signal", ReadingQuantity.Gain, "OUT", "IN", -0.99);
        Assert.Equal(ReadingVerdict.Out, Check(other, new ReadingSet(null, [inverted])).Readings[0].Verdict);
    }

    [Fact]
    public void Currents_read_at_pins_are_compared_under_every_fault_of_the_part()
    {
        var bench = Stage();
        var plain = Readings(bench, bench.Board);
        Reading[] currents =
        [
            new([], Condition.DefaultName, ReadingQuantity.Current, "Q1.emitter", null, -1.39e-3) { StatedUncertainty = 3e-5 },
            new([], "signal", ReadingQuantity.CurrentGain, "Q1.collector", "Q1.base", 220), new([], "signal", ReadingQuantity.CurrentGain, "Q1.emitter", "Q1.base", 221),
        ];
        var result = Check(bench, plain with { Readings = [.. plain.Readings, .. currents] });
        Assert.Equal(7 + 2, result.Readings.Length);
        Assert.NotEqual(BoardVerdict.Disagrees, result.Verdict);
        Assert.All(result.Readings, r => Assert.Equal(ReadingVerdict.In, r.Verdict));
    }

    [Fact]
    public void Next_reading_offers_the_gain_where_only_the_signal_can_tell()
    {
        var bench = Stage();
        var dry = (Capacitor)bench.Board.Find("C2")! with { Farads = Nominal.Exactly(1e-12) };
        var all = Readings(bench, bench.Board.With([dry], []));

        // From the resistance that the generator meets alone, several parts could be to blame.
        var some = all with { Readings = [.. all.Readings.Where(r => r.Quantity != ReadingQuantity.Gain && r.At != "C1")] };
        var result = Check(bench, some);
        Assert.Contains(result.Next, n => n.Quantity == ReadingQuantity.Gain && n.Text.Contains("(signal)", StringComparison.Ordinal));
        Assert.DoesNotContain(result.Next, n => n.Quantity == ReadingQuantity.Gain && n.Caution is not null);
    }

    private static Bench Stage() => new(
        new BoardSketch().Supply("V1", "VCC", 12, percent: 1).Resistor("R1", "VCC", "B1", 56e3, 2).Resistor("R2", "B1", "0", 12e3, 2).Resistor("R3", "VCC", "C1", 4.7e3, 2)
            .Resistor("R4", "E1", "0", 1e3, 2).Npn("Q1", "C1", "B1", "E1", 120, 400, 0.65)
            .Add(new Capacitor("C1", ["IN", "B1"], Nominal.Within(10e-6, Tolerance.Percent(20)))).Add(new Capacitor("C2", ["E1", "0"], Nominal.Within(100e-6, Tolerance.Percent(20))))
            .In(Condition.Powered).In(Signal).Board,
        [Meter.Usual], []);

    private static CheckResult Check(Bench bench, ReadingSet readings) => new Reconciliation(bench, CheckSettings.Default).Run(readings, TestContext.Current.CancellationToken);

    /// <summary>What would be read, without error, on a board with a fault in it.</summary>
    private static ReadingSet Readings(Bench bench, Board board)
    {
        Reading[] readings =
        [
            .. new[] { "VCC", "B1", "C1", "E1" }.Select(n => new Reading([], Condition.DefaultName, ReadingQuantity.Voltage, n, "0", 0)),
            new([], "signal", ReadingQuantity.Gain, "C1", "IN", -1), new([], "signal", ReadingQuantity.InputResistance, "IN", "0", 1),
        ];
        var probes = readings.Select(r => Probe.Of(bench, r)).ToArray();
        var model = new BoardModel(board, probes, new bool[probes.Length], new NetworkSolver(JunctionLaw.Exponential));
        var values = new double[probes.Length];
        model.Predict([.. model.Parameters.Select(p => p.Mean)], values, []);
        return new ReadingSet(null, [.. readings.Select((r, i) => r with { Value = values[i] })]);
    }
}
