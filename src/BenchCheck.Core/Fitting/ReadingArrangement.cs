using BenchCheck.Core.Boards;
using BenchCheck.Core.Equations;
using BenchCheck.Core.Equations.SmallSignal;
using BenchCheck.Core.Metering;

namespace BenchCheck.Core.Fitting;

/// <summary>Sorts readings into as few solutions of the board as serve them all: one a condition, and one for each ammeter at rest.</summary>
internal sealed class ReadingArrangement(Board board, ParameterTable table, IReadOnlyList<Probe> probes, NetworkSolver solver)
{
    public ReadingSetup[] Setups()
    {
        var together = new List<(Condition Condition, List<int> Readings)>();
        var result = new List<ReadingSetup>();
        for (var j = 0; j < probes.Count; j++)
        {
            var condition = Find(probes[j].Condition);
            if (probes[j].Quantity == ReadingQuantity.Current && !condition.IsSmallSignal)
            {
                result.Add(WithAmmeter(condition, j));
                continue;
            }

            var index = together.FindIndex(t => t.Condition.Name == condition.Name);
            if (index < 0) together.Add((condition, [j]));
            else together[index].Readings.Add(j);
        }

        foreach (var (condition, readings) in together) result.Add(condition.IsSmallSignal ? SmallSignal(condition, [.. readings]) : AtRest(condition, [.. readings]));
        return [.. result];
    }

    private Condition Find(string name) =>
        board.FindCondition(name) ?? throw new ArgumentException($"the board has no condition \"{name}\"");

    private DcSetup WithAmmeter(Condition condition, int reading)
    {
        var probe = probes[reading];
        if (AmmeterAt(probe.At, probe.Function.BurdenVolts / probe.Range) is not { } ammeter)
            return new DcSetup(solver, NetworkCompiler.Compile(board, table, condition), [reading], [new Measurement(-1, -1)]);
        var network = NetworkCompiler.Compile(board, table, condition, ammeter);
        return new DcSetup(solver, network, [reading], [new Measurement(network.RowOf(ammeter), -1)]);
    }

    private DcSetup AtRest(Condition condition, int[] readings)
    {
        var network = NetworkCompiler.Compile(board, table, condition);
        return new DcSetup(solver, network, readings, [.. readings.Select(j => Connect(network, probes[j]))]);
    }

    private Measurement Connect(Network network, Probe probe)
    {
        var (high, low) = (network.IndexOf(probe.At), network.IndexOf(probe.Against ?? board.Reference));
        return probe.Quantity switch
        {
            ReadingQuantity.Voltage => new Measurement(high, low, LoadSiemens: 1 / probe.Meter.InputOhms),
            ReadingQuantity.Resistance => new Measurement(high, low, TestAmperes: probe.Function.TestVolts / probe.Range),
            _ => throw new ArgumentException($"{probe.Quantity.Name()} is not read in a DC condition"),
        };
    }

    private SmallSignalSetup SmallSignal(Condition condition, int[] readings)
    {
        var atRest = NetworkCompiler.Compile(board, table, Find(condition.OperatingPoint!));
        Ammeter[] ammeters =
        [
            .. readings.Select(j => probes[j]).Where(p => p.Quantity is ReadingQuantity.Current or ReadingQuantity.CurrentGain)
                .SelectMany(p => new[] { p.At, p.Against }).OfType<string>().Distinct().Select(at => AmmeterAt(at, 0)).OfType<Ammeter>(),
        ];
        var signal = NetworkCompiler.CompileSmallSignal(board, table, Find(condition.OperatingPoint!), ammeters);
        return new SmallSignalSetup(
            solver, condition.Name, atRest, signal, condition.Hertz, readings, [.. readings.Select(j => Connect(signal, condition.Drive, probes[j]))]);
    }

    private SmallSignalMeasurement Connect(Network network, Drive? drive, Probe probe)
    {
        Pair Nodes(string at, string? against) => new(network.IndexOf(at), network.IndexOf(against ?? board.Reference));
        Pair Joint(string at) => AmmeterAt(at, 0) is { } ammeter ? new(network.RowOf(ammeter), -1) : Pair.None;
        var driven = drive is null ? Pair.None : Nodes(drive.At, drive.Against);
        var load = 1 / probe.Meter.InputOhms;
        switch (probe.Quantity)
        {
            case ReadingQuantity.Gain:
                var from = Nodes(probe.Against!, null);
                return SmallSignalMeasurement.Ratio(Nodes(probe.At, null), from, drive is null ? from : driven, load, probe.IsMagnitude);
            case ReadingQuantity.CurrentGain when probe.Against is null:
                return SmallSignalMeasurement.Ratio(Joint(probe.At), Pair.None, driven, 0, probe.IsMagnitude);
            case ReadingQuantity.CurrentGain:
                return AmmeterAt(probe.Against!, 0) is { } input
                    ? SmallSignalMeasurement.Ratio(
                        Joint(probe.At), Joint(probe.Against!), drive is null ? Nodes(board.Find(input.Part)!.Nodes[input.Pin], null) : driven, 0, probe.IsMagnitude)
                    : SmallSignalMeasurement.Ratio(Pair.None, Pair.None, driven, 0, probe.IsMagnitude);
            case ReadingQuantity.InputResistance:
                return SmallSignalMeasurement.Impedance(Nodes(probe.At, probe.Against), Pair.None, 0);
            case ReadingQuantity.OutputResistance:
                return SmallSignalMeasurement.Impedance(Nodes(probe.At, probe.Against), driven, drive?.Ohms ?? 0);
            case ReadingQuantity.Voltage:
                return SmallSignalMeasurement.Voltage(Nodes(probe.At, probe.Against), driven, drive?.Volts ?? 0, drive?.Ohms ?? 0, load);
            case ReadingQuantity.Current:
                return SmallSignalMeasurement.Voltage(Joint(probe.At), driven, drive?.Volts ?? 0, drive?.Ohms ?? 0, 0);
            default:
                throw new ArgumentException($"{probe.Quantity.Name()} is not read in a small-signal condition");
        }
    }

    /// <summary>In series with the part and pin of "R3" (its first pin) or "Q1.base"; null for a pin that the part has lost to a fault: nothing flows there.</summary>
    private Ammeter? AmmeterAt(string at, double burdenOhms)
    {
        if (board.Find(at) is { } part) return new Ammeter(part.Designator, 0, burdenOhms);
        var dot = at.LastIndexOf('.');
        var owner = (dot > 0 ? board.Find(at[..dot]) : null) ?? throw new ArgumentException($"the board has no part or pin \"{at}\"", nameof(at));
        return owner.Kind.Pins.IndexOf(at[(dot + 1)..]) is >= 0 and var pin ? new Ammeter(owner.Designator, pin, burdenOhms) : null;
    }
}
