using System.Collections.Immutable;
using BenchCheck.Benchmarks.Scoreboard.Faults;
using BenchCheck.Benchmarks.Scoreboard.Physics;
using BenchCheck.Core.Metering;

namespace BenchCheck.Benchmarks.Scoreboard.Cases;

/// <summary>Readings of a board together with what is true of it: all that scoring needs, wherever the case came from.</summary>
/// <param name="Name">what repeats it: a seed, or the name of its folder</param>
/// <param name="Faults">what was put wrong; rows of reading errors count from zero</param>
/// <param name="Values">true resistances and supply voltages, by designator and the condition that sets them (empty for none)</param>
/// <param name="Gains">true gains I_C/I_B of the transistors that are active</param>
public sealed record KnownCase(
    string Name, Bench Bench, ReadingSet Readings, ImmutableArray<TruthFault> Faults, double Visibility,
    ImmutableDictionary<(string Part, string Condition), double> Values, ImmutableDictionary<string, double> Gains)
{
    public bool IsHealthy => Faults.IsEmpty;

    public static KnownCase Of(TruthCase truth)
    {
        ArgumentNullException.ThrowIfNull(truth);
        var values = ImmutableDictionary.CreateBuilder<(string, string), double>();
        foreach (var part in truth.Faulty.Parts.Where(p => truth.Bench.Board.Find(p.Designator) is not null))
        {
            if (part is PhysicalResistor r) values[(r.Designator, "")] = r.Ohms;
            if (part is PhysicalPotentiometer p) values[(p.Designator, "")] = p.Ohms;
            if (part is not PhysicalSource source) continue;
            values[(source.Designator, "")] = source.Volts;
            foreach (var (condition, volts) in source.Set) values[(source.Designator, condition)] = volts;
        }

        return new KnownCase(
            truth.Seed.ToString(System.Globalization.CultureInfo.InvariantCulture), truth.Bench, truth.Readings, truth.Faults, truth.Visibility,
            values.ToImmutable(), truth.Gains);
    }
}
