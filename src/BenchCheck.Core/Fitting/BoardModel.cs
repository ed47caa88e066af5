using System.Collections.Immutable;
using BenchCheck.Core.Boards;
using BenchCheck.Core.Equations;
using BenchCheck.Core.Metering;

namespace BenchCheck.Core.Fitting;

/// <summary>A board with the places where it is read: the prediction f(φ) of every reading and its Jacobian.</summary>
/// <remarks>
/// Readings of one meter, function and range share a scale error ε, so the meter shows (1 + ε) times what is there. Shapes: m readings,
/// p fitted parameters; Jacobian m×p, row-major, in units of φ. Remembers the devices' last operating state as the start of the next search; not for use by two threads at once.
/// </remarks>
public sealed class BoardModel
{
    /// <summary>Standard deviation of the logarithm of a gain for each decade between its current and that at which it is stated: common practice, no source.</summary>
    private const double GainSpreadPerDecade = 0.15;

    /// <summary>Below this a transistor counts as off, and its gain as unseen.</summary>
    private const double LeastCollectorAmperes = 1e-8;

    private readonly NetworkSolver solver;
    private readonly ReadingSetup[] setups;
    private readonly double[] nominal;
    private readonly double[] theta;
    private readonly double[] gradient;
    private readonly int[] scaleOfReading;
    private readonly FitParameter[] fitted;
    private readonly ModelParameters.Drift[] drifts;

    /// <param name="probes">where the board is read; the order of predictions</param>
    /// <param name="hasScaleError">which readings carry the meter's scale error: those whose uncertainty was not stated</param>
    /// <param name="solver">shared workspace; any number of models may use one in turn</param>
    public BoardModel(Board board, IReadOnlyList<Probe> probes, IReadOnlyList<bool> hasScaleError, NetworkSolver solver)
        : this(board, new ParameterTable(board), probes, table => ModelParameters.OfReadings(board, table, probes, hasScaleError), solver)
    {
    }

    private BoardModel(Board board, ParameterTable table, IReadOnlyList<Probe> probes, Func<ParameterTable, ModelParameters> choose, NetworkSolver solver)
    {
        Board = board;
        Table = table;
        this.solver = solver;
        nominal = [.. table.Entries.Select(e => e.Nominal.IsUnknown ? FitParameter.StartOf(e.Kind) : e.Nominal.Value)];
        theta = [.. nominal];
        gradient = new double[table.Count];
        ReadingCount = probes.Count;
        var parameters = choose(table);
        fitted = [.. parameters.All];
        BoardParameterCount = parameters.BoardCount;
        scaleOfReading = parameters.ScaleOfReading;
        drifts = parameters.Drifts;
        WidenStatedGains();
        Parameters = [.. fitted];
        setups = new ReadingArrangement(board, table, probes, solver).Setups();
    }

    /// <summary>The board read where no reading was taken: no scale errors, no drift between conditions, only the board's own parameters.</summary>
    public static BoardModel AtPlaces(Board board, IReadOnlyList<Probe> places, NetworkSolver solver) =>
        new(board, new ParameterTable(board), places, table => ModelParameters.OfBoard(board, table, places.Count), solver);

    internal NetworkSolver Solver => solver;

    /// <summary>The parameters as an array, for loops that must not copy.</summary>
    internal ReadOnlySpan<FitParameter> Fitted => fitted;

    public Board Board { get; }

    public ParameterTable Table { get; }

    public ImmutableArray<FitParameter> Parameters { get; }

    /// <summary>How many of the parameters belong to the board; the meter's scale errors follow them.</summary>
    public int BoardParameterCount { get; }

    public int ReadingCount { get; }

    /// <summary>Predicts every reading.</summary>
    /// <param name="phi">p values</param>
    /// <param name="predicted">receives m values, SI units</param>
    /// <param name="jacobian">receives m×p derivatives; empty when not wanted</param>
    /// <exception cref="NoOperatingStateException">the equations have no solution at φ</exception>
    public void Predict(ReadOnlySpan<double> phi, Span<double> predicted, Span<double> jacobian)
    {
        var p = fitted.Length;
        Load(phi);
        foreach (var setup in setups)
        {
            Apply(setup.Condition, phi);
            setup.Solve(theta);
            var readings = setup.Readings;
            for (var k = 0; k < readings.Length; k++)
            {
                var j = readings[k];
                var scale = scaleOfReading[j] < 0 ? 1 : 1 + phi[scaleOfReading[j]];
                if (jacobian.IsEmpty)
                {
                    predicted[j] = scale * setup.Read(k, []);
                    continue;
                }

                var value = setup.Read(k, gradient);
                predicted[j] = scale * value;
                var row = jacobian.Slice(j * p, p);
                row.Clear();
                for (var i = 0; i < BoardParameterCount; i++)
                {
                    var parameter = fitted[i];
                    var slope = scale * gradient[parameter.ThetaIndex];
                    row[i] = parameter.IsLogarithmic ? slope * theta[parameter.ThetaIndex] : slope;
                }

                if (scaleOfReading[j] >= 0) row[scaleOfReading[j]] = value;
                foreach (var drift in drifts)
                {
                    if (drift.Condition == setup.Condition)
                        row[drift.Parameter] = scale * gradient[drift.ThetaIndex] * (drift.IsRatio ? theta[drift.ThetaIndex] : 1);
                }
            }
        }
    }

    /// <summary>Solves the board in one condition without any meter, for what is not read: currents, states, power.</summary>
    public OperatingPoint Operate(ReadOnlySpan<double> phi, Condition condition)
    {
        Load(phi);
        Apply(condition.Name, phi);
        var network = NetworkCompiler.Compile(Board, Table, condition);
        solver.Solve(network, theta);
        return OperatingPoint.Of(network, solver, theta);
    }

    /// <summary>What the board is to whatever is connected between two nodes: its open voltage and the resistance looking in, sources dead.</summary>
    /// <param name="condition">a DC condition</param>
    public (double Volts, double Ohms) LookingIn(ReadOnlySpan<double> phi, Condition condition, string at, string against)
    {
        Load(phi);
        Apply(condition.Name, phi);
        var network = NetworkCompiler.Compile(Board, Table, condition);
        solver.Solve(network, theta);
        var (high, low) = (network.IndexOf(at), network.IndexOf(against));
        double Volts(int node) => node < 0 ? 0 : solver.Unknowns[node];
        return (Volts(high) - Volts(low), solver.TheveninOhms(high, low));
    }

    /// <summary>Forgets the remembered operating states, so that the next prediction does not depend on those before it.</summary>
    public void Forget()
    {
        foreach (var setup in setups) setup.Forget();
    }

    private void Load(ReadOnlySpan<double> phi)
    {
        // A drift may have moved what the fit does not.
        nominal.CopyTo(theta, 0);
        for (var i = 0; i < BoardParameterCount; i++)
        {
            var parameter = fitted[i];
            theta[parameter.ThetaIndex] = parameter.Value(phi[i]);
        }
    }

    /// <summary>
    /// A gain stated at one current is less certain at another: what the parts list says of it is widened for the current that the board as
    /// listed gives the transistor.
    /// </summary>
    private void WidenStatedGains()
    {
        var stated = Board.Parts.OfType<Transistor>().Where(q => q.StatedAmperes is not null).ToArray();
        if (stated.Length == 0 || Board.Conditions.FirstOrDefault(c => c is { IsSmallSignal: false, SuppliesRemoved: false }) is not { } condition) return;
        Dictionary<string, double> currents;
        try
        {
            currents = Operate([.. fitted.Select(p => p.Mean)], condition).Currents().ToDictionary(c => c.At, c => Math.Abs(c.Amperes), StringComparer.Ordinal);
        }
        catch (NoOperatingStateException)
        {
            return;
        }

        foreach (var q in stated)
        {
            var index = Array.FindIndex(fitted, p => p.Owner == q.Designator && p.Kind == ParameterKind.Gain);
            if (index < 0 || !(currents[q.JointName(Transistor.Collector)] > LeastCollectorAmperes)) continue;
            var spread = GainSpreadPerDecade * Math.Log10(currents[q.JointName(Transistor.Collector)] / q.ReferenceAmperes);
            fitted[index] = fitted[index] with { Sigma = Math.Sqrt(fitted[index].Sigma * fitted[index].Sigma + spread * spread) };
        }
    }

    private void Apply(string condition, ReadOnlySpan<double> phi)
    {
        if (drifts.Length == 0) return;
        Load(phi);
        foreach (var drift in drifts)
        {
            if (drift.Condition != condition) continue;
            if (drift.IsRatio) theta[drift.ThetaIndex] *= Math.Exp(phi[drift.Parameter]);
            else theta[drift.ThetaIndex] += phi[drift.Parameter];
        }
    }
}
