using System.Collections.Immutable;
using BenchCheck.Core.Boards;
using BenchCheck.Core.Equations;
using BenchCheck.Core.Fitting;
using BenchCheck.Core.Quantities;

namespace BenchCheck.Core.Batches;

/// <summary>A number of a board that a check estimates.</summary>
/// <param name="Name">"Q1 gain", "V2 voltage (bright)"</param>
/// <param name="Nominal">what the parts list says of it</param>
public sealed record BatchParameter(string Name, ParameterKind Kind, Nominal Nominal)
{
    /// <summary>Every number that checks of a board may estimate, in the order of its parts.</summary>
    public static ImmutableArray<BatchParameter> Of(Board board) =>
    [
        .. new ParameterTable(board).Entries.Where(e => e.Kind.IsReported && FitParameter.Of(e, 0) is not null)
            .Select(e => new BatchParameter(NameOf(e.Part.Designator, e.Kind, e.Condition), e.Kind, e.Nominal)),
    ];

    public static string NameOf(string part, ParameterKind kind, string? condition)
    {
        ArgumentNullException.ThrowIfNull(kind);
        return condition is null ? $"{part} {kind.Name}" : $"{part} {kind.Name} ({condition})";
    }
}
