using System.Globalization;
using BenchCheck.Core.Batches;
using BenchCheck.Core.Quantities;
using Spectre.Console;

namespace BenchCheck.Commands.Batch;

/// <summary>The summary of a batch as tables.</summary>
internal static class BatchTables
{
    private const int MostSuspects = 10;
    private const int MostOutliers = 10;

    public static void Write(IAnsiConsole console, string board, BatchSummary summary)
    {
        Layout.Paragraph(console, board, new Style(decoration: Decoration.Bold));
        var counts = Layout.Table(">boards", ">share", "");
        Count("agree", summary.Agreeing, new Style(Color.Green));
        Count("disagree", summary.Disagreeing, new Style(Color.Red));
        Count("undecided", summary.Undecided, new Style(Color.Yellow));
        Count("could not be checked", summary.Failed, new Style(Color.Red));
        Count("in all", summary.Boards, Style.Plain);
        console.Write(counts);

        if (!summary.Suspects.IsEmpty)
        {
            Layout.Heading(console, "Commonest suspects, likeliest of each board that does not agree");
            var table = Layout.Table(">boards", "fault");
            foreach (var (suspect, boards) in summary.Suspects.Take(MostSuspects)) Layout.Row(table, (Whole(boards), Style.Plain), (suspect, Style.Plain));
            console.Write(table);
        }

        Layout.Heading(console, "Readings out of tolerance");
        var places = Layout.Table("at", ">readings", ">out", ">share");
        foreach (var (place, readings, outside) in summary.Places)
            Layout.Row(places, (place, Style.Plain), (Whole(readings), Style.Plain), (Whole(outside), Style.Plain), (Share(outside, readings), Style.Plain));
        console.Write(places);
        WriteEstimates(console, summary);

        void Count(string label, int boards, Style style) => Layout.Row(counts, (Whole(boards), style), (Share(boards, summary.Boards), style), (label, style));
    }

    private static void WriteEstimates(IAnsiConsole console, BatchSummary summary)
    {
        if (summary.Estimates.IsEmpty) return;
        Layout.Heading(console, "Estimates over the boards that agree");
        var table = Layout.Table("parameter", ">boards", ">mean", ">spread", ">5 %", ">25 %", ">median", ">75 %", ">95 %", ">outliers");
        foreach (var (name, unit, d) in summary.Estimates)
        {
            Layout.Row(table,
            [
                (name, Style.Plain), (d.Count.ToString(CultureInfo.InvariantCulture), Style.Plain), (EngineeringNotation.Format(d.Mean, unit), Style.Plain),
                (double.IsNaN(d.Spread) ? "" : EngineeringNotation.Format(d.Spread, unit, 2), Style.Plain),
                .. d.Percentiles.Select(p => (EngineeringNotation.Format(p, unit), Style.Plain)), (Whole(d.Outliers.Length), Style.Plain),
            ]);
        }

        console.Write(table);
        foreach (var (name, unit, d) in summary.Estimates)
        {
            if (d.Outliers.IsEmpty) continue;
            var named = d.Outliers.Take(MostOutliers).Select(o => $"{o.Serial ?? "no serial"} {EngineeringNotation.Format(o.Value, unit)}");
            Layout.Entry(console, name, "far from the others: " + string.Join(", ", named) + (d.Outliers.Length > MostOutliers ? ", …" : ""));
        }

        if (summary.Estimates.Any(e => e.Distribution.IsSampled))
            Layout.Paragraph(console, $"Percentiles and outliers come from {DistributionBuilder.MostKept} boards drawn at random; mean and spread from all.");
    }

    private static string Whole(int number) => number.ToString(CultureInfo.InvariantCulture);

    private static string Share(int part, int whole) => whole == 0 ? "" : string.Create(CultureInfo.InvariantCulture, $"{100.0 * part / whole:0.0} %");
}
