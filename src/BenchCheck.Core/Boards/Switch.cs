using System.Collections.Immutable;
using BenchCheck.Core.Quantities;

namespace BenchCheck.Core.Boards;

/// <summary>A switch or relay contact, open or closed; a condition may set it otherwise.</summary>
public sealed record Switch(string Designator, ImmutableArray<string> Nodes, bool IsClosed) : Part(PartKind, Designator, Nodes)
{
    public static readonly PartKind PartKind = new("switch", ["1", "2"], "S");

    public const string Open = "open";
    public const string Closed = "closed";

    public override ImmutableArray<PartParameter> Parameters => [new(ParameterKind.Resistance, Jumper.UsualOhms)];

    public override void Describe(PartElements elements, string? setting)
    {
        if (setting is null ? IsClosed : setting == Closed) elements.Add(new Conductor(0, 1, Coefficient.Of(0)));
    }
}
