using System.Collections.Immutable;
using System.Globalization;
using BenchCheck.Core.Boards;
using BenchCheck.Core.Equations;

namespace BenchCheck.Core.Checking;

/// <summary>States and power of a board's parts, as results name them.</summary>
internal static class OperatingReport
{
    public static IEnumerable<DeviceState> States(Board board, OperatingPoint point)
    {
        foreach (var part in board.Parts)
        {
            if (point.State(part) is not { } state) continue;
            var remark = part is Transistor q && state == "saturated"
                ? string.Create(CultureInfo.InvariantCulture, $"its ratio of currents, {point.CurrentRatio(q):G2}, is only a lower bound of its gain")
                : null;
            yield return new DeviceState(part.Designator, point.Condition.Name, state, remark);
        }
    }

    /// <summary>Each part in the condition in which it is hottest.</summary>
    public static ImmutableArray<Dissipation> Dissipation(Board board, OperatingPoint[] points) => points.Length == 0 ? [] :
    [
        .. board.Parts.Where(p => p is not (Supply or CurrentSource or Capacitor)).Select(part =>
        {
            var worst = points.MaxBy(p => p.Watts(part))!;
            return new Dissipation(part.Designator, worst.Condition.Name, worst.Watts(part), part.RatedWatts);
        }),
    ];
}
