using BenchCheck.Core.Equations;
using BenchCheck.Core.Equations.SmallSignal;

namespace BenchCheck.Core.Fitting;

/// <summary>Readings that one solution of the board serves.</summary>
/// <param name="condition">name of the condition that they were taken in</param>
/// <param name="readings">their positions among the predictions</param>
internal abstract class ReadingSetup(string condition, int[] readings)
{
    public string Condition => condition;

    public ReadOnlySpan<int> Readings => readings;

    /// <exception cref="NoOperatingStateException">no solution at θ</exception>
    public abstract void Solve(ReadOnlySpan<double> theta);

    /// <summary>What the k-th reading shows after <see cref="Solve"/>, in SI units, and its derivatives by θ where wanted.</summary>
    public abstract double Read(int k, Span<double> gradient);

    /// <summary>Forgets the operating state from which the next search would start.</summary>
    public abstract void Forget();
}

/// <summary>Readings at rest: voltages, one current, resistances of the unpowered board.</summary>
internal sealed class DcSetup(NetworkSolver solver, Network network, int[] readings, Measurement[] measurements)
    : ReadingSetup(network.Condition.Name, readings)
{
    private readonly double[] start = new double[network.PortCount];

    public override void Solve(ReadOnlySpan<double> theta)
    {
        solver.Solve(network, theta, start);
        solver.PortCurrents.CopyTo(start);
    }

    public override double Read(int k, Span<double> gradient) => solver.Read(measurements[k], gradient);

    public override void Forget() => start.AsSpan().Clear();
}

/// <summary>Readings of small changes around an operating point, which moves with the parameters too.</summary>
internal sealed class SmallSignalSetup(
    NetworkSolver solver, string condition, Network atRest, Network signal, double? hertz, int[] readings, SmallSignalMeasurement[] measurements)
    : ReadingSetup(condition, readings)
{
    private readonly double[] start = new double[atRest.PortCount];
    private readonly double[] byCurrent = new double[atRest.PortCount];

    public override void Solve(ReadOnlySpan<double> theta)
    {
        solver.Solve(atRest, theta, start);
        solver.PortCurrents.CopyTo(start);
        solver.SmallSignals.Solve(signal, theta, start, solver.Law == JunctionLaw.Exponential ? solver.PortSlopes : [], hertz);
    }

    public override double Read(int k, Span<double> gradient)
    {
        var value = solver.SmallSignals.Read(measurements[k], gradient, byCurrent);
        if (!gradient.IsEmpty) solver.AddPortGradient(byCurrent, gradient);
        return value;
    }

    public override void Forget() => start.AsSpan().Clear();
}
