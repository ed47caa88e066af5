using System.Text;
using BenchCheck.Plots.Figures;

namespace BenchCheck.Plots.Reports;

/// <summary>The style sheet of the report: the page's own, and the pictures' colours on a dark screen.</summary>
internal static class ReportStyle
{
    private const string Sheet = "report.css";

    public static string Text()
    {
        using var stream = typeof(ReportStyle).Assembly.GetManifestResourceStream(Sheet)
            ?? throw new InvalidOperationException($"the assembly lacks its embedded resource {Sheet}");
        using var reader = new StreamReader(stream);
        var text = new StringBuilder(reader.ReadToEnd()).AppendLine("@media screen and (prefers-color-scheme: dark) {");
        foreach (var (onPaper, onDark) in Ink.OnDarkPages)
        {
            foreach (var property in new[] { "fill", "stroke" })
            {
                // The drawing library writes white by its name.
                var name = onPaper == Ink.Paper ? "white" : onPaper.ToStringRGB();
                text.AppendLine($"  figure [{property}=\"{name}\"] {{ {property}: {onDark.ToStringRGB()}; }}");
            }
        }

        return text.AppendLine("}").ToString();
    }
}
