using System.Diagnostics;
using System.Globalization;

namespace BenchCheck.Records.Tests;

/// <summary>A process of its own that files records one by one and says each serial once it is acknowledged.</summary>
internal static class Writer
{
    public const string Verb = "file-records";

    public static int Run(string place, string name, int count)
    {
        using var log = BenchLog.Open(LogPlace.Parse(place));
        using var output = Console.OpenStandardOutput();
        for (var i = 0; i < count; i++)
        {
            var serial = string.Create(CultureInfo.InvariantCulture, $"{name}-{i:0000}");
            log.Append(Filings.Of(serial));
            output.Write(System.Text.Encoding.ASCII.GetBytes(serial + "\n"));
        }

        return 0;
    }

    public static Process Start(string place, string name, int count)
    {
        var start = new ProcessStartInfo("dotnet") { RedirectStandardOutput = true, RedirectStandardError = true };
        foreach (var argument in new[] { typeof(Writer).Assembly.Location, Verb, place, name, count.ToString(CultureInfo.InvariantCulture) }) start.ArgumentList.Add(argument);
        return Process.Start(start)!;
    }
}
