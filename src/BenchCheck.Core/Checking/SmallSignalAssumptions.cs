using System.Collections.Immutable;
using BenchCheck.Core.Boards;
using BenchCheck.Core.Equations.SmallSignal;
using BenchCheck.Core.Metering;

namespace BenchCheck.Core.Checking;

/// <summary>What is taken for granted about small signals and ought to be said.</summary>
internal static class SmallSignalAssumptions
{
    /// <summary>How each capacitor and inductor is taken in conditions that state no frequency.</summary>
    public static IEnumerable<string> Of(Board board)
    {
        if (!board.Conditions.Any(c => c is { IsSmallSignal: true, Hertz: null })) yield break;
        var shorts = board.Parts.Where(p => p is Capacitor { Farads: { IsUnknown: false } c } && c.Value >= SmallSignalSolver.ShortFarads
            || p is Inductor { Henries: { IsUnknown: false } l } && l.Value < SmallSignalSolver.OpenHenries).Select(p => p.Designator).ToArray();
        var opens = board.Parts.Where(p => p is Capacitor or Inductor).Select(p => p.Designator).Except(shorts).ToArray();
        if (shorts.Length > 0) yield return $"No frequency stated for small signals: {string.Join(", ", shorts)} taken as {(shorts.Length == 1 ? "a short" : "shorts")} to them.";
        if (opens.Length > 0) yield return $"No frequency stated for small signals: {string.Join(", ", opens)} taken as open to them.";
    }

    /// <summary>The accuracy taken for ratios whose uncertainty the readings do not state.</summary>
    public static IEnumerable<string> Of(ImmutableArray<Reading> readings)
    {
        var isAssumed = readings.Any(r => r.StatedUncertainty is null
            && r.Quantity is ReadingQuantity.Gain or ReadingQuantity.CurrentGain or ReadingQuantity.InputResistance or ReadingQuantity.OutputResistance);
        if (isAssumed) yield return $"Gains and small-signal resistances without a stated uncertainty: {100 * MeterFunction.Ratio.ReadingFraction} % taken.";
    }
}
