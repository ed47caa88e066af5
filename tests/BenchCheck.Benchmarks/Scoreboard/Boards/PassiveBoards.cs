using BenchCheck.Core.Boards;
using BenchCheck.Core.Metering;

namespace BenchCheck.Benchmarks.Scoreboard.Boards;

/// <summary>Resistor networks, some of so high a resistance that the meter pulls them down. Every board is invented for the scoreboard.</summary>
internal static class PassiveBoards
{
    public static IEnumerable<Bench> All => [ThermistorBridge(), TankSender(), ElectrodeBias()];

    private static Bench ThermistorBridge() => new BoardDraft("Thermistor bridge", BoardOrigin.NewBuild)
        .Supply("V1", "VREF", 5, 0.5)
        .R("R1", "VREF", "TOP", 1e3, 1).R("R2", "TOP", "A", 10e3, 1).R("R3", "A", "GND", 10e3, 1).R("R4", "TOP", "B", 10e3, 1).R("R5", "B", "GND", 12e3, 2)
        .R("R6", "A", "B", 100e3, 2).R("R7", "A", "FA", 47e3, 2).R("R8", "FA", "GND", 330e3, 2)
        .Bench();

    private static Bench TankSender() => new BoardDraft("Tank-level sender", BoardOrigin.Service)
        .Supply("V1", "VCC", 10)
        .R("R1", "VCC", "HI", 1e3).Pot("R2", "LO", "W", "HI", 10e3, 0.5).R("R3", "LO", "GND", 2.2e3)
        .R("R4", "W", "P1", 22e3).Switch("S1", "P1", "GND", false)
        .R("R5", "W", "OUT", 470e3).R("R6", "OUT", "GND", 2.2e6).C("C1", "OUT", "GND", 100e-9)
        .With("full scale", "S1", "open").With("half scale", "S1", "closed")
        .Bench();

    private static Bench ElectrodeBias() => new BoardDraft("pH-electrode bias network", BoardOrigin.NewBuild)
        .Supply("V1", "VP", 5).Supply("V2", "VN", -5)
        .R("R1", "VP", "N1", 1e6, 2).R("R2", "N1", "N2", 470e3, 2).R("R3", "N2", "VN", 1.5e6, 2).R("R4", "N1", "GND", 2.2e6, 2)
        .R("R5", "N2", "N3", 680e3, 2).R("R6", "N3", "GND", 3.3e6, 2).C("C1", "N3", "GND", 10e-9)
        .Bench();
}
