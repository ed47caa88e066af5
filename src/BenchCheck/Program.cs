using BenchCheck.Commands;

return await BenchCheckCommand.RunAsync(args, BenchCheck.Commands.Terminal.Standard()).ConfigureAwait(false);
