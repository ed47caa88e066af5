using System.Text;
using BenchCheck.Files;

namespace BenchCheck.Screens;

/// <summary>A first board file for a user to fill in; it can be checked as it is.</summary>
internal static class BoardTemplate
{
    private const string Parts = """
        reference = "GND"                  # voltages are counted against this node
        origin    = "new build"            # or "service"

        [parts]                            # one line a part; put yours in place of these
        V1 = { kind = "supply",   value = "12 V 1%", pins = { plus = "VCC", minus = "GND" } }
        R1 = { kind = "resistor", value = "10k 5%",  pins = ["VCC", "OUT"], rating = "0.25 W" }
        R2 = { kind = "resistor", value = "4k7 5%",  pins = ["OUT", "GND"], rating = "0.25 W" }

        [conditions.powered]

        [conditions.unpowered]             # for ohmmeter readings
        supplies = "removed"

        """;

    /// <summary>Writes the file; null, or why not.</summary>
    /// <param name="path">gets the ending .toml where it has none</param>
    public static string? Write(ref string path, string title)
    {
        if (path.Length == 0) return "a file name is needed";
        if (!path.EndsWith(".toml", StringComparison.OrdinalIgnoreCase)) path += ".toml";
        try
        {
            if (File.Exists(path) || Directory.Exists(path)) return "there is a file of that name already: choose another";
            AtomicFile.Write(path, Encoding.UTF8.GetBytes($"title     = {Quoted(title.Length == 0 ? Path.GetFileNameWithoutExtension(path) : title)}\n{Parts}"));
            return null;
        }
        catch (Exception failure) when (Workbench.IsFileFailure(failure) || failure is ArgumentException)
        {
            return failure.Message;
        }
    }

    /// <summary>A TOML basic string (TOML 1.0.0, "String").</summary>
    private static string Quoted(string text) =>
        "\"" + string.Concat(text.Where(c => !char.IsControl(c))).Replace("\\", "\\\\", StringComparison.Ordinal).Replace("\"", "\\\"", StringComparison.Ordinal) + "\"";
}
