using System.Globalization;
using BenchCheck.Core.Boards;
using BenchCheck.Core.Checking;
using BenchCheck.Core.Metering;
using BenchCheck.Core.Quantities;
using Spectre.Console;

namespace BenchCheck.Commands;

/// <summary>A check as tables that a person reads at a glance.</summary>
internal sealed class CheckTables(IAnsiConsole console, CheckResult result, bool showsAllEstimates)
{
    private const int MostNext = 4;
    private const int MostSuspects = 6;
    private const int MostPairs = 3;

    private static readonly Style Plain = Style.Plain;
    private static readonly Style Bad = new(Color.Red, decoration: Decoration.Bold);
    private static readonly Style Doubt = new(Color.Yellow);
    private static readonly Style Good = new(Color.Green);

    private bool HasConditions => result.Readings.Select(r => r.Reading.Condition).Distinct().Count() > 1;

    public void Write()
    {
        WriteVerdict();
        WriteReadings();
        WriteEstimates();
        WriteDevices();
        WriteSuspects();
        WriteNext();
        WriteClosing();
    }

    public void WriteNext()
    {
        Layout.Heading(console, "Next reading");
        if (result.Next.IsEmpty)
        {
            Layout.Paragraph(console, "  No further reading in the board's conditions would tell more.");
            return;
        }

        foreach (var next in result.Next.Take(MostNext))
        {
            var caution = next.Caution is null ? "" : $" [{next.Caution}]";
            Layout.Entry(console, next.Bits.ToString("0.00", CultureInfo.InvariantCulture) + " bits", next.Text + caution);
        }
    }

    private void WriteVerdict()
    {
        var (word, style) = result.Verdict switch
        {
            BoardVerdict.Agrees => ("AGREES", Good),
            BoardVerdict.Undecided => ("UNDECIDED", Doubt),
            _ => ("DISAGREES", Bad),
        };
        var serial = result.Serial is null ? "" : $", serial {result.Serial}";
        Layout.Paragraph(console, result.BoardTitle + serial, new Style(decoration: Decoration.Bold));
        Layout.Paragraph(console, $"{word}: {result.Reason}", style);
    }

    private void WriteReadings()
    {
        Layout.Heading(console, "Readings");
        string[] condition = HasConditions ? ["condition"] : [];
        var table = Layout.Table([.. condition, "at", ">measured", ">predicted", ">band", ">difference", ">En", "verdict", ">after fit"]);
        foreach (var r in result.Readings)
        {
            var unit = r.Reading.Quantity.Unit();
            var (word, style) = r.Verdict switch
            {
                ReadingVerdict.In => ("in", Plain),
                ReadingVerdict.Doubtful => ("doubtful ?", Doubt),
                _ => ("OUT !", Bad),
            };
            (string, Style)[] first = HasConditions ? [(r.Reading.Condition, Plain)] : [];
            Layout.Row(table,
            [
                .. first, (Place(r.Reading), style), (Number(r.Reading.Value, unit), style), (Number(r.Predicted, unit), Plain),
                (EngineeringNotation.Range(r.BandLow, r.BandHigh, unit, 4), Plain), (Signed(r.Difference, unit), Plain),
                (r.En.ToString("+0.0;-0.0;0.0", CultureInfo.InvariantCulture), style), (word, style), (Number(r.Fitted, unit), Plain),
            ]);
        }

        console.Write(table);
    }

    private void WriteEstimates()
    {
        var shown = result.Parameters.Where(e => showsAllEstimates || (e.Determined != Determination.No && e.Kind != ParameterKind.ScaleError)).ToArray();
        Layout.Heading(console, result.Verdict == BoardVerdict.Disagrees ? "Estimates, as if the board had no fault" : "Estimates");
        if (shown.Length == 0)
        {
            Layout.Paragraph(console, "  The readings determine no part beyond what the parts list says.");
        }
        else
        {
            var table = Layout.Table("part", "", ">parts list", ">estimate", ">interval", "determined");
            foreach (var e in shown)
            {
                var place = e.Condition is null ? e.Part : $"{e.Part} ({e.Condition})";
                Layout.Row(table,
                    (place, Plain), (e.Kind.Name, Plain), (Listed(e), Plain),
                    (EngineeringNotation.FormatWithUncertainty(e.Value, e.StandardUncertainty, e.Kind.Unit), Plain),
                    (EngineeringNotation.Range(e.Low, e.High, e.Kind.Unit), Plain),
                    (e.Determined switch { Determination.Yes => "yes", Determination.Partly => "partly", _ => "no" }, Plain));
            }

            console.Write(table);
        }

        foreach (var pair in result.Correlated.Where(c => c.First.Kind != ParameterKind.ScaleError && c.Second.Kind != ParameterKind.ScaleError).Take(MostPairs))
        {
            Layout.Entry(console, "·", string.Create(
                CultureInfo.InvariantCulture,
                $"{pair.First.Part} {pair.First.Kind} and {pair.Second.Part} {pair.Second.Kind} move together (correlation {pair.Correlation:0.00}): the readings tell one only with the other."));
        }
    }

    private void WriteDevices()
    {
        var hot = result.Dissipation.Where(d => d.IsOver).ToArray();
        if (result.States.IsEmpty && hot.Length == 0) return;
        Layout.Heading(console, "Devices");
        foreach (var group in result.States.GroupBy(s => s.Part))
        {
            var states = group.Select(s => (HasConditions ? $"{s.Condition}: " : "") + s.State + (s.Remark is null ? "" : $" ({s.Remark})"));
            Layout.Entry(console, group.Key, string.Join("; ", states));
        }

        foreach (var d in hot)
            Layout.Entry(console, d.Part, $"dissipates {Number(d.Watts, Unit.Watt)}, over its rating of {Number(d.RatedWatts!.Value, Unit.Watt)}", Bad);
    }

    private void WriteSuspects()
    {
        if (result.Suspects.IsEmpty) return;
        Layout.Heading(console, "Suspects");
        foreach (var suspect in result.Suspects.TakeWhile((s, i) => i < 2 || s.Probability > 0.02).Take(MostSuspects))
            Layout.Entry(console, Percent(suspect.Probability), suspect.Text);
    }

    private void WriteClosing()
    {
        if (!result.Assumed.IsEmpty)
        {
            Layout.Heading(console, "Assumed");
            foreach (var assumed in result.Assumed) Layout.Entry(console, "·", assumed);
        }

        foreach (var remark in result.Remarks) Layout.Paragraph(console, remark, Doubt);
        Layout.Heading(console, "Cautions");
        foreach (var caution in result.Cautions)
            Layout.Entry(console, "·", caution, caution.StartsWith("HAZARD", StringComparison.Ordinal) ? Bad : Plain);
    }

    private string Place(Reading reading) => reading.Words(result.Reference);

    private static string Listed(Estimate e) => double.IsNaN(e.Nominal) ? "?" : EngineeringNotation.Range(e.NominalLow, e.NominalHigh, e.Kind.Unit);

    private static string Number(double value, Unit unit) => EngineeringNotation.Format(value, unit);

    private static string Signed(double value, Unit unit) => (value >= 0 ? "+" : "") + EngineeringNotation.Format(value, unit, 3);

    private static string Percent(double probability) =>
        probability > 0.995 ? ">99 %" : Math.Round(100 * probability).ToString("0", CultureInfo.InvariantCulture) + " %";
}
