using System.Collections.Immutable;
using System.Globalization;
using BenchCheck.Core.Boards;

namespace BenchCheck.Core.Diagnosis;

/// <summary>How often each kind of fault is met on the boards that come to the bench, before any reading.</summary>
/// <remarks>Relative rates; they need not add up to anything. Invariant: every kind of <see cref="FaultKind"/> has a rate of zero or more.</remarks>
public sealed class FaultRates
{
    private readonly ImmutableDictionary<string, double> rates;

    private FaultRates(ImmutableDictionary<string, double> rates) => this.rates = rates;

    /// <summary>Rate of a kind.</summary>
    public double this[string kind] => rates.GetValueOrDefault(kind);

    /// <summary>The rates of the data file that comes with the program: common practice, no source.</summary>
    public static FaultRates For(BoardOrigin origin) => origin == BoardOrigin.Service ? Service : NewBuild;

    /// <summary>Reads rates from lines "kind,new build,service"; a kind that is left out keeps its usual rate.</summary>
    /// <exception cref="FormatException">a line is not of that form; the message says which and what was expected</exception>
    public static FaultRates Parse(string text, BoardOrigin origin, FaultRates? usual = null)
    {
        ArgumentNullException.ThrowIfNull(text);
        var builder = (usual?.rates ?? ImmutableDictionary<string, double>.Empty).ToBuilder();
        var column = origin == BoardOrigin.Service ? 2 : 1;
        var lines = text.Split('\n');
        for (var i = 0; i < lines.Length; i++)
        {
            var line = lines[i].Trim();
            if (line.Length == 0 || line[0] == '#' || line.StartsWith("kind,", StringComparison.Ordinal)) continue;
            var cells = line.Split(',');
            if (cells.Length != 3 || !double.TryParse(cells[column], NumberStyles.Float, CultureInfo.InvariantCulture, out var rate) || !(rate >= 0) || rate > 1e9)
                throw new FormatException($"line {i + 1}: expected \"kind,new build,service\" with two rates of zero or more, read \"{line}\"");
            if (usual is not null && !usual.rates.ContainsKey(cells[0].Trim()))
                throw new FormatException($"line {i + 1}: \"{cells[0].Trim()}\" is no kind of fault");
            builder[cells[0].Trim()] = rate;
        }

        return new FaultRates(builder.ToImmutable());
    }

    private static FaultRates NewBuild { get; } = Shipped(BoardOrigin.NewBuild);

    private static FaultRates Service { get; } = Shipped(BoardOrigin.Service);

    private static FaultRates Shipped(BoardOrigin origin)
    {
        using var stream = typeof(FaultRates).Assembly.GetManifestResourceStream("fault-rates.csv")!;
        using var reader = new StreamReader(stream);
        return Parse(reader.ReadToEnd(), origin);
    }
}
