using BenchCheck.Benchmarks.Scoreboard.Cases;
using BenchCheck.Benchmarks.Scoreboard.Physics;

namespace BenchCheck.Benchmarks.Scoreboard.Scoring;

/// <summary>Works through numbered cases on every core. Case i belongs to worker i modulo the workers, so that nothing depends on who is faster.</summary>
public static class ScoreRun
{
    /// <param name="work">makes the result of one case; the solver is the worker's own</param>
    public static T[] Of<T>(int count, Func<int, TruthSolver, T> work)
    {
        ArgumentNullException.ThrowIfNull(work);
        var results = new T[count];
        var workers = Math.Max(1, Environment.ProcessorCount);
        var done = 0;
        Thread[] threads = [.. Enumerable.Range(0, workers).Select(worker => new Thread(() =>
        {
            var solver = new TruthSolver();
            for (var i = worker; i < count; i += workers)
            {
                results[i] = work(i, solver);
                var so = Interlocked.Increment(ref done);
                if (so % 100 == 0 && !Console.IsErrorRedirected) Console.Error.Write($"\r{so} of {count} ");
            }
        }))];
        foreach (var thread in threads) thread.Start();
        foreach (var thread in threads) thread.Join();
        return results;
    }
}
