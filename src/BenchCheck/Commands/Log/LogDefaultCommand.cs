using System.CommandLine;
using BenchCheck.Records;

namespace BenchCheck.Commands.Log;

/// <summary><c>benchcheck log default</c>: which log is meant where none is named, and whether every check is filed.</summary>
internal static class LogDefaultCommand
{
    public static Command Create(Terminal terminal)
    {
        var command = new Command("default", """
            Says which bench log is meant where none is named, or sets it once for all.

            Examples:
              benchcheck log default
              benchcheck log default ~/bench/log.db --every-check
              benchcheck log default "Host=shop;Database=bench;Username=anna"
              benchcheck log default --usual --on-request
            """);
        var place = new Argument<string?>("FILE|CONNECTION") { Description = "The log from now on.", Arity = ArgumentArity.ZeroOrOne };
        var usual = new Option<bool>("--usual") { Description = "The file in your data folder again." };
        var every = new Option<bool>("--every-check") { Description = "File every check without --log; check --no-log leaves one out." };
        var asked = new Option<bool>("--on-request") { Description = "File only checks with --log." };
        command.Add(place);
        foreach (var option in new[] { usual, every, asked }) command.Add(option);
        command.Validators.Add(result =>
        {
            if (result.GetValue(every) && result.GetValue(asked)) result.AddError("--every-check and --on-request exclude each other");
            if (result.GetValue(usual) && result.GetValue(place) is not null) result.AddError("--usual and a log exclude each other");
        });
        command.SetAction(parsed =>
        {
            var named = parsed.GetValue(place);
            var isSetting = named is not null || parsed.GetValue(usual) || parsed.GetValue(every) || parsed.GetValue(asked);
            // A damaged file is replaced only when a log is named anew.
            var defaults = named is not null || parsed.GetValue(usual) ? new LogDefaults(named is null ? null : Kept(named), FilesEvery()) : LogDefaults.Read();
            if (isSetting)
            {
                if (parsed.GetValue(every)) defaults = defaults with { FilesEveryCheck = true };
                if (parsed.GetValue(asked)) defaults = defaults with { FilesEveryCheck = false };
                defaults.Write();
            }

            terminal.Output.WriteLine(Printable.Text($"log: {defaults.Place.Name}"));
            terminal.Output.WriteLine(defaults.FilesEveryCheck ? "every check is filed; check --no-log leaves one out" : "checks are filed when asked: check --log");
            terminal.Output.WriteLine(Printable.Text($"kept in {LogDefaults.Path}"));
            if (LogChoice.IsSetByEnvironment) terminal.Error.WriteLine($"{LogChoice.Variable} is set and goes before it");
            return ExitCode.Agrees;
        });
        return command;
    }

    /// <summary>A file by its full path, since the program may be started elsewhere next time.</summary>
    /// <exception cref="BenchLogException">neither a file nor a connection string</exception>
    private static string Kept(string named) => LogPlace.Parse(named) is { IsFile: true } file ? file.Name : named;

    private static bool FilesEvery()
    {
        try
        {
            return LogDefaults.Read().FilesEveryCheck;
        }
        catch (IOException)
        {
            return false;
        }
    }
}
