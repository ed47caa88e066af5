using BenchCheck.Core.Boards;
using BenchCheck.Core.Checking;
using BenchCheck.Core.Quantities;

namespace BenchCheck.Core.Diagnosis;

/// <summary>Gives a fitted fault its name, with the value found, the nearest preferred value and the slip that would explain it.</summary>
internal static class FaultNaming
{
    /// <summary>Tolerance of the part assumed to be there: preferred values are those of E24 (IEC 60063).</summary>
    private const double PreferredPercent = 5;

    /// <summary>How far the value found may lie from the one put in: the part's own tolerance and that of the parts it was found with.</summary>
    private const double ValueSpread = 0.08;

    /// <param name="free">the number that the fault leaves open; null for none</param>
    /// <param name="value">the value found for it</param>
    public static NamedFault Name(FaultName name, FreeNumber? free, double? value)
    {
        if (free is null || value is not { } found) return new NamedFault(name.Kind, name.Parts, name.Pins, name.Nodes, [], null, null, null, name.Text);
        var text = $"{name.Text}, about {EngineeringNotation.Format(found, free.Kind.Unit, 3)}";
        if (name.Kind != FaultKind.WrongValue || free.Kind != ParameterKind.Resistance || !(found > 0))
            return new NamedFault(name.Kind, name.Parts, name.Pins, name.Nodes, [], found, free.Kind.Unit, null, text);
        return new NamedFault(
            name.Kind, name.Parts, name.Pins, name.Nodes, [], found, free.Kind.Unit, PreferredSeries.ForTolerance(PreferredPercent).Nearest(found), text)
        {
            Slip = MarkingSlip.Explain(free.Nominal, found, ValueSpread),
        };
    }
}
