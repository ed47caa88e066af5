using BenchCheck.Core.Boards;
using BenchCheck.Core.Checking;
using BenchCheck.Core.Quantities;

namespace BenchCheck.Core.Diagnosis;

/// <summary>Gives a fitted fault its name, with the value found, the nearest preferred value and the slip that would explain it.</summary>
internal static class FaultNaming
{
    public static NamedFault Name(FaultName name, FreeNumber? free, double? value)
    {
        double? nearest = null;
        var text = name.Text;
        if (free is not null && value is { } found)
        {
            text += $", about {EngineeringNotation.Format(found, free.Kind.Unit)}";
        }

        return new NamedFault(name.Kind, name.Parts, name.Pins, name.Nodes, [], value, free?.Kind.Unit, nearest, text);
    }
}
