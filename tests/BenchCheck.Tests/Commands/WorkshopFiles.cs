namespace BenchCheck.Tests.Commands;

/// <summary>A board of the invented workshop, healthy readings of it, and readings with R4 a decade too high.</summary>
internal static class WorkshopFiles
{
    public const string Board = """
        title = "Circulation-fan stage"
        [parts]
        V1 = { kind = "supply",   value = "12 V 1%", pins = { plus = "VCC", minus = "GND" } }
        R1 = { kind = "resistor", value = "68k 5%",  pins = ["VCC", "B1"] }
        R2 = { kind = "resistor", value = "15k 5%",  pins = ["B1", "GND"] }
        R3 = { kind = "resistor", value = "2k7 5%",  pins = ["VCC", "C1"] }
        R4 = { kind = "resistor", value = "680 5%",  pins = ["E1", "GND"] }
        R5 = { kind = "resistor", value = "10k 5%",  pins = ["C1", "OUT"] }
        R6 = { kind = "resistor", value = "33k 5%",  pins = ["OUT", "GND"] }
        Q1 = { kind = "npn", gain = "100..300", pins = { collector = "C1", base = "B1", emitter = "E1" } }
        """;

    public const string Healthy = "at,value\nVCC,11.94 V\nB1,2.139 V\nC1,5.306 V\nE1,1.484 V\nOUT,4.131 V\n";

    public const string Faulty = "at,value\nVCC,12.16 V\nB1,2.081 V\nC1,11.16 V\nE1,1.467 V\nOUT,8.60 V\n";
}
