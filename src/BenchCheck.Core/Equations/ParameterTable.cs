using System.Collections.Immutable;
using BenchCheck.Core.Boards;
using BenchCheck.Core.Quantities;

namespace BenchCheck.Core.Equations;

/// <summary>One entry of the parameter vector θ: a number of a part, or of a part in one condition that sets it.</summary>
public sealed record BoardParameter(Part Part, ParameterKind Kind, Nominal Nominal, string? Condition);

/// <summary>The parameter vector θ of a board, in SI units: every number of every part, then the values that conditions set.</summary>
/// <remarks>A supply that a condition sets has one entry for that condition and keeps its plain entry for the others.</remarks>
public sealed class ParameterTable
{
    private readonly Dictionary<string, int> firstOfPart = new(StringComparer.Ordinal);
    private readonly Dictionary<(string Condition, string Part), int> setByCondition = [];

    public ParameterTable(Board board)
    {
        ArgumentNullException.ThrowIfNull(board);
        var entries = ImmutableArray.CreateBuilder<BoardParameter>();
        foreach (var part in board.Parts)
        {
            firstOfPart[part.Designator] = entries.Count;
            foreach (var parameter in part.Parameters) entries.Add(new BoardParameter(part, parameter.Kind, parameter.Nominal, null));
        }

        foreach (var condition in board.Conditions)
        {
            foreach (var (designator, nominal) in condition.Set.OrderBy(s => s.Key, StringComparer.Ordinal))
            {
                var part = board.Find(designator);
                if (part is null || part.Parameters.IsEmpty) continue;
                setByCondition[(condition.Name, designator)] = entries.Count;
                entries.Add(new BoardParameter(part, part.Parameters[0].Kind, nominal, condition.Name));
            }
        }

        Entries = entries.ToImmutable();
    }

    public ImmutableArray<BoardParameter> Entries { get; }

    public int Count => Entries.Length;

    /// <summary>Position in θ of a part's parameter in a condition; the first parameter is the one that a condition may set.</summary>
    public int IndexOf(Part part, int parameter, string condition)
    {
        ArgumentNullException.ThrowIfNull(part);
        return parameter == 0 && setByCondition.TryGetValue((condition, part.Designator), out var index)
            ? index
            : firstOfPart[part.Designator] + parameter;
    }
}
