using System.Collections.Concurrent;
using BenchCheck.Core.Checking;
using BenchCheck.Core.Diagnosis;
using BenchCheck.Core.Equations;
using BenchCheck.Core.Metering;

namespace BenchCheck.Core.Batches;

/// <summary>Checks many boards of one kind on all processors; what comes out has the order of what went in.</summary>
/// <remarks>
/// Boards are taken from the source only as fast as they are checked, and at most a few a processor are under way, so memory does not grow
/// with the batch. A board that cannot be checked costs only itself. What comes out of a board does not depend on which others a worker had before.
/// </remarks>
/// <param name="workers">how many boards are checked at a time</param>
public sealed class BatchRun(Bench bench, CheckSettings settings, FaultRates? rates, int workers)
{
    private const int UnderWayEach = 8;

    private readonly ConcurrentBag<Reconciliation> idle = [];

    /// <param name="finish">makes of each board's result what is wanted; on the worker's thread</param>
    /// <param name="fail">makes of a board that cannot be checked, with the reason, what is wanted</param>
    /// <exception cref="OperationCanceledException">cancelled; what was given before is whole</exception>
    public IEnumerable<T> Run<T>(IEnumerable<ReadingSet> boards, Func<CheckResult, BoardFit, T> finish, Func<ReadingSet, string, T> fail, CancellationToken cancel = default)
    {
        ArgumentNullException.ThrowIfNull(boards);
        // A scheduler and not a semaphore: boards that wait for a processor must not hold a thread.
        var scheduler = new ConcurrentExclusiveSchedulerPair(TaskScheduler.Default, workers).ConcurrentScheduler;
        var underWay = new Queue<Task<T>>();
        try
        {
            foreach (var board in boards)
            {
                cancel.ThrowIfCancellationRequested();
                underWay.Enqueue(Task.Factory.StartNew(() => One(board, finish, fail, cancel), cancel, TaskCreationOptions.DenyChildAttach, scheduler));
                if (underWay.Count >= workers * UnderWayEach) yield return underWay.Dequeue().GetAwaiter().GetResult();
            }

            while (underWay.TryDequeue(out var task)) yield return task.GetAwaiter().GetResult();
        }
        finally
        {
            Task.WhenAll(underWay).ContinueWith(_ => { }, TaskScheduler.Default).Wait(CancellationToken.None);
        }
    }

    private T One<T>(ReadingSet board, Func<CheckResult, BoardFit, T> finish, Func<ReadingSet, string, T> fail, CancellationToken cancel)
    {
        if (!idle.TryTake(out var reconciliation)) reconciliation = new Reconciliation(bench, settings, rates);
        try
        {
            var (result, fit) = reconciliation.Fit(board, null, cancel);
            return finish(result, fit);
        }
        catch (NoOperatingStateException failure)
        {
            return fail(board, failure.Message);
        }
        finally
        {
            idle.Add(reconciliation);
        }
    }
}
