using System.Globalization;
using System.Xml.Linq;
using BenchCheck.Core.Checking;
using BenchCheck.Core.Quantities;

namespace BenchCheck.Plots.Reports;

/// <summary>What the parts really are, how the devices work, what gets hot.</summary>
internal static class EstimateSections
{
    private const int MostPairs = 20;

    public static IEnumerable<XElement> Of(CheckResult result)
    {
        yield return Html.Section(
            result.Verdict == BoardVerdict.Disagrees ? "Estimates, as if the board had no fault" : "Estimates",
            result.Parameters.IsEmpty ? Html.Of("p", "There are no estimates.") : Estimates(result), Pairs(result));
        if (!result.States.IsEmpty) yield return Html.Section("Devices", States(result));
        if (!result.Dissipation.IsEmpty) yield return Html.Section("Power", Power(result));
    }

    private static XElement Estimates(CheckResult result) => Html.Table(
        "Readings and tolerances together; ± is one standard uncertainty",
        ["part and parameter", ">parts list", ">estimate", ">coverage interval", "determined by the readings"],
        result.Parameters.Select(e => (object[])
        [
            Html.Name(Words.Name(e)), Limits.Of(e).Text(e.Kind.Unit), EngineeringNotation.FormatWithUncertainty(e.Value, e.StandardUncertainty, e.Kind.Unit),
            EngineeringNotation.Range(e.Low, e.High, e.Kind.Unit), Words.Of(e.Determined),
        ]));

    private static IEnumerable<XElement> Pairs(CheckResult result)
    {
        if (result.Correlated.IsEmpty) yield break;
        yield return Html.Of("h3", "Estimates that move together");
        yield return Html.Of("p", "The readings tell one of each pair only with the other.");
        yield return Html.List(result.Correlated.Take(MostPairs).Select(p =>
            string.Create(CultureInfo.InvariantCulture, $"{Words.Name(p.First)} and {Words.Name(p.Second)}: correlation {p.Correlation:0.00}")));
        if (result.Correlated.Length > MostPairs)
            yield return Html.Of("p", string.Create(CultureInfo.InvariantCulture, $"{result.Correlated.Length - MostPairs} weaker pairs are not listed."));
    }

    private static XElement States(CheckResult result) => Html.Table(
        "Operating state of each device", ["part", "condition", "state"],
        result.States.Select(s => (object[])[Html.Name(s.Part), Html.Name(s.Condition), Html.Text(s.State + (s.Remark is null ? "" : $" ({s.Remark})"))]));

    private static XElement Power(CheckResult result) => Html.Table(
        "Power turned into heat, in the condition in which it is greatest", ["part", "condition", ">power", ">rating", "verdict"],
        result.Dissipation.Select(d => (object[])
        [
            Html.Name(d.Part), Html.Name(d.Condition), EngineeringNotation.Format(d.Watts, Unit.Watt, 3),
            d.RatedWatts is { } rated ? EngineeringNotation.Format(rated, Unit.Watt, 3) : "not stated",
            d.IsOver ? Html.Of("span", Html.Class("out"), Html.MarkOf("out"), "over its rating") : d.RatedWatts is null ? "" : "within",
        ]));
}
