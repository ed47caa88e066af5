using System.Text;

namespace BenchCheck.Records.Tests;

/// <summary>Filings as a check would make them.</summary>
internal static class Filings
{
    public static byte[] Board { get; } = Encoding.UTF8.GetBytes("title = \"Fan stage\"\n[parts]\nR1 = { kind = \"resistor\", value = \"4k7 ±5%\" }\n");

    public static Filing Of(string? serial, string verdict = "agrees", string title = "Fan stage", int second = 0) => new(
        new DateTimeOffset(2026, 3, 1, 10, 30, 0, TimeSpan.FromHours(1)).AddSeconds(second), "benchcheck 1.0.0", title, serial, verdict, """{"confidence":0.95}""",
        $$"""{"format":1,"serial":"x","verdict":"{{verdict}}"}""", Board, Encoding.UTF8.GetBytes($"at,value\r\nC1,{second}.5 V\r\n"));
}
