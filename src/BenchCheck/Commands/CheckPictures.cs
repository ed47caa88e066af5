using System.CommandLine;
using BenchCheck.Commands.Log;
using BenchCheck.Core.Checking;
using BenchCheck.Plots;
using BenchCheck.Plots.Reports;

namespace BenchCheck.Commands;

/// <summary>The picture and the report that a check may leave: <c>--plot</c> and <c>--report</c>.</summary>
internal sealed class CheckPictures
{
    private readonly Option<string?> plot = new("--plot") { Description = "Also draw readings and residuals: .png or .svg.", HelpName = "FILE" };
    private readonly Option<string?> report = new("--report") { Description = "Also write a printable report: one .html page.", HelpName = "FILE" };
    private readonly Terminal terminal;

    public CheckPictures(Command command, Terminal terminal)
    {
        this.terminal = terminal;
        command.Add(plot);
        command.Add(report);
    }

    /// <param name="number">of the board in the file, from zero: each further board gets its number before the ending, so that none overwrites another</param>
    /// <returns>false when a file could not be written, which is then said</returns>
    public bool Write(ParseResult parsed, CheckResult result, CheckSettings settings, Inputs inputs, int number)
    {
        var isWhole = true;
        if (parsed.GetValue(plot) is { } picture) isWhole &= IsSaved(ReadingPlot.Of(result).Save(NumberedPath.Of(picture, number)));
        if (parsed.GetValue(report) is { } page)
        {
            ReportInput[] files =
            [
                new("board", Path.GetFileName(inputs.BoardPath(parsed)), File.ReadAllText(inputs.BoardPath(parsed))),
                new("readings", Path.GetFileName(inputs.ReadingsPath(parsed)), File.ReadAllText(inputs.ReadingsPath(parsed))),
            ];
            isWhole &= IsSaved(HtmlReport.Save(new Report(result, settings, [.. files], CheckFiling.Program, DateTimeOffset.Now), NumberedPath.Of(page, number)));
        }

        return isWhole;
    }

    private bool IsSaved(FileFault? fault)
    {
        if (fault is not null) terminal.Error.WriteLine(Printable.Text(fault.ToString()));
        return fault is null;
    }
}
