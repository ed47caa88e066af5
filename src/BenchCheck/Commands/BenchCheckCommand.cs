using System.CommandLine;
using BenchCheck.Commands.Batch;
using BenchCheck.Commands.Log;
using BenchCheck.Core.Equations;
using BenchCheck.Screens;

namespace BenchCheck.Commands;

/// <summary>The whole command line.</summary>
internal static class BenchCheckCommand
{
    public static async Task<int> RunAsync(string[] args, Terminal terminal)
    {
        var root = new RootCommand("Reconciles measured node voltages of a small analog board with what its parts list predicts.")
        {
            CheckCommand.Create(terminal), PredictCommand.Create(terminal), NextCommand.Create(terminal), LogCommand.Create(terminal),
            OpenCommand.Create(terminal), BatchCommand.Create(terminal),
        };
        root.SetAction(_ => ScreenProgram.Run(null, null, terminal.Error));
        var parsed = root.Parse(args);
        if (parsed.Errors.Count > 0)
        {
            foreach (var error in parsed.Errors) await terminal.Error.WriteLineAsync(Printable.Text(error.Message)).ConfigureAwait(false);
            await terminal.Error.WriteLineAsync("benchcheck --help lists the commands; benchcheck COMMAND --help says what each takes.").ConfigureAwait(false);
            return ExitCode.Unusable;
        }

        try
        {
            return await parsed.InvokeAsync(new InvocationConfiguration
            {
                Output = terminal.Output, Error = terminal.Error, EnableDefaultExceptionHandler = false,
            }).ConfigureAwait(false);
        }
        catch (NoOperatingStateException failure)
        {
            await terminal.Error.WriteLineAsync($"The board cannot be solved: {Printable.Text(failure.Message)}. Look for a missing connection or a supply across another.").ConfigureAwait(false);
            return ExitCode.Unusable;
        }
        catch (OperationCanceledException)
        {
            await terminal.Error.WriteLineAsync("Stopped.").ConfigureAwait(false);
            return ExitCode.Cancelled;
        }
        catch (IOException failure)
        {
            await terminal.Error.WriteLineAsync(Printable.Text(failure.Message)).ConfigureAwait(false);
            return ExitCode.Unusable;
        }
#pragma warning disable CA1031 // the last resort: whatever it is, the user gets a sentence and an exit code, not a stack trace
        catch (Exception failure)
        {
            await terminal.Error.WriteLineAsync(
                $"A fault of the program, not of your files: {failure.GetType().Name}: {Printable.Text(failure.Message)}. Please report it with the board and the readings.").ConfigureAwait(false);
            return ExitCode.Fault;
        }
#pragma warning restore CA1031
    }
}
