using BenchCheck.Benchmarks.Scoreboard.Physics;
using BenchCheck.Core.Boards;
using BenchCheck.Core.Diagnosis;

namespace BenchCheck.Benchmarks.Scoreboard.Faults;

/// <summary>Draws a fault at random: its kind, its place, its number.</summary>
public static class FaultDraw
{
    public static TruthFault From(Board board, FaultMix mix, Random random)
    {
        ArgumentNullException.ThrowIfNull(mix);
        ArgumentNullException.ThrowIfNull(random);
        var places = mix.Pick(board, random);
        var fault = places[random.Next(places.Length)];
        return Number(board, fault, random) is { } value ? fault with { Value = value } : fault;
    }

    private static double? Number(Board board, TruthFault fault, Random random)
    {
        var draw = Draw.From(random);
        return (fault.Kind, fault.Parts.IsEmpty ? null : board.Find(fault.Parts[0])) switch
        {
            (FaultKind.WrongValue, Resistor r) => r.Ohms.Value * Math.Pow(10, Steps(random) / 12.0) * draw.Uniform(0.97, 1.03),
            (FaultKind.WrongValue, Diode d) => d.Breakdown!.Value * (random.Next(2) == 0 ? draw.Uniform(0.5, 0.88) : draw.Uniform(1.14, 1.8)),
            (FaultKind.HighResistanceJoint, _) => draw.LogUniform(100, 100e3),
            (FaultKind.Leaky, _) => draw.LogUniform(100, 1e6),
            (FaultKind.GainFarOff, Transistor q) => draw.LogUniform(2, Math.Min(30, q.Gain.Low / 2)),
            (FaultKind.SupplyWrong, Supply s) => s.Volts.Value * (random.Next(2) == 0 ? draw.Uniform(0.5, 0.93) : draw.Uniform(1.07, 1.4)),
            _ => null,
        };
    }

    /// <summary>Steps of the E12 series (IEC 60063) from the right value: a decade slip in four of ten, a near neighbour in four, anything up to 1000 : 1 else.</summary>
    private static int Steps(Random random)
    {
        var sign = random.Next(2) == 0 ? -1 : 1;
        return sign * random.Next(10) switch
        {
            < 3 => 12,
            3 => 24,
            < 8 => random.Next(2, 11),
            _ => random.Next(11, 37),
        };
    }
}
