using System.Text;
using BenchCheck.Core.Checking;
using BenchCheck.Files;

namespace BenchCheck.Screens;

/// <summary>Writes a check to a file that does not exist yet, in the form that the file's ending names.</summary>
internal static class ReadingsExport
{
    public const string Endings = ".csv (a row a reading, for spreadsheets) or .json (everything, for programs)";

    /// <summary>Null, or why nothing was written.</summary>
    public static string? Write(CheckResult result, string path)
    {
        if (string.IsNullOrWhiteSpace(path)) return "a file name is needed";
        string text;
        switch (Path.GetExtension(path).ToUpperInvariant())
        {
            case ".CSV":
                text = ComparisonCsv.Text(result);
                break;
            case ".JSON":
                text = ResultJson.Indented(result) + "\n";
                break;
            default:
                return $"the name must end in {Endings}";
        }

        try
        {
            if (File.Exists(path) || Directory.Exists(path)) return "there is a file of that name already: choose another";
            AtomicFile.Write(path, Encoding.UTF8.GetBytes(text));
            return null;
        }
        catch (Exception failure) when (Workbench.IsFileFailure(failure) || failure is ArgumentException)
        {
            return failure.Message;
        }
    }
}
