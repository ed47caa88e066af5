using BenchCheck.Core.Boards;
using BenchCheck.Core.Checking;
using BenchCheck.Core.Metering;

namespace BenchCheck.Screens;

/// <summary>Where the lead is: a condition, a quantity, a node against another, or a part or pin.</summary>
internal sealed record Place(string Condition, ReadingQuantity Quantity, string At, string? Against)
{
    public static Place Of(Reading reading, Board board) => Make(board, reading.Condition, reading.Quantity, reading.At, reading.Against);

    public static Place Of(NextReading next, Board board) => Make(board, next.Condition, next.Quantity, next.At, next.Against);

    /// <summary>"C1", "C1 to E1", "R3 current", "B1 resistance".</summary>
    public string Name(Board board)
    {
        var where = Against is null || Against == board.Reference ? At : $"{At} to {Against}";
        return Quantity switch
        {
            ReadingQuantity.Voltage => where,
            ReadingQuantity.Resistance when board.FindCondition(Condition) is { SuppliesRemoved: true } => where,
            _ => $"{where} {Quantity.Name()}",
        };
    }

    /// <summary>The same for a narrow column: "C1/IN", "IN R in".</summary>
    public string ShortName(Board board) => Quantity switch
    {
        ReadingQuantity.Gain => $"{At}/{Against}",
        ReadingQuantity.InputResistance => $"{At} R in",
        ReadingQuantity.OutputResistance => $"{At} R out",
        _ => Name(board),
    };

    private static Place Make(Board board, string condition, ReadingQuantity quantity, string at, string? against) =>
        new(condition, quantity, at, against ?? (quantity is ReadingQuantity.Current or ReadingQuantity.CurrentGain ? null : board.Reference));
}
