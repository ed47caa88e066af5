using System.Collections.Immutable;

namespace BenchCheck.Records;

/// <summary>What came of verifying a log.</summary>
/// <param name="Count">records read</param>
/// <param name="Newest">hash of the newest record; 64 zeros when there is none. Noted elsewhere, it shows later that no newer record was cut off.</param>
/// <param name="Faults">what is not as it was filed, one plain sentence each; empty for a log that is whole</param>
/// <param name="HoldsKnown">whether the hash asked for is among the records; true when none was asked for</param>
public sealed record ChainReport(long Count, string Newest, ImmutableArray<string> Faults, bool HoldsKnown)
{
    private const int MostFaults = 50;

    public bool IsWhole => Faults.IsEmpty && HoldsKnown;

    /// <summary>Reads every record and every file and recomputes every hash.</summary>
    /// <param name="known">a hash noted before that has to be there; null for none</param>
    public static ChainReport Of(BenchLog log, string? known = null)
    {
        ArgumentNullException.ThrowIfNull(log);
        var faults = new List<string>();
        var checkedFiles = new HashSet<string>(StringComparer.Ordinal);
        var (count, previous, number) = (0L, ChainHash.Start, 0L);
        var holdsKnown = known is null;
        try
        {
            foreach (var record in log.Records(LogQuery.All))
            {
                count++;
                number++;
                if (record.Entry.Number != number) Fault($"record {number} is missing: record {record.Entry.Number} follows record {number - 1}");
                number = record.Entry.Number;
                if (record.Previous != previous) Fault($"record {number} does not follow on the record before it");
                if (ChainHash.Of(record) != record.Entry.Hash) Fault($"record {number} is not as it was filed");
                foreach (var file in record.Files)
                {
                    if (!checkedFiles.Add(file)) continue;
                    if (log.Input(file) is not { } body) Fault($"a file of record {number} is missing");
                    else if (ChainHash.Of(body) != file) Fault($"a file of record {number} is not as it was filed");
                }

                previous = record.Entry.Hash;
                holdsKnown |= string.Equals(previous, known, StringComparison.OrdinalIgnoreCase);
            }
        }
        catch (BenchLogException damage)
        {
            faults.Add($"after record {number}: {damage.Message}");
        }

        return new ChainReport(count, previous, [.. faults], holdsKnown);

        void Fault(string text)
        {
            if (faults.Count < MostFaults) faults.Add(text);
        }
    }
}
