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

    /// <summary>Two coupled stages, the first with part of its emitter resistor bypassed, the second a follower; read at rest and with small signals.</summary>
    public static Bench TwoStageAmplifier()
    {
        static Resistor R(string name, string a, string b, double ohms) => new(name, [a, b], Nominal.Within(ohms, Tolerance.Percent(5)));
        static Capacitor C(string name, string a, string b, double farads) => new(name, [a, b], Nominal.Within(farads, Tolerance.Percent(20)));
        static Transistor Q(string name, string collector, string @base, string emitter) =>
            new(Transistor.Npn, name, [collector, @base, emitter], Nominal.Between(100, 400), Transistor.UsualDrop, Transistor.UsualSaturation);
        var signal = Condition.Powered with { Name = "signal", OperatingPoint = Condition.DefaultName, Drive = new Drive("IN", "GND", 5e-3, 600) };
        return new Bench(
            new Board(
                "Two-stage amplifier", "GND", BoardOrigin.NewBuild,
                [
                    new Supply("V1", ["VCC", "GND"], Nominal.Within(12, Tolerance.Percent(1))),
                    R("R1", "VCC", "B1", 82e3), R("R2", "B1", "GND", 15e3), R("R3", "VCC", "C1", 4.7e3), R("R4", "E1", "X1", 100), R("R5", "X1", "GND", 820),
                    R("R6", "E2", "GND", 2.2e3), R("R7", "OUT", "GND", 10e3), C("C1", "IN", "B1", 10e-6), C("C2", "X1", "GND", 100e-6), C("C3", "E2", "OUT", 10e-6),
                    Q("Q1", "C1", "B1", "E1"), Q("Q2", "VCC", "C1", "E2"),
                ],
                [Condition.Powered, signal]),
            [Meter.Usual], []);
    }

    /// <summary>Every node in every condition at rest, and with small signals the gain and both resistances, of values still to come.</summary>
    public static ImmutableArray<Reading> Everything(Bench bench) =>
    [
        .. EveryNode(bench),
        .. bench.Board.Conditions.Where(c => c.IsSmallSignal).SelectMany(c => new Reading[]
        {
            new([], c.Name, ReadingQuantity.Gain, "C1", "B1", -1), new([], c.Name, ReadingQuantity.Gain, "OUT", "IN", -1),
            new([], c.Name, ReadingQuantity.InputResistance, "IN", bench.Board.Reference, 1), new([], c.Name, ReadingQuantity.OutputResistance, "OUT", bench.Board.Reference, 1),
        }),
    ];

    /// <summary>A voltage reading at every node, in every condition at rest, of a value still to come.</summary>
    public static ImmutableArray<Reading> EveryNode(Bench bench) =>
    [
        .. bench.Board.Conditions.Where(c => !c.SuppliesRemoved && !c.IsSmallSignal).SelectMany(c => bench.Board.Nodes.Skip(1).Select(n => new Reading([], c.Name, ReadingQuantity.Voltage, n, bench.Board.Reference, 0))),
    ];
}
