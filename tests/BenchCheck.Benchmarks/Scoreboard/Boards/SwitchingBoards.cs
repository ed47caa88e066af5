using BenchCheck.Core.Boards;
using BenchCheck.Core.Metering;

namespace BenchCheck.Benchmarks.Scoreboard.Boards;

/// <summary>Switches, drivers and references. Every board is invented for the scoreboard.</summary>
internal static class SwitchingBoards
{
    public static IEnumerable<Bench> All => [ValveSwitch(), SensorRail(), StatusLamp(), VentRelay(), BatteryWatch()];

    private static Bench ValveSwitch() => new BoardDraft("Heater-valve switch", BoardOrigin.NewBuild)
        .Supply("V1", "VCC", 24)
        .R("R1", "VCC", "B1", 100e3).R("R2", "B1", "K1", 10e3).Switch("S1", "K1", "GND", false)
        .Pnp("Q1", "OUT", "B1", "VCC", 60, 240)
        .R("R3", "OUT", "GND", 1.5e3).R("R4", "OUT", "A1", 4.7e3).Led("D1", "A1", "GND", 2.0)
        .With("idle", "S1", "open").With("heating", "S1", "closed")
        .Bench();

    private static Bench SensorRail() => new BoardDraft("Sensor rail, 5 V", BoardOrigin.Service)
        .Supply("V1", "VCC", 12)
        .R("R1", "VCC", "B1", 680).Zener("D1", "GND", "B1", 5.6).R("R2", "VCC", "C1", 47)
        .Npn("Q1", "C1", "B1", "OUT", 60, 250)
        .R("R3", "OUT", "GND", 470).R("R4", "OUT", "TAP", 2.2e3).R("R5", "TAP", "GND", 3.3e3).C("C1", "OUT", "GND", 100e-6)
        .R("R6", "OUT", "P1", 220).Switch("S1", "P1", "GND", false)
        .With("light load", "S1", "open").With("full load", "S1", "closed")
        .Bench();

    private static Bench StatusLamp() => new BoardDraft("Status-lamp current sink", BoardOrigin.NewBuild)
        .Supply("V1", "VCC", 12)
        .R("R1", "VCC", "B1", 5.6e3).D("D1", "B1", "M1").D("D2", "M1", "GND")
        .Npn("Q1", "C1", "B1", "E1", 80, 320)
        .R("R2", "E1", "GND", 68).R("R3", "VCC", "A3", 150).Led("D3", "A3", "C1", 2.1)
        .Bench();

    private static Bench VentRelay() => new BoardDraft("Vent relay driver", BoardOrigin.Service)
        .Supply("V1", "VCC", 24).Supply("V2", "IN", 0)
        .R("R1", "IN", "B1", 4.7e3).R("R2", "B1", "GND", 47e3)
        .Npn("Q1", "C1", "B1", "GND", 60, 300)
        .Coil("L1", "VCC", "C1", 1.1e3).D("D1", "C1", "VCC").R("R3", "VCC", "A2", 4.7e3).Led("D2", "A2", "C1", 1.9)
        .With("shut", "V2", 0).With("open", "V2", 5)
        .Bench();

    private static Bench BatteryWatch() => new BoardDraft("Battery watch", BoardOrigin.NewBuild)
        .Supply("V1", "VBAT", 12)
        .R("R1", "VBAT", "Z1", 2.2e3).Zener("D1", "GND", "Z1", 3.9)
        .R("R2", "VBAT", "B1", 100e3, 2).R("R3", "B1", "GND", 82e3, 2)
        .Npn("Q1", "C1", "B1", "Z1", 120, 400)
        .R("R4", "VBAT", "C1", 22e3).R("R5", "C1", "B2", 15e3)
        .Pnp("Q2", "OUT", "B2", "VBAT", 80, 300).R("R6", "OUT", "GND", 3.3e3)
        .With("full", "V1", 13.2).With("flat", "V1", 9)
        .Bench();
}
