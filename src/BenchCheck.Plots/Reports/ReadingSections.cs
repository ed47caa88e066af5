using System.Xml.Linq;
using BenchCheck.Core.Checking;
using BenchCheck.Core.Metering;
using BenchCheck.Core.Quantities;

namespace BenchCheck.Plots.Reports;

/// <summary>The comparison of readings and predictions, and what the other nodes should show.</summary>
internal static class ReadingSections
{
    public static IEnumerable<XElement> Of(CheckResult result)
    {
        yield return Html.Section("Readings", result.Readings.IsEmpty ? Html.Of("p", "There are no readings.") : Compared(result));
        if (!result.Unmeasured.IsEmpty) yield return Html.Section("Nodes without a reading", Unmeasured(result));
    }

    private static XElement Compared(CheckResult result)
    {
        var hasConditions = result.Readings.Select(r => r.Reading.Condition).Distinct().Skip(1).Any();
        string[] condition = hasConditions ? ["condition"] : [];
        return Html.Table(
            "Each reading beside what the parts list predicts; the band is what part tolerances allow, the meter apart",
            ["at", .. condition, "verdict", ">measured", ">predicted", ">band", ">difference", ">En", ">after the fit", ">residual"],
            result.Readings.Select(r =>
            {
                var unit = r.Reading.Quantity.Unit();
                object[] where = hasConditions ? [Html.Name(r.Reading.Condition)] : [];
                return (object[])
                [
                    Html.Name(r.Reading.Words(result.Reference)), .. where,
                    Html.Of("span", Html.Class(Words.Of(r.Verdict)), Html.MarkOf(Words.Of(r.Verdict)), Words.Of(r.Verdict)),
                    EngineeringNotation.FormatWithUncertainty(r.Reading.Value, r.StandardUncertainty, unit), Words.Value(r.Predicted, unit),
                    EngineeringNotation.Range(r.BandLow, r.BandHigh, unit, 4), Words.Signed(r.Difference, unit), Words.Ratio(r.En), Words.Value(r.Fitted, unit),
                    double.IsNaN(r.NormalisedResidual) ? "fitted exactly" : Words.Ratio(r.NormalisedResidual),
                ];
            }));
    }

    private static XElement Unmeasured(CheckResult result) => Html.Table(
        "What a meter would show where none was held",
        ["node", "condition", ">predicted", ">band", ">after the fit"],
        result.Unmeasured.Select(n => (object[])
        [
            Html.Name(n.Node), Html.Name(n.Condition), Words.Value(n.Predicted, Unit.Volt), EngineeringNotation.Range(n.BandLow, n.BandHigh, Unit.Volt, 4),
            Words.Value(n.Fitted, Unit.Volt),
        ]));
}
