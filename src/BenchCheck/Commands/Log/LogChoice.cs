using System.CommandLine;
using System.CommandLine.Parsing;
using BenchCheck.Records;

namespace BenchCheck.Commands.Log;

/// <summary>Which bench log a command uses: the one named, or else that of BENCHCHECK_LOG, or else the file in the user's data folder.</summary>
internal sealed class LogChoice
{
    private const string Variable = "BENCHCHECK_LOG";

    private readonly Option<string?> log;

    private LogChoice(Command command, Option<string?> option)
    {
        log = option;
        command.Add(log);
    }

    /// <summary>For a command that works on the log.</summary>
    public static LogChoice Of(Command command) => new(command, new Option<string?>("--log")
    {
        Description = $"The bench log: a file, or \"Host=…;Database=…;Username=…\" of a shared PostgreSQL. Left out: {Variable}, else the file in your data folder.",
        HelpName = "FILE|CONNECTION",
    });

    /// <summary>For a command that files its result when asked to.</summary>
    public static LogChoice ToFileIn(Command command) => new(command, new Option<string?>("--log")
    {
        Description = $"File the result in the bench log; name a file or \"Host=…;Database=…;Username=…\" for another than {Variable} or the usual one. Comes last, or with its value.",
        HelpName = "FILE|CONNECTION", Arity = ArgumentArity.ZeroOrOne,
    });

    /// <summary>The option was given, with or without a place.</summary>
    public bool IsAsked(ParseResult parsed) => parsed.GetResult(log) is OptionResult { Implicit: false };

    public LogPlace Place(ParseResult parsed) => PlaceOf(parsed.GetValue(log));

    /// <summary>The log of somebody who names none.</summary>
    public static LogPlace Usual() => PlaceOf(null);

    private static LogPlace PlaceOf(string? named)
    {
        named ??= Environment.GetEnvironmentVariable(Variable);
        return string.IsNullOrWhiteSpace(named) ? LogPlace.Standard() : LogPlace.Parse(named);
    }
}
