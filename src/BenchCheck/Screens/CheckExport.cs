using System.Text;
using BenchCheck.Core.Checking;
using BenchCheck.Files;
using BenchCheck.Plots;
using BenchCheck.Plots.Reports;

namespace BenchCheck.Screens;

/// <summary>Writes a check to a file that does not exist yet, in the form that the file's ending names.</summary>
internal static class CheckExport
{
    public const string Endings = ".png or .svg (the plot), .html (a report to print), .csv (a row a reading), .json (everything)";

    /// <summary>Why nothing can be written under a name; null when it can be tried.</summary>
    public static string? Obstacle(string path)
    {
        if (string.IsNullOrWhiteSpace(path)) return "a file name is needed";
        if (Path.GetExtension(path).ToUpperInvariant() is not (".PNG" or ".SVG" or ".HTML" or ".CSV" or ".JSON")) return $"the name must end in {Endings}";
        return File.Exists(path) || Directory.Exists(path) ? "there is a file of that name already: choose another" : null;
    }

    /// <summary>Null, or why nothing was written. Pictures take a moment: not for the thread that draws.</summary>
    public static string? Write(Report report, string path)
    {
        try
        {
            switch (Path.GetExtension(path).ToUpperInvariant())
            {
                case ".PNG" or ".SVG":
                    return ReadingPlot.Of(report.Result).Save(path)?.Message;
                case ".HTML":
                    return HtmlReport.Save(report, path)?.Message;
                case ".JSON":
                    AtomicFile.Write(path, Encoding.UTF8.GetBytes(ResultJson.Indented(report.Result) + "\n"));
                    return null;
                default:
                    AtomicFile.Write(path, Encoding.UTF8.GetBytes(ComparisonCsv.Text(report.Result)));
                    return null;
            }
        }
        catch (Exception failure) when (Workbench.IsFileFailure(failure) || failure is ArgumentException)
        {
            return failure.Message;
        }
    }
}
