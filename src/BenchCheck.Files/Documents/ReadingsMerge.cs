using System.Collections.Immutable;
using BenchCheck.Core.Metering;

namespace BenchCheck.Files;

/// <summary>Brings together two versions of a set of readings that began as one: each side's changes are kept.</summary>
/// <param name="Set">theirs with our changes laid over</param>
/// <param name="Contested">places that both sides changed, differently; ours stands in <paramref name="Set"/>, theirs in its note</param>
public sealed record ReadingsMerge(ReadingSet Set, ImmutableArray<Reading> Contested)
{
    public static ReadingsMerge Of(ReadingSet basis, ReadingSet ours, ReadingSet theirs)
    {
        ArgumentNullException.ThrowIfNull(basis);
        ArgumentNullException.ThrowIfNull(ours);
        ArgumentNullException.ThrowIfNull(theirs);
        var merged = theirs.Readings.ToList();
        var contested = ImmutableArray.CreateBuilder<Reading>();
        foreach (var reading in ours.Readings)
        {
            var before = Find(basis, reading);
            if (before is not null && IsSame(before, reading)) continue;
            var position = merged.FindIndex(reading.IsRepeatOf);
            if (position < 0)
            {
                merged.Add(reading);
                continue;
            }

            var there = merged[position];
            var isContested = !IsSame(there, reading) && (before is null || !IsSame(there, before));
            if (isContested) contested.Add(there);
            merged[position] = reading;
        }

        merged.RemoveAll(r => Find(ours, r) is null && Find(basis, r) is { } before && IsSame(before, r));
        return new ReadingsMerge(theirs with { Readings = [.. merged] }, contested.ToImmutable());
    }

    private static Reading? Find(ReadingSet set, Reading reading) => set.Readings.FirstOrDefault(reading.IsRepeatOf);

    private static bool IsSame(Reading a, Reading b) => a with { Lines = [], Time = null } == b with { Lines = [], Time = null };
}
