using System.Globalization;
using BenchCheck.Core.Checking;
using BenchCheck.Core.Quantities;
using Spectre.Console;

namespace BenchCheck.Commands;

/// <summary>A prediction as tables.</summary>
internal static class PredictionTables
{
    private const int MostInfluences = 3;

    /// <param name="condition">only this condition; null for all</param>
    public static void Write(IAnsiConsole console, Prediction prediction, string? condition)
    {
        console.Write(new Text(Printable.Text(prediction.BoardTitle), new Style(decoration: Decoration.Bold)));
        console.WriteLine();
        foreach (var group in prediction.Nodes.Where(n => condition is null || n.Condition == condition).GroupBy(n => n.Condition))
        {
            Layout.Heading(console, $"What the meter shows, {Printable.Text(group.Key)}");
            var nodes = Layout.Table("node", ">voltage", ">band", ">looking in", "moved most by (share of the band's variance)");
            foreach (var n in group)
            {
                Layout.Row(nodes,
                    (n.Node, Style.Plain), (EngineeringNotation.Format(n.Volts, Unit.Volt), Style.Plain), (EngineeringNotation.Range(n.BandLow, n.BandHigh, Unit.Volt, 4), Style.Plain),
                    (EngineeringNotation.Format(n.TheveninOhms, Unit.Ohm, 3), Style.Plain),
                    (string.Join(", ", n.Influences.Take(MostInfluences).Select(i =>
                        string.Create(CultureInfo.InvariantCulture, $"{i.Part} {i.Parameter} {100 * i.Share:0} %"))), Style.Plain));
            }

            console.Write(nodes);
            var currents = Layout.Table("current into", ">amperes");
            foreach (var c in prediction.Currents.Where(c => c.Condition == group.Key))
                Layout.Row(currents, (c.At, Style.Plain), (EngineeringNotation.Format(c.Amperes, Unit.Ampere), Style.Plain));
            console.WriteLine();
            console.Write(currents);
            foreach (var s in prediction.States.Where(s => s.Condition == group.Key))
                Layout.Entry(console, Printable.Text(s.Part), s.State + (s.Remark is null ? "" : $" ({s.Remark})"));
        }

        Layout.Heading(console, "Power");
        var power = Layout.Table("part", ">dissipates", ">rating", "condition");
        foreach (var d in prediction.Dissipation.OrderByDescending(d => d.Watts))
        {
            Layout.Row(power,
                (d.Part, Style.Plain), (EngineeringNotation.Format(d.Watts, Unit.Watt, 3), Style.Plain),
                (d.RatedWatts is { } rated ? EngineeringNotation.Format(rated, Unit.Watt, 3) + (d.IsOver ? " OVER !" : "") : "", Style.Plain), (d.Condition, Style.Plain));
        }

        console.Write(power);
        if (!prediction.Assumed.IsEmpty)
        {
            Layout.Heading(console, "Assumed");
            foreach (var assumed in prediction.Assumed) Layout.Entry(console, "·", assumed);
        }

        Layout.Heading(console, "Cautions");
        foreach (var caution in prediction.Cautions) Layout.Entry(console, "·", caution);
    }
}
