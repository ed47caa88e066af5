using System.Collections.Immutable;
using System.Globalization;
using BenchCheck.Core.Checking;
using BenchCheck.Core.Metering;
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
        bool Wanted(string name) => condition is null || name == condition;
        foreach (var group in prediction.Nodes.Where(n => Wanted(n.Condition)).GroupBy(n => n.Condition))
        {
            Layout.Heading(console, $"What the meter shows, {Printable.Text(group.Key)}");
            var nodes = Layout.Table("node", ">voltage", ">band", ">looking in");
            foreach (var n in group)
            {
                Layout.Row(nodes,
                    (n.Node, Style.Plain), (EngineeringNotation.Format(n.Volts, Unit.Volt), Style.Plain), (EngineeringNotation.Range(n.BandLow, n.BandHigh, Unit.Volt, 4), Style.Plain),
                    (EngineeringNotation.Format(n.TheveninOhms, Unit.Ohm, 3), Style.Plain));
            }

            console.Write(nodes);
            MovedBy(console, group.Select(n => (n.Node, n.Influences, Unit.Volt)));
            var currents = Layout.Table("current into", ">amperes");
            foreach (var c in prediction.Currents.Where(c => c.Condition == group.Key))
                Layout.Row(currents, (c.At, Style.Plain), (EngineeringNotation.Format(c.Amperes, Unit.Ampere), Style.Plain));
            console.WriteLine();
            console.Write(currents);
            foreach (var s in prediction.States.Where(s => s.Condition == group.Key))
                Layout.Entry(console, Printable.Text(s.Part), s.State + (s.Remark is null ? "" : $" ({s.Remark})"));
        }

        foreach (var group in prediction.Signals.Where(s => Wanted(s.Condition)).GroupBy(s => s.Condition))
        {
            Layout.Heading(console, $"Small signals, {Printable.Text(group.Key)}");
            var signals = Layout.Table("reading", ">value", ">band");
            foreach (var s in group)
            {
                var unit = s.Quantity.Unit();
                Layout.Row(signals,
                    (s.Words(prediction.Reference), Style.Plain), (EngineeringNotation.Format(s.Value, unit), Style.Plain), (EngineeringNotation.Range(s.BandLow, s.BandHigh, unit, 4), Style.Plain));
            }

            console.Write(signals);
            MovedBy(console, group.Where(s => s.Quantity == ReadingQuantity.Gain).Select(s => (s.Words(prediction.Reference), s.Influences, Unit.One)));
        }

        if (!prediction.LookingIn.IsEmpty)
        {
            var first = prediction.LookingIn[0];
            Layout.Heading(console, $"Looking in between {Printable.Text(first.At)} and {Printable.Text(first.Against)}");
            var table = Layout.Table("condition", ">open voltage", ">resistance", ">through a wire");
            foreach (var l in prediction.LookingIn.Where(l => Wanted(l.Condition)))
            {
                Layout.Row(table,
                    (l.Condition, Style.Plain), (l.Volts is { } volts ? EngineeringNotation.Format(volts, Unit.Volt) : "", Style.Plain), (EngineeringNotation.Format(l.Ohms, Unit.Ohm), Style.Plain),
                    (l.ShortAmperes is { } amperes ? EngineeringNotation.Format(amperes, Unit.Ampere, 3) : "", Style.Plain));
            }

            console.Write(table);
            Layout.Paragraph(console, "Devices at the slopes of their state, so the current through a wire holds as far as none of them changes it.");
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

    /// <summary>For each reading the parts that its band comes from, and what a small rise of each does to it.</summary>
    private static void MovedBy(IAnsiConsole console, IEnumerable<(string Name, ImmutableArray<Influence> Influences, Unit Unit)> readings)
    {
        var rows = readings.Where(r => !r.Influences.IsEmpty).ToArray();
        if (rows.Length == 0) return;
        Layout.Heading(console, "Moved most by: share of the band's variance, change for a rise of 1 % or 10 mV");
        var width = rows.Max(r => r.Name.Length);
        foreach (var (name, influences, unit) in rows)
        {
            Layout.Entry(console, name.PadRight(width), string.Join(", ", influences.Take(MostInfluences).Select(i => string.Create(
                CultureInfo.InvariantCulture, $"{i.Part} {i.Parameter} {100 * i.Share:0} % ({(i.PerUnit > 0 ? "+" : "")}{EngineeringNotation.Format(i.PerUnit, unit, 2)})"))));
        }
    }
}
