using BenchCheck.Core.Checking;
using BenchCheck.Core.Metering;

namespace BenchCheck.Core.Diagnosis;

/// <summary>
/// The whole job for one board: readings in, <see cref="CheckResult"/> out. Holds what is computed once for a board, so one instance serves
/// many reading sets; instances are not shared between threads.
/// </summary>
public sealed class Reconciliation(Bench bench, CheckSettings settings)
{
    public Bench Bench { get; } = bench;

    public CheckSettings Settings { get; } = settings;

    /// <exception cref="Equations.NoOperatingStateException">no state of the devices satisfies the equations</exception>
    /// <exception cref="OperationCanceledException">cancelled</exception>
    public CheckResult Run(ReadingSet readings, CancellationToken cancel = default) =>
        throw new NotSupportedException($"{readings.Serial}{cancel}");
}
