using System.Collections.Immutable;
using BenchCheck.Core.Quantities;

namespace BenchCheck.Core.Boards;

/// <summary>A potentiometer: position · ohms from low to wiper, the rest from wiper to high.</summary>
/// <param name="Position">0 with the wiper at the low end, 1 at the high end</param>
public sealed record Potentiometer(string Designator, ImmutableArray<string> Nodes, Nominal Ohms, Nominal Position)
    : Part(PartKind, Designator, Nodes)
{
    public static readonly PartKind PartKind = new("potentiometer", ["low", "wiper", "high"], "R");

    public override ImmutableArray<PartParameter> Parameters =>
        [new(ParameterKind.Resistance, Ohms), new(ParameterKind.Position, Position)];

    public override void Describe(PartElements elements, string? setting)
    {
        elements.Add(new Conductor(0, 1, Coefficient.Share(0, 1)));
        elements.Add(new Conductor(1, 2, Coefficient.Rest(0, 1)));
    }
}
