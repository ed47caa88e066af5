using System.Collections.Immutable;
using BenchCheck.Core.Boards;

namespace BenchCheck.Core.Metering;

/// <summary>What lies on the bench: the board and the meters it is measured with.</summary>
/// <param name="Meters">at least one; the first is meant where a reading names none</param>
/// <param name="Assumed">what the files did not say and was taken instead, one plain sentence each</param>
public sealed record Bench(Board Board, ImmutableArray<Meter> Meters, ImmutableArray<string> Assumed)
{
    public Meter MeterOf(Reading reading) =>
        reading.Meter is null ? Meters[0] : Meters.FirstOrDefault(m => m.Name == reading.Meter) ?? Meters[0];
}
