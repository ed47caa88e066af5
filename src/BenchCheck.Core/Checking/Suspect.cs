using System.Collections.Immutable;
using BenchCheck.Core.Quantities;

namespace BenchCheck.Core.Checking;

/// <summary>A group of faults that the readings cannot separate: the likeliest in full, the others that look alike behind it.</summary>
/// <param name="Probability">of the whole group, given the readings</param>
/// <param name="Fault">the likeliest member</param>
/// <param name="ChiSquared">of the readings after the refit with this fault</param>
/// <param name="PValue">of that chi-squared</param>
/// <param name="Text">the fault and its evidence as a plain sentence</param>
/// <param name="Alike">the other members, likeliest first</param>
public sealed record Suspect(
    double Probability, NamedFault Fault, double ChiSquared, double PValue, string Text, ImmutableArray<NamedFault> Alike)
{
    /// <summary>What each reading of the check would be with this fault, in the order of the readings.</summary>
    public ImmutableArray<double> Explained { get; init; } = [];
}

/// <summary>One fault by its name and place.</summary>
/// <param name="Fault">kind, in the words of the result file: "open", "wrong value", "high-resistance joint", …</param>
/// <param name="Value">the value found or put in (ohms, volts, gain), when the fault has one</param>
/// <param name="Text">short plain words: "R3 open"</param>
public sealed record NamedFault(
    string Fault, ImmutableArray<string> Parts, ImmutableArray<string> Pins, ImmutableArray<string> Nodes, ImmutableArray<int> Lines,
    double? Value, Unit? Unit, double? NearestPreferred, string Text)
{
    /// <summary>The second fault where two are needed to explain the readings.</summary>
    public NamedFault? With { get; init; }

    /// <summary>What slip would have put that value there, in plain words; null when none is known.</summary>
    public string? Slip { get; init; }
}
