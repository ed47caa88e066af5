using System.Collections.Immutable;
using BenchCheck.Core.Metering;

namespace BenchCheck.Benchmarks.Scoreboard.Boards;

/// <summary>The designs that the scoreboard draws from.</summary>
public static class TruthBoards
{
    public static ImmutableArray<Bench> All { get; } =
        [.. AmplifierBoards.All, .. SwitchingBoards.All, .. PassiveBoards.All, ControllerBoard.Irrigation];
}
