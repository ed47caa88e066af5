using System.Globalization;
using BenchCheck.Core.Batches;
using BenchCheck.Core.Quantities;
using Spectre.Console;

namespace BenchCheck.Commands.Batch;

/// <summary>What a lot has in common, as a table.</summary>
internal static class LotTable
{
    public static void Write(IAnsiConsole console, Lot lot)
    {
        Layout.Heading(console, string.Create(CultureInfo.InvariantCulture, $"The lot, from {lot.Boards} boards that agree"));
        var table = Layout.Table("parameter", ">parts list", ">mean of the lot", ">spread of the lot", ">u of a board alone", ">u with the lot");
        foreach (var p in lot.Parameters)
        {
            var (fitted, unit) = (p.Parameter, p.Parameter.Kind.Unit);
            string Spread(double deviation) => EngineeringNotation.Format(p.Scaled(deviation), unit, 2);
            Layout.Row(table,
                (BatchParameter.NameOf(fitted.Owner, fitted.Kind, fitted.Condition), Style.Plain),
                (fitted.IsUnknown ? "?" : EngineeringNotation.Range(fitted.Nominal.Low, fitted.Nominal.High, unit, 4), Style.Plain),
                (EngineeringNotation.FormatWithUncertainty(p.Value, p.Scaled(p.MeanUncertainty), unit), Style.Plain),
                (Spread(p.Spread), Style.Plain), (Spread(p.Alone), Style.Plain), (Spread(p.Together), Style.Plain));
        }

        console.Write(table);
        Layout.Paragraph(
            console, "u: standard uncertainty of one board's estimate, with the parts list's tolerance behind it and with the lot's spread. What the readings tell "
            + "of two parameters only together, the lot tells no better.");
    }
}
