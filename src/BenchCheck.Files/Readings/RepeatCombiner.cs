using System.Collections.Immutable;
using BenchCheck.Core.Metering;

namespace BenchCheck.Files;

/// <summary>Collects the readings of one board; rows of the same reading become their mean.</summary>
/// <remarks>
/// Mean and type A uncertainty as <see cref="Repeats"/> has them. A stated uncertainty is taken as common to the repeats, so the largest one
/// stands.
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

        public void Add(Reading reading)
        {
            repeats ??= [first];
            repeats.Add(reading);
        }

        public Reading Combined()
        {
            if (repeats is null) return first;
            var together = Repeats.Pooled([.. repeats.Select(r => new Repeats(r.Repeats, r.Value, r.RepeatUncertainty * Math.Sqrt(r.Repeats)))]);
            var notes = repeats.Select(r => r.Note).OfType<string>().Distinct().ToList();
            return first with
            {
                Lines = [.. repeats.SelectMany(r => r.Lines)],
                Value = together.Mean,
                Repeats = together.Count,
                RepeatUncertainty = together.Uncertainty,
                StatedUncertainty = repeats.Max(r => r.StatedUncertainty),
                Time = repeats.Select(r => r.Time).FirstOrDefault(t => t is not null),
                Note = notes.Count == 0 ? null : string.Join("; ", notes),
            };
        }
    }
}
