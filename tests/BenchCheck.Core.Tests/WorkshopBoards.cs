using System.Collections.Immutable;
using BenchCheck.Core.Boards;
using BenchCheck.Core.Metering;
using BenchCheck.Core.Quantities;

namespace BenchCheck.Core.Tests;

/// <summary>Boards of an invented workshop that builds greenhouse climate controllers.</summary>
internal static class WorkshopBoards
{
    /// <summary>One transistor stage with nine parts: supply, six resistors, transistor, emitter capacitor; read in two conditions at every node.</summary>
    public static Bench FanStage()
    {
        static Resistor R(string name, string a, string b, double ohms) => new(name, [a, b], Nominal.Within(ohms, Tolerance.Percent(5)));
        var high = new Condition("high", false, ImmutableDictionary<string, Nominal>.Empty.Add("V2", Nominal.Within(6, Tolerance.Percent(2))), ImmutableDictionary<string, string>.Empty);
        return new Bench(
            new Board(
                "Fan stage", "GND", BoardOrigin.NewBuild,
                [
                    new Supply("V1", ["VCC", "GND"], Nominal.Within(12, Tolerance.Percent(1))),
                    new Supply("V2", ["IN", "GND"], Nominal.Within(3, Tolerance.Percent(2))),
                    R("R1", "IN", "B1", 100e3), R("R2", "VCC", "B1", 470e3), R("R3", "VCC", "C1", 2.2e3), R("R4", "E1", "GND", 680), R("R5", "C1", "OUT", 10e3),
                    R("R6", "OUT", "GND", 47e3),
                    new Transistor(Transistor.Npn, "Q1", ["C1", "B1", "E1"], Nominal.Between(80, 320), Transistor.UsualDrop, Transistor.UsualSaturation),
                ],
                [Condition.Powered, high]),
            [Meter.Usual], []);
    }

    /// <summary>A voltage reading at every node, in every condition, of a value still to come.</summary>
    public static ImmutableArray<Reading> EveryNode(Bench bench) =>
    [
        .. bench.Board.Conditions.Where(c => !c.SuppliesRemoved).SelectMany(c => bench.Board.Nodes.Skip(1).Select(n => new Reading([], c.Name, ReadingQuantity.Voltage, n, bench.Board.Reference, 0))),
    ];
}
