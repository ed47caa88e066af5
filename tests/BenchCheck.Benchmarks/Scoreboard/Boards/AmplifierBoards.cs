using BenchCheck.Core.Boards;
using BenchCheck.Core.Metering;

namespace BenchCheck.Benchmarks.Scoreboard.Boards;

/// <summary>Stages in their active region. Every board is invented for the scoreboard: a workshop for greenhouse climate controllers.</summary>
internal static class AmplifierBoards
{
    public static IEnumerable<Bench> All => [FanStage(), ProbeBuffer(), SoilStage(), FrostStage(), DosingPair(), TiltPair(), LightMirror()];

    private static Bench FanStage() => new BoardDraft("Fan-speed pick-up stage", BoardOrigin.Service)
        .Supply("V1", "VCC", 9)
        .R("R1", "VCC", "B1", 1.5e6).R("R2", "VCC", "C1", 3.9e3).R("R3", "E1", "GND", 470)
        .Npn("Q1", "C1", "B1", "E1", 100, 400)
        .C("C1", "E1", "GND", 22e-6)
        .Bench();

    private static Bench ProbeBuffer() => new BoardDraft("Humidity-probe buffer", BoardOrigin.NewBuild)
        .Supply("V1", "VCC", 12)
        .R("R1", "VCC", "B1", 1e6).R("R2", "B1", "GND", 1.5e6)
        .Npn("Q1", "VCC", "B1", "OUT", 200, 450)
        .R("R3", "OUT", "GND", 22e3).R("R4", "OUT", "LINE", 10e3).R("R5", "LINE", "GND", 47e3)
        .Bench();

    private static Bench SoilStage() => new BoardDraft("Soil-probe amplifier", BoardOrigin.NewBuild)
        .Supply("V1", "VCC", 15)
        .R("R1", "VCC", "B1", 68e3).R("R2", "B1", "GND", 15e3).R("R3", "VCC", "C1", 5.6e3).R("R4", "E1", "GND", 1.2e3)
        .Npn("Q1", "C1", "B1", "E1", 110, 450)
        .R("R5", "B1", "P1", 33e3).Switch("S1", "P1", "GND", false)
        .C("C1", "E1", "GND", 100e-6)
        .With("dry", "S1", "open").With("wet", "S1", "closed")
        .Bench();

    private static Bench FrostStage() => new BoardDraft("Frost-alarm stage", BoardOrigin.Service)
        .Supply("V1", "VCC", 6)
        .R("R1", "VCC", "C1", 2.7e3).R("R2", "C1", "M1", 150e3).R("R3", "M1", "B1", 180e3).R("R4", "B1", "GND", 390e3).R("R5", "E1", "GND", 100)
        .Npn("Q1", "C1", "B1", "E1", 120, 400)
        .C("C1", "M1", "GND", 1e-6)
        .Bench();

    private static Bench DosingPair() => new BoardDraft("Dosing-pump preamplifier", BoardOrigin.NewBuild)
        .Supply("V1", "VCC", 18)
        .R("R1", "VCC", "C1", 33e3).R("R2", "VCC", "C2", 4.7e3).R("R3", "E2", "GND", 1e3).R("R4", "E2", "B1", 180e3).R("R5", "E1", "GND", 220)
        .Npn("Q1", "C1", "B1", "E1", 150, 450).Npn("Q2", "C2", "C1", "E2", 80, 300)
        .C("C1", "E2", "GND", 47e-6)
        .Bench();

    private static Bench TiltPair() => new BoardDraft("Roof-tilt comparator", BoardOrigin.Service)
        .Supply("V1", "VCC", 12).Supply("V2", "VEE", -12).Supply("V3", "IN", 0)
        .R("R1", "VCC", "C1", 10e3).R("R2", "VCC", "C2", 10e3).R("R3", "EE", "VEE", 12e3)
        .R("R4", "IN", "B1", 22e3).R("R5", "B2", "GND", 22e3).R("R6", "E1", "EE", 100).R("R7", "E2", "EE", 100)
        .Npn("Q1", "C1", "B1", "E1", 100, 350).Npn("Q2", "C2", "B2", "E2", 100, 350)
        .With("level", "V3", 0).With("tilted", "V3", 0.25)
        .Bench();

    private static Bench LightMirror() => new BoardDraft("Light-sensor mirror", BoardOrigin.NewBuild)
        .Supply("V1", "VCC", 9)
        .R("R1", "VCC", "E1", 1e3, 2).R("R2", "VCC", "E2", 1e3, 2).R("R3", "B", "GND", 8.2e3, 2).R("R4", "C2", "GND", 3.9e3, 2)
        .Pnp("Q1", "B", "B", "E1", 100, 300).Pnp("Q2", "C2", "B", "E2", 100, 300)
        .Npn("Q3", "VCC", "C2", "OUT", 100, 300).R("R5", "OUT", "GND", 1.8e3)
        .Bench();
}
