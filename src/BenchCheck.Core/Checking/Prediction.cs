using System.Collections.Immutable;
using BenchCheck.Core.Boards;
using BenchCheck.Core.Metering;

namespace BenchCheck.Core.Checking;

/// <summary>What a healthy board is expected to show, before any reading.</summary>
public sealed record Prediction
{
    public required string BoardTitle { get; init; }

    /// <summary>The node that voltages are counted against.</summary>
    public required string Reference { get; init; }

    public required ImmutableArray<PredictedNode> Nodes { get; init; }

    /// <summary>What small-signal conditions show: gains from their generator, resistances looking in.</summary>
    public required ImmutableArray<PredictedSignal> Signals { get; init; }

    /// <summary>The board as seen between the two nodes asked for, one a condition; empty when none were.</summary>
    public required ImmutableArray<LookingIn> LookingIn { get; init; }

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

/// <summary>A small-signal reading as it would be on a healthy board; a ratio bears its sign.</summary>
public sealed record PredictedSignal(
    string Condition, ReadingQuantity Quantity, string At, string? Against, double Value, double BandLow, double BandHigh, ImmutableArray<Influence> Influences)
{
    public string Words(string reference) => ReadingPlace.Words(Quantity, At, Against, reference);
}

/// <summary>The Thévenin equivalent of a board between two nodes, devices at the slopes of their state.</summary>
/// <param name="Volts">open voltage, without any meter; null in a small-signal condition</param>
/// <param name="Ohms">resistance looking in with the sources dead; its magnitude where a frequency is stated</param>
public sealed record LookingIn(string Condition, string At, string Against, double? Volts, double Ohms)
{
    /// <summary>Current through a wire between the two nodes, as the equivalent has it; devices may change state before that.</summary>
    public double? ShortAmperes => Ohms > 0 ? Volts / Ohms : null;
}
