using System.Globalization;
using System.Xml.Linq;
using BenchCheck.Core.Checking;
using BenchCheck.Core.Equations;

namespace BenchCheck.Plots.Reports;

/// <summary>How the numbers came about, and what was taken where the files do not say.</summary>
internal static class MethodSection
{
    public static XElement Of(Report report)
    {
        var settings = report.Settings;
        var confidence = string.Create(CultureInfo.InvariantCulture, $"{100 * settings.Confidence:0.##} %");
        return Html.Section(
            "Method and assumptions",
            Html.Of("p", $"Prediction: what the meter would show on a board of nominal parts, its loading included. {Law(settings.Law)}"),
            Html.Of("p", $"Band: {Bands(settings)}"),
            Html.Of("p", $"En: the difference over its expanded uncertainty at {confidence}, meter and tolerances together (ISO 13528). Within ±1 a reading is in; beyond the "
                + "limit that holds the risk over all readings together (Šidák) it is out; between the two it is doubtful."),
            Html.Of("p", $"Verdict of the board: χ² of the whole set and the largest single residual; at most {string.Create(CultureInfo.InvariantCulture, $"{100 * (1 - settings.Confidence):0.##} %")} "
                + "of healthy boards are called disagreeing."),
            Html.Of("p", "Estimates: weighted least squares over readings and tolerances (a tolerance ±t counts as a standard uncertainty t/√3, JCGM 100:2008, 4.3.7); intervals at "
                + $"{confidence}. The percent-of-reading part of a meter's accuracy is one scale error common to its range."),
            settings.FindFaults ? Html.Of("p", "Suspects: each fault is put into the board, which is fitted again; its probability is the evidence of that fit times the usual rate of such faults.")
                : Html.Of("p", "Faults were not searched for."),
            report.Result.Remarks.Select(r => Html.Of("p", Html.Class("doubtful"), Html.Text(r))),
            Html.Of("h3", "Taken where the files do not say"),
            report.Result.Assumed.IsEmpty ? Html.Of("p", "Nothing.") : Html.List(report.Result.Assumed));
    }

    private static string Law(JunctionLaw law) => law == JunctionLaw.ConstantDrop
        ? "A conducting junction drops the same voltage at any current."
        : "A conducting junction's voltage follows its current (Shockley).";

    private static string Bands(CheckSettings settings) => settings.Bands switch
    {
        BandMethod.MonteCarlo => string.Create(CultureInfo.InvariantCulture, $"Monte Carlo over the tolerances (JCGM 101:2008), {settings.Draws} draws, seed {settings.Seed}."),
        BandMethod.WorstCase => "worst case at the corners of the tolerances.",
        _ => "first-order propagation of the tolerances (JCGM 100:2008, 5.1.2).",
    };
}
