using System.Globalization;
using System.Xml.Linq;
using BenchCheck.Core.Checking;
using BenchCheck.Core.Metering;
using BenchCheck.Core.Quantities;

namespace BenchCheck.Plots.Reports;

/// <summary>What is probably wrong, and which reading would tell.</summary>
internal static class FaultSections
{
    /// <summary>Faults that look alike which the sentence of a suspect names itself.</summary>
    private const int AlikeInText = 3;

    public static IEnumerable<XElement> Of(CheckResult result)
    {
        if (!result.Suspects.IsEmpty)
            yield return Html.Section("Suspects", Html.Of("ol", result.Suspects.Select(Suspect)));
        if (!result.Next.IsEmpty)
        {
            yield return Html.Section(
                "Next readings", Html.Of("p", "Readings not yet taken, those that would tell most first. Heed the cautions above."),
                Html.Of("ol", result.Next.Select(n => Next(n, result))));
        }
    }

    private static XElement Suspect(Suspect suspect) => Html.Of("li",
        Html.Of("span", Html.Class("chance"), Percent(suspect.Probability)), " " + Html.Text(suspect.Text),
        suspect.Alike.Length <= AlikeInText ? null : Html.Of("p", Html.Class("small"), "All that look the same from here: " + string.Join("; ", suspect.Alike.Select(a => Html.Text(a.Text))) + "."));

    private static XElement Next(NextReading next, CheckResult result) => Html.Of("li",
        Html.Of("span", Html.Class("chance"), string.Create(CultureInfo.InvariantCulture, $"{next.Bits:0.00} bits")), " " + Html.Text(next.Text),
        next.Caution is { } caution ? Html.Of("p", Html.Class("small doubtful"), Html.Text(caution)) : null,
        next.Expect.Length < 2 ? null : Html.Of("p", Html.Class("small"), "It would show: " + string.Join("; ", next.Expect.Select(e => Expected(e, next, result))) + "."));

    private static string Expected(Expectation expected, NextReading next, CheckResult result)
    {
        var value = EngineeringNotation.FormatWithUncertainty(expected.Value, expected.StandardUncertainty, next.Quantity.Unit());
        var suspect = expected.Suspect >= 0 && expected.Suspect < result.Suspects.Length ? Html.Text(result.Suspects[expected.Suspect].Fault.Text) : "another suspect";
        return $"{value} with {suspect}";
    }

    private static string Percent(double probability) => probability switch
    {
        > 0 and < 0.01 => "under 1 %",
        < 1 and > 0.99 => "over 99 %",
        _ => string.Create(CultureInfo.InvariantCulture, $"{100 * probability:0} %"),
    };
}
