using System.Collections.Immutable;
using BenchCheck.Core.Checking;
using BenchCheck.Core.Quantities;

namespace BenchCheck.Core.Batches;

/// <summary>What a batch keeps of one board: little enough that a shelf of them stays small.</summary>
/// <param name="Serial">which board; null when the file does not tell</param>
/// <param name="Verdict">null when the board could not be checked</param>
/// <param name="Suspect">kind and place of the likeliest fault; null when none was sought or found</param>
/// <param name="Failure">why the board could not be checked; null when it was</param>
public sealed record BoardOutcome(
    string? Serial, BoardVerdict? Verdict, string? Suspect, ImmutableArray<PlaceOutcome> Places, ImmutableArray<EstimateOutcome> Estimates, string? Failure = null)
{
    public static BoardOutcome Of(CheckResult result)
    {
        ArgumentNullException.ThrowIfNull(result);
        return new BoardOutcome(
            result.Serial, result.Verdict, result.Suspects is [var suspect, ..] ? SuspectName(suspect.Fault.Fault, suspect.Fault.Parts, suspect.Fault.Nodes) : null,
            [.. result.Readings.Select(PlaceOutcome.Of)],
            [.. result.Parameters.Where(IsOfBoard).Select(EstimateOutcome.Of)]);
    }

    public static BoardOutcome Failed(string? serial, string reason) => new(serial, null, null, [], [], reason);

    /// <summary>"open, R3".</summary>
    public static string SuspectName(string fault, IEnumerable<string> parts, IEnumerable<string> nodes) => string.Join(", ", new[] { fault }.Concat(parts).Concat(nodes));

    /// <summary>A scale error belongs to the meter and its range, not to the board.</summary>
    private static bool IsOfBoard(Estimate estimate) => estimate.Kind != Boards.ParameterKind.ScaleError;
}

/// <summary>One reading of a board: where, and how it came out.</summary>
public readonly record struct PlaceOutcome(string Place, ReadingVerdict Verdict)
{
    internal static PlaceOutcome Of(ReadingResult result)
    {
        var reading = result.Reading;
        var quantity = reading.Quantity == Metering.ReadingQuantity.Voltage ? "" : Metering.ReadingQuantities.Name(reading.Quantity) + " ";
        return new PlaceOutcome($"{quantity}{reading.At}{(reading.Against is null ? "" : "-" + reading.Against)} ({reading.Condition})", result.Verdict);
    }
}

/// <summary>One estimate of a board: "Q1 gain", its value and standard uncertainty in the unit.</summary>
public readonly record struct EstimateOutcome(string Name, Unit Unit, double Value, double StandardUncertainty)
{
    internal static EstimateOutcome Of(Estimate estimate) => new(
        BatchParameter.NameOf(estimate.Part, estimate.Kind, estimate.Condition), estimate.Kind.Unit, estimate.Value, estimate.StandardUncertainty);
}
