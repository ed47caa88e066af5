using BenchCheck.Commands;

return await BenchCheckCommand.RunAsync(args, Terminal.Standard()).ConfigureAwait(false);
