using System.Collections.Immutable;
using BenchCheck.Core.Boards;
using BenchCheck.Core.Diagnosis;

namespace BenchCheck.Benchmarks.Scoreboard.Faults;

/// <summary>How often each kind of fault is injected, before what a board can have is taken into account.</summary>
public sealed record FaultMix(string Name, double Healthy, double Twofold, Func<BoardOrigin, string, double> Weight)
{
    private static readonly ImmutableArray<string> Common = [FaultKind.Open, FaultKind.WrongValue];

    public static readonly ImmutableArray<string> Kinds =
    [
        FaultKind.Open, FaultKind.Shorted, FaultKind.WrongValue, FaultKind.HighResistanceJoint, FaultKind.Swapped, FaultKind.Bridge, FaultKind.Reversed,
        FaultKind.BaseEmitterShort, FaultKind.BaseEmitterOpen, FaultKind.CollectorEmitterShort, FaultKind.CollectorBaseShort, FaultKind.PinsExchanged,
        FaultKind.WrongType, FaultKind.GainFarOff, FaultKind.Leaky, FaultKind.SupplyMissing, FaultKind.SupplyWrong, FaultKind.SupplyReversed,
        FaultKind.SwitchPosition, FaultKind.ReadingError,
    ];

    /// <summary>Every kind alike, opens and wrong values twice as often: no kind is so rare that its statistics say nothing.</summary>
    public static FaultMix Even { get; } = new("even", 0.3, 0.08, (_, kind) => Common.Contains(kind) ? 2 : 1);

    /// <summary>By the rates that the program itself assumes: the mix on which its probabilities ought to be right.</summary>
    public static FaultMix Rates { get; } = new("rates", 0.3, 0.02, (origin, kind) => FaultRates.For(origin)[kind]);

    /// <summary>A kind that the board can have, with its places.</summary>
    public TruthFault[] Pick(Board board, Random random)
    {
        ArgumentNullException.ThrowIfNull(board);
        ArgumentNullException.ThrowIfNull(random);
        var places = Kinds.Select(kind => FaultPlaces.Of(board, kind)).ToArray();
        double[] weights = [.. Kinds.Select((kind, i) => places[i].Length == 0 ? 0 : Weight(board.Origin, kind))];
        var rest = random.NextDouble() * weights.Sum();
        var k = 0;
        while (k < weights.Length - 1 && (rest -= weights[k]) >= 0) k++;
        return places[k];
    }
}
