using System.CommandLine;
using System.CommandLine.Parsing;
using BenchCheck.Records;

namespace BenchCheck.Commands.Log;

/// <summary>Which bench log a command uses: the one named, or else that of BENCHCHECK_LOG, or else the one set by <c>log default</c>.</summary>
internal sealed class LogChoice
{
    public const string Variable = "BENCHCHECK_LOG";

    private readonly Option<string?> log;
    private readonly Option<bool> none = new("--no-log") { Description = "Do not file this check, whatever log default says." };

    private LogChoice(Command command, Option<string?> option)
    {
        log = option;
        command.Add(log);
    }

    public static bool IsSetByEnvironment => !string.IsNullOrWhiteSpace(Environment.GetEnvironmentVariable(Variable));

    /// <summary>For a command that works on the log.</summary>
    public static LogChoice Of(Command command) => new(command, new Option<string?>("--log")
    {
        Description = $"The bench log: a file, or \"Host=…;Database=…;Username=…\" of a shared PostgreSQL. Left out: {Variable}, else the one of log default.",
        HelpName = "FILE|CONNECTION",
    });

    /// <summary>For a command that files its result when asked to.</summary>
    public static LogChoice ToFileIn(Command command)
    {
        var choice = new LogChoice(command, new Option<string?>("--log")
        {
            Description = $"File the result in the bench log; name a file or \"Host=…;Database=…;Username=…\" for another than {Variable} or the one of log default. Comes last, or with its value.",
            HelpName = "FILE|CONNECTION", Arity = ArgumentArity.ZeroOrOne,
        });
        command.Add(choice.none);
        command.Validators.Add(result =>
        {
            if (result.GetResult(choice.log) is { Implicit: false } && result.GetValue(choice.none)) result.AddError("--log and --no-log exclude each other");
        });
        return choice;
    }

    /// <summary>The option was given, with or without a place, or every check is filed.</summary>
    public bool IsAsked(ParseResult parsed) =>
        parsed.GetResult(log) is OptionResult { Implicit: false } || (!parsed.GetValue(none) && LogDefaults.Read().FilesEveryCheck);

    public LogPlace Place(ParseResult parsed) => PlaceOf(parsed.GetValue(log));

    /// <summary>The log of somebody who names none.</summary>
    public static LogPlace Usual() => PlaceOf(null);

    private static LogPlace PlaceOf(string? named)
    {
        named ??= Environment.GetEnvironmentVariable(Variable);
        return string.IsNullOrWhiteSpace(named) ? LogDefaults.Read().Place : LogPlace.Parse(named);
    }
}
