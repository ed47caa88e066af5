using BenchCheck.Core.Checking;
using BenchCheck.Core.Diagnosis;
using BenchCheck.Core.Equations;
using BenchCheck.Core.Metering;

namespace BenchCheck.Screens;

/// <summary>What the background has to say.</summary>
internal abstract record CheckReport
{
    internal sealed record Predicted(Bench Bench, Prediction Prediction) : CheckReport;

    /// <param name="IsComplete">false for the comparison alone, before the faults are searched</param>
    internal sealed record Checked(long Version, CheckResult Result, bool IsComplete) : CheckReport;

    internal sealed record Failed(long Version, string Reason) : CheckReport;
}

/// <summary>Checks readings on a thread of its own, the newest only: a newer entry cancels the run of an older one.</summary>
/// <remarks>The comparison is reported as soon as it is there, the suspects and next readings follow. Reports come on the background thread.</remarks>
internal sealed class CheckRunner : IDisposable
{
    private readonly Lock gate = new();
    private readonly AutoResetEvent wake = new(false);
    private readonly Action<CheckReport> report;
    private readonly Thread thread;
    private Job? waiting;
    private CancellationTokenSource? running;
    private volatile bool isEnding;

    public CheckRunner(CheckSettings settings, Action<CheckReport> report)
    {
        this.report = report;
        thread = new Thread(() => Work(settings)) { IsBackground = true, Name = "check" };
        thread.Start();
    }

    public void Post(long version, Bench bench, ReadingSet readings)
    {
        lock (gate)
        {
            running?.Cancel();
            waiting?.Cancel.Dispose();
            waiting = new Job(version, bench, readings, new CancellationTokenSource());
        }

        wake.Set();
    }

    public void Dispose()
    {
        isEnding = true;
        lock (gate) running?.Cancel();
        wake.Set();
        if (thread.Join(TimeSpan.FromSeconds(5))) wake.Dispose();
    }

    private void Work(CheckSettings settings)
    {
        Reconciliation? reconciliation = null;
        while (true)
        {
            wake.WaitOne();
            if (isEnding) return;
            Job job;
            lock (gate)
            {
                if (waiting is not { } next) continue;
                job = next;
                running = job.Cancel;
                waiting = null;
            }

            if (!ReferenceEquals(reconciliation?.Bench, job.Bench))
            {
                reconciliation = new Reconciliation(job.Bench, settings with { FindFaults = true });
                Guarded(job.Version, () => report(new CheckReport.Predicted(job.Bench, Predictor.Predict(job.Bench, settings))));
            }

            Guarded(job.Version, () =>
            {
                var result = reconciliation.Run(job.Readings, compared => report(new CheckReport.Checked(job.Version, compared, false)), job.Cancel.Token);
                report(new CheckReport.Checked(job.Version, result, true));
            });
            lock (gate) running = null;
            job.Cancel.Dispose();
        }
    }

    private void Guarded(long version, Action work)
    {
        try
        {
            work();
        }
        catch (OperationCanceledException)
        {
            // A newer entry has taken its place.
        }
        catch (NoOperatingStateException failure)
        {
            report(new CheckReport.Failed(version, failure.Message));
        }
#pragma warning disable CA1031 // a fault of the computation must not take the screen, and with it the entries, down
        catch (Exception failure)
        {
            report(new CheckReport.Failed(version, $"a fault of the program: {failure.GetType().Name}: {failure.Message}"));
        }
#pragma warning restore CA1031
    }

    private sealed record Job(long Version, Bench Bench, ReadingSet Readings, CancellationTokenSource Cancel);
}
