using System.Collections.Immutable;
using System.Globalization;
using BenchCheck.Core.Checking;
using BenchCheck.Core.Quantities;
using BenchCheck.Core.Fitting;

namespace BenchCheck.Core.Diagnosis;

/// <summary>Turns groups of faults into suspects: names, evidence, plain sentences.</summary>
internal sealed class SuspectWords(CheckResult check, ReadingPlan plan)
{
    private const int MostAlike = 12;

    public Suspect Suspect(FaultGroup group)
    {
        var names = group.Members
            .SelectMany(m => m.Fault.Named.Select((n, i) => (Name: n, Weight: m.Probability * Math.Exp(m.Fault.LogRates[i] - m.Fault.LogRates.Max()))))
            .OrderByDescending(x => x.Weight).Select(x => x.Name).ToArray();
        var leader = group.Leader;
        var degrees = Math.Max(1, plan.Measured.Length - (leader.WrongReading >= 0 ? 1 : 0));
        var pValue = ChiSquaredTest.PValue(leader.Evidence.ChiSquared, degrees);
        return new Suspect(group.Probability, names[0], leader.Evidence.ChiSquared, pValue, Sentence(names, leader, degrees), [.. names.Skip(1).Take(MostAlike)])
        {
            Explained = [.. leader.Explained],
        };
    }

    private string Sentence(NamedFault[] names, Fault leader, int degrees)
    {
        var what = names[0].Text;
        if (names.Length > 1)
        {
            var others = names.Skip(1).Take(3).Select(n => n.Text);
            var more = names.Length > 4 ? $" or {names.Length - 4} more" : "";
            what += $"; or {string.Join(", or ", others)}{more}: the readings look the same";
        }

        if (names[0].Fault is FaultKind.None or FaultKind.Unexplained) return $"{Capital(what)}.";
        var repaired = check.Readings
            .Where((r, i) => i != leader.WrongReading && Math.Abs(r.En) > 1 && Math.Abs(r.Reading.Value - leader.Explained[i]) < 3 * r.StandardUncertainty)
            .Select(r => r.Reading.At).Distinct().ToArray();
        var repairs = repaired.Length == 0 ? "" : $" It explains {string.Join(", ", repaired.Take(5))}{(repaired.Length > 5 ? " and others" : "")}.";
        var nearest = names[0].NearestPreferred is { } preferred
            ? $" Nearest preferred value {EngineeringNotation.Format(preferred, names[0].Unit ?? Unit.Ohm, 2)}{(names[0].Slip is { } slip ? $": {slip}" : "")}."
            : "";
        return string.Create(
            CultureInfo.InvariantCulture,
            $"{Capital(what)}.{nearest}{repairs} Chi-squared falls from {check.ChiSquared:G3} to {leader.Evidence.ChiSquared:G3} ({degrees} readings).");
    }

    private static string Capital(string text) => text.Length == 0 ? text : char.ToUpperInvariant(text[0]) + text[1..];
}
