using System.CommandLine;
using BenchCheck.Core.Batches;
using BenchCheck.Core.Checking;
using BenchCheck.Core.Diagnosis;
using BenchCheck.Core.Metering;
using BenchCheck.Files;

namespace BenchCheck.Commands.Batch;

/// <summary><c>benchcheck batch BOARD READINGS…</c>: one kind of board, many of them.</summary>
internal static class BatchCommand
{
    public static Command Create(Terminal terminal)
    {
        var command = new Command("batch", """
            Checks many boards of one kind: every serial of the readings files, and sums them up.

            A board or a row that cannot be used costs only itself and is named.

            Examples:
              benchcheck batch fan-stage.toml shelf.csv --out results.csv
              benchcheck batch fan-stage.toml readings-folder --out results.jsonl --resume
              benchcheck batch fan-stage.toml shelf.csv --pool --plots pictures
            """);
        var inputs = Inputs.BoardOnly(command, terminal);
        var readings = new Argument<string[]>("READINGS") { Description = "Readings files (CSV), or folders of them.", Arity = ArgumentArity.OneOrMore };
        var options = new CheckOptions(command);
        var target = new Option<string?>("--out") { Description = "Write the result of each board to a new file: .csv a row, .jsonl a JSON object a board.", HelpName = "FILE" };
        var resume = new Option<bool>("--resume") { Description = "Go on with the file of --out where an earlier run stopped." };
        var noSuspects = new Option<bool>("--no-suspects") { Description = "Do not look for faults: verdicts and estimates only, much faster." };
        var pool = new Option<bool>("--pool")
        {
            Description = "Estimate the lot's mean and spread of each parameter from the boards that agree, and every such board's parameters anew with them.",
        };
        var plots = new Option<string?>("--plots") { Description = "Draw the spread of every estimate, its histogram and its trend into this folder.", HelpName = "FOLDER" };
        command.Add(readings);
        command.Add(target);
        command.Add(resume);
        command.Add(noSuspects);
        command.Add(pool);
        command.Add(plots);
        // On a thread of its own, so that Ctrl-C is heard.
        command.SetAction((parsed, cancel) => Task.Run(() => Run(parsed, cancel), CancellationToken.None));
        return command;

        int Run(ParseResult parsed, CancellationToken cancel)
        {
            if (inputs.Bench(parsed) is not { } bench || options.Rates(parsed, bench, terminal) is not { } rates) return ExitCode.Unusable;
            var source = BatchSource.Open(parsed.GetRequiredValue(readings), bench, problem => terminal.Error.WriteLine(Printable.Text(problem)));
            if (source.BoardCount == 0) return ExitCode.Unusable;
            var isPooled = parsed.GetValue(pool);
            BatchCsv Columns() => isPooled ? BatchCsv.WithLot(bench.Board) : BatchCsv.Of(bench.Board);
            var (output, done) = parsed.GetValue(target) is not { } path ? (null, [])
                : parsed.GetValue(resume) ? BatchOutput.Resume(path, Columns) : (BatchOutput.Create(path, Columns), []);
            using var file = output;
            var summary = new BatchSummary();
            var boards = source.Boards;
            if (done.Count > 0)
            {
                if (!IsBeginning(done, boards, output!))
                {
                    terminal.Error.WriteLine("the results in the file are not those of the first boards of these readings; name another file");
                    return ExitCode.Unusable;
                }

                foreach (var outcome in done) summary.Add(outcome);
                boards = boards.Skip(done.Count);
            }

            var settings = options.Settings(parsed) with { FindFaults = !parsed.GetValue(noSuspects) };
            var lot = isPooled ? LotOf(bench, settings, rates, source, cancel) : null;
            var progress = ProgressLine.On(terminal, source.BoardCount, "boards");
            var wasStopped = !Check(new BatchRun(bench, settings, rates, Environment.ProcessorCount), boards, lot, output, summary, progress, cancel);
            if (wasStopped)
                terminal.Error.WriteLine($"Stopped after {summary.Boards} of {source.BoardCount} boards; their results are complete" + (output is null ? "." : ", and --resume goes on from there."));
            BatchTables.Write(terminal.Console, bench.Board.Title, summary);
            if (lot is not null) LotTable.Write(terminal.Console, lot);
            if (parsed.GetValue(plots) is { } folder && !BatchPlots.Write(folder, bench.Board, summary, terminal)) return ExitCode.Unusable;
            return wasStopped ? ExitCode.Cancelled
                : summary.Agreeing == summary.Boards && source is { Unusable: 0, HasBadRows: false } ? ExitCode.Agrees : ExitCode.Disagrees;
        }

        Lot? LotOf(Bench bench, CheckSettings settings, FaultRates rates, BatchSource source, CancellationToken cancel)
        {
            var run = new BatchRun(bench, settings with { FindFaults = false }, rates, Environment.ProcessorCount);
            var progress = ProgressLine.On(terminal, source.BoardCount, "boards fitted for the lot");
            try
            {
                var lot = new LotPool(bench, settings.Law).LotOf(run, source.Boards, progress.Report, cancel);
                if (lot is null) terminal.Error.WriteLine($"no lot: fewer than {LotPool.FewestBoards} boards agree; their estimates stand alone");
                return lot;
            }
            finally
            {
                progress.Clear();
            }
        }

        bool Check(BatchRun run, IEnumerable<ReadingSet> boards, Lot? lot, BatchOutput? output, BatchSummary summary, ProgressLine progress, CancellationToken cancel)
        {
            try
            {
                foreach (var (outcome, line) in run.Run(
                    boards, (result, fit) => (BoardOutcome.Of(result), output?.Line(lot?.Tighten(result, fit) ?? result)),
                    (board, reason) => (BoardOutcome.Failed(board.Serial, reason), output?.FailureLine(board, reason)), cancel))
                {
                    if (line is not null) output!.Write(line);
                    summary.Add(outcome);
                    if (outcome.Failure is { } failure)
                    {
                        progress.Clear();
                        terminal.Error.WriteLine($"serial {Printable.Text(outcome.Serial ?? "(none)")} could not be checked: {Printable.Text(failure)}");
                    }

                    progress.Report(summary.Boards);
                }

                return true;
            }
            catch (OperationCanceledException)
            {
                return false;
            }
            finally
            {
                progress.Clear();
            }
        }
    }

    private static bool IsBeginning(List<BoardOutcome> done, IEnumerable<ReadingSet> boards, BatchOutput output) =>
        boards.Take(done.Count).Select(b => output.Kept(b.Serial)).SequenceEqual(done.Select(d => d.Serial));
}
