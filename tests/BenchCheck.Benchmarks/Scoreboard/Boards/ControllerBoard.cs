using BenchCheck.Core.Boards;
using BenchCheck.Core.Metering;

namespace BenchCheck.Benchmarks.Scoreboard.Boards;

/// <summary>The large one: 25 parts, three transistors, 19 nodes. Invented for the scoreboard.</summary>
internal static class ControllerBoard
{
    public static Bench Irrigation { get; } = new BoardDraft("Irrigation controller card", BoardOrigin.NewBuild)
        .Supply("V1", "VCC", 15)
        .R("R1", "VCC", "VF", 47).R("R2", "VF", "ZR", 1.2e3).Zener("D1", "GND", "ZR", 6.2)
        .R("R3", "ZR", "N1", 22e3).R("R4", "N1", "N2", 8.2e3).R("R5", "N2", "GND", 1.8e3)
        .R("R6", "N1", "B1", 100e3)
        .Npn("Q1", "C1", "B1", "E1", 150, 450).R("R7", "VF", "C1", 8.2e3).R("R8", "E1", "F1", 1.2e3).R("R9", "F1", "GND", 330)
        .R("R10", "C1", "B2", 4.7e3).Pnp("Q2", "C2", "B2", "E2", 100, 350).R("R11", "VF", "E2", 3.3e3).R("R12", "C2", "D2", 1.8e3)
        .R("R13", "D2", "GND", 1e3).R("R14", "C2", "H1", 220e3).R("R15", "H1", "H2", 470e3).R("R16", "H2", "GND", 1e6)
        .R("R17", "C2", "B3", 6.8e3).Npn("Q3", "C3", "B3", "E3", 80, 300).R("R18", "VF", "A3", 820).Led("D3", "A3", "C3", 2.0)
        .R("R19", "E3", "GND", 560)
        .Bench();
}
