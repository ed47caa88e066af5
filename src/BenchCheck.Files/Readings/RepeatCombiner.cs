using System.Collections.Immutable;
using BenchCheck.Core.Metering;

namespace BenchCheck.Files;

/// <summary>Collects the readings of one board; rows of the same reading become their mean.</summary>
/// <remarks>
/// Type-A standard uncertainty of the mean of n repeats: s/√n, s their experimental standard deviation (JCGM 100:2008, 4.2.3), both by
/// Welford's running form (Technometrics 4 (1962)). A stated uncertainty is taken as common to the repeats, so the largest one stands.
/// </remarks>
internal sealed class RepeatCombiner
{
    private readonly Dictionary<(string, ReadingQuantity, string, string?, string?, double?), int> positions = [];
    private readonly List<Group> groups = [];

    public void Add(Reading reading)
    {
        var key = (reading.Condition, reading.Quantity, reading.At, reading.Against, reading.Meter, reading.Range);
        if (positions.TryGetValue(key, out var position))
        {
            groups[position].Add(reading);
            return;
        }

        positions[key] = groups.Count;
        groups.Add(new Group(reading));
    }

    public ImmutableArray<Reading> Readings() => [.. groups.Select(g => g.Combined())];

    private sealed class Group(Reading first)
    {
        private List<Reading>? repeats;
        private double mean = first.Value;
        private double squares;

        public void Add(Reading reading)
        {
            repeats ??= [first];
            repeats.Add(reading);
            var off = reading.Value - mean;
            mean += off / repeats.Count;
            squares += off * (reading.Value - mean);
        }

        public Reading Combined()
        {
            if (repeats is null) return first;
            var n = repeats.Count;
            var notes = repeats.Select(r => r.Note).OfType<string>().Distinct().ToList();
            return first with
            {
                Lines = [.. repeats.SelectMany(r => r.Lines)],
                Value = mean,
                Repeats = n,
                RepeatUncertainty = Math.Sqrt(squares / (n - 1) / n),
                StatedUncertainty = repeats.Max(r => r.StatedUncertainty),
                Time = repeats.Select(r => r.Time).FirstOrDefault(t => t is not null),
                Note = notes.Count == 0 ? null : string.Join("; ", notes),
            };
        }
    }
}
