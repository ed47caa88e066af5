using System.Collections.Immutable;
using BenchCheck.Core.Boards;

namespace BenchCheck.Core.Checking;

/// <summary>What a healthy board is expected to show, before any reading.</summary>
public sealed record Prediction
{
    public required string BoardTitle { get; init; }

    public required ImmutableArray<PredictedNode> Nodes { get; init; }

    public required ImmutableArray<PredictedCurrent> Currents { get; init; }

    public required ImmutableArray<DeviceState> States { get; init; }

    public required ImmutableArray<Dissipation> Dissipation { get; init; }

    public required ImmutableArray<string> Cautions { get; init; }

    public required ImmutableArray<string> Assumed { get; init; }
}

/// <summary>What the first meter would show at a node against the reference, its loading included.</summary>
/// <param name="TheveninOhms">resistance looking into the node, devices at their slopes; what a meter loads</param>
/// <param name="Influences">parameters that move it most, largest share first</param>
public sealed record PredictedNode(
    string Condition, string Node, double Volts, double BandLow, double BandHigh, double TheveninOhms, ImmutableArray<Influence> Influences);

/// <summary>A current without any meter in it.</summary>
/// <param name="At">a part, from its first pin to its second, or a pin, into the part</param>
public sealed record PredictedCurrent(string Condition, string At, double Amperes);
