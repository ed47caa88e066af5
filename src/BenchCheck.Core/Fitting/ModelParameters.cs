using System.Collections.Immutable;
using BenchCheck.Core.Boards;
using BenchCheck.Core.Equations;
using BenchCheck.Core.Metering;
using BenchCheck.Core.Quantities;

namespace BenchCheck.Core.Fitting;

/// <summary>The parameters φ of a model in their order: the board's own, the meters' scale errors, what differs from condition to condition.</summary>
internal sealed class ModelParameters
{
    /// <summary>Standard deviation of the logarithm of a gain between conditions: an Early voltage of about 80 V over some volts.</summary>
    private const double GainDrift = 0.06;

    /// <summary>Standard deviation of a drop between conditions, volts.</summary>
    private const double DropDrift = 2.5e-3;

    private readonly List<FitParameter> all = [];

    private ModelParameters(Board board, ParameterTable table)
    {
        // What only small signals can tell is left out of boards that know none.
        var hasFrequency = board.Conditions.Any(c => c.Hertz is not null);
        var hasSmallSignal = board.Conditions.Any(c => c.IsSmallSignal);
        for (var i = 0; i < table.Count; i++)
        {
            var kind = table.Entries[i].Kind;
            if (kind.IsReactive ? !hasFrequency : kind.IsSmallSignal && !hasSmallSignal) continue;
            if (FitParameter.Of(table.Entries[i], i) is { } parameter) all.Add(parameter);
        }

        BoardCount = all.Count;
        Drifts = [];
        ScaleOfReading = [];
    }

    /// <summary>Only the board's own parameters.</summary>
    public static ModelParameters OfBoard(Board board, ParameterTable table, int readingCount) => new(board, table) { ScaleOfReading = [.. Enumerable.Repeat(-1, readingCount)] };

    /// <param name="hasScaleError">which readings carry the meter's scale error</param>
    public static ModelParameters OfReadings(Board board, ParameterTable table, IReadOnlyList<Probe> probes, IReadOnlyList<bool> hasScaleError)
    {
        var result = new ModelParameters(board, table) { ScaleOfReading = new int[probes.Count] };
        result.AddScaleErrors(probes, hasScaleError);
        string[] conditions = [.. probes.Where(p => p.Quantity != ReadingQuantity.Resistance).Select(p => p.Condition).Distinct(StringComparer.Ordinal)];
        if (conditions.Length > 1) result.Drifts = result.AddDrifts(board, table, conditions);
        return result;
    }

    /// <summary>A parameter that is a little different in one condition.</summary>
    public readonly record struct Drift(string Condition, int ThetaIndex, int Parameter, bool IsRatio);

    public IReadOnlyList<FitParameter> All => all;

    /// <summary>How many of them are the board's; they come first.</summary>
    public int BoardCount { get; }

    /// <summary>One a reading: position of its scale error, −1 for none.</summary>
    public int[] ScaleOfReading { get; private init; }

    public Drift[] Drifts { get; private set; }

    private void AddScaleErrors(IReadOnlyList<Probe> probes, IReadOnlyList<bool> hasScaleError)
    {
        var groups = new Dictionary<(string, ReadingQuantity, double), int>();
        for (var j = 0; j < probes.Count; j++)
        {
            ScaleOfReading[j] = -1;
            if (!hasScaleError[j] || probes[j].ScaleUncertainty == 0) continue;
            if (!groups.TryGetValue(probes[j].ScaleGroup, out var index))
            {
                groups[probes[j].ScaleGroup] = index = all.Count;
                all.Add(ScaleError(probes[j]));
            }

            ScaleOfReading[j] = index;
        }
    }

    /// <summary>
    /// What the transistor model leaves out when a board is read in several conditions: the gain and the drop of one transistor are not quite
    /// the same in each, because the collector voltage (Early effect) and the warmth differ. Common practice, no source.
    /// </summary>
    private Drift[] AddDrifts(Board board, ParameterTable table, string[] conditions)
    {
        var result = new List<Drift>();
        foreach (var part in board.Parts.OfType<Transistor>())
        {
            foreach (var condition in conditions)
            {
                for (var k = 0; k < 2; k++)
                {
                    var isRatio = part.Parameters[k].Kind == ParameterKind.Gain;
                    result.Add(new Drift(condition, table.IndexOf(part, k, condition), all.Count, isRatio));
                    all.Add(new FitParameter(
                        part.Designator, isRatio ? ParameterKind.GainDrift : ParameterKind.Offset, condition, Nominal.Exactly(0), -1, false, 0,
                        isRatio ? GainDrift : DropDrift));
                }
            }
        }

        return [.. result];
    }

    private static FitParameter ScaleError(Probe probe) => new(
        probe.ScaleGroupName, ParameterKind.ScaleError, null, Nominal.Within(0, Tolerance.Absolute(probe.Function.ReadingFraction)), -1, false, 0,
        probe.ScaleUncertainty);
}
