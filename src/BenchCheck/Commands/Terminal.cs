using Spectre.Console;

namespace BenchCheck.Commands;

/// <summary>Where a command writes: results on the output, messages on the error stream.</summary>
/// <param name="Output">raw output, for JSON</param>
/// <param name="Error">messages</param>
/// <param name="Console">formatted output; plain text when it does not go to a terminal or when NO_COLOR is set</param>
internal sealed record Terminal(TextWriter Output, TextWriter Error, IAnsiConsole Console)
{
    /// <summary>Width taken when the output does not go to a terminal.</summary>
    private const int PipedWidth = 160;

    public static Terminal Standard()
    {
        System.Console.OutputEncoding = new System.Text.UTF8Encoding(false);
        return Of(System.Console.Out, System.Console.Error, System.Console.IsOutputRedirected);
    }

    /// <param name="isPiped">the output is not a terminal: no colour, no fitting to its width</param>
    public static Terminal Of(TextWriter output, TextWriter error, bool isPiped)
    {
        var isPlain = isPiped || !string.IsNullOrEmpty(Environment.GetEnvironmentVariable("NO_COLOR")) || Environment.GetEnvironmentVariable("TERM") == "dumb";
        var console = AnsiConsole.Create(new AnsiConsoleSettings
        {
            Out = new AnsiConsoleOutput(output),
            Ansi = isPiped ? AnsiSupport.No : AnsiSupport.Detect,
            ColorSystem = isPlain ? ColorSystemSupport.NoColors : ColorSystemSupport.Detect,
            Interactive = InteractionSupport.No,
        });
        if (isPiped) console.Profile.Width = PipedWidth;
        return new Terminal(output, error, console);
    }
}
