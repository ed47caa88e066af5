using BenchCheck.Core.Boards;

namespace BenchCheck.Core.Equations;

/// <summary>Solves a compiled network for given parameters, predicts what meters show, and differentiates that by the adjoint method.</summary>
/// <remarks>
/// <para>
/// One factorisation of A serves everything: x = A⁻¹ (b − C z), the ports' view v = D A⁻¹ b − (D A⁻¹ C) z, the loading of a meter
/// (with g its conductance and r = cᵀ A⁻¹ c the Thevenin resistance it meets, a rank-one change of the ports' view), and the adjoints.
/// </para>
/// <para>
/// With reading y = cᵀ x, the adjoint (λ, μ) satisfies Aᵀ λ + g c cᵀ λ + Dᵀ μ = c, Cᵀ λ = S μ, S the slopes of the live ports; then
/// ∂y/∂p = λᵀ (∂b/∂p − ∂A/∂p x − ∂C/∂p z) + μᵀ ∂drop/∂p. Source: Director and Rohrer, IEEE Trans. Circuit Theory CT-16 (1969).
/// </para>
/// <para>Owns its buffers and allocates only when a larger network than any before arrives. Not for use by two threads at once.</para>
/// </remarks>
public sealed class NetworkSolver
{
    /// <summary>Open-loop gain of an amplifier that states none: ideal to one part in ten million of its input.</summary>
    private const double IdealGain = 1e7;

    /// <summary>How far a tangent may miss a junction's curve, in volts, for a loaded reading to be taken from the tangents of the unloaded state.</summary>
    private const double TangentVolts = 1e-8;

    private readonly JunctionLaw law;
    private readonly PortSolver portSolver = new();
    private Network network = null!;
    private double[] a = [];
    private double[] inverse = [];
    private int[] pivot = [];
    private double[] open = [];
    private double[] response = [];
    private double[] x = [];
    private double[] at = [];
    private double[] lambda = [];
    private double[] impedance = [];
    private double[] loadedImpedance = [];
    private double[] openVolts = [];
    private double[] loadedOpen = [];
    private double[] drops = [];
    private double[] z = [];
    private double[] loadedZ = [];
    private double[] reach = [];
    private double[] seen = [];
    private double[] yielding = [];
    private double[] mu = [];
    private double[] tangent = [];
    private double[] loadedTangent = [];
    private double[] slope = [];
    private double[] loadedSlope = [];
    private int[] tangentPivot = [];
    private int[] loadedPivot = [];
    private JunctionCurve[] curves = [];
    private bool[] corners = [];
    private bool[] isLive = [];
    private double[] conductance = [];
    private double[] theta = [];
    private int n;
    private int ports;

    public NetworkSolver(JunctionLaw law) => this.law = law;

    /// <summary>Workspace for small changes around what this one has solved.</summary>
    internal SmallSignal.SmallSignalSolver SmallSignals { get; } = new();

    /// <summary>Node voltages and branch currents of the last solution, without any meter.</summary>
    public ReadOnlySpan<double> Unknowns => x.AsSpan(0, n);

    /// <summary>Port currents of the last solution, without any meter.</summary>
    public ReadOnlySpan<double> PortCurrents => z.AsSpan(0, ports);

    /// <summary>Slope dv/dz of each port at the last solution, without any meter.</summary>
    internal ReadOnlySpan<double> PortSlopes => slope.AsSpan(0, ports);

    internal JunctionLaw Law => law;

    /// <summary>Finds the operating state of <paramref name="net"/> at <paramref name="parameters"/>.</summary>
    /// <param name="parameters">θ, in SI units</param>
    /// <param name="start">port currents to start from; empty to start with every device off</param>
    /// <exception cref="NoOperatingStateException">the equations are singular, or no state satisfies every device</exception>
    public void Solve(Network net, ReadOnlySpan<double> parameters, ReadOnlySpan<double> start = default)
    {
        ArgumentNullException.ThrowIfNull(net);
        Adopt(net, parameters);
        Stamp();
        if (!LuFactor.Factor(a.AsSpan(0, n * n), n, pivot))
            throw new NoOperatingStateException($"the equations in condition \"{net.Condition.Name}\" have no unique solution");
        LuFactor.Invert(a, n, pivot, inverse);
        LuFactor.Solve(a, n, pivot, open.AsSpan(0, n));
        for (var k = 0; k < ports; k++) Respond(k);

        for (var k = 0; k < ports; k++)
        {
            ref readonly var port = ref net.Ports[k];
            openVolts[k] = Across(open, port.High, port.Low);
            for (var l = 0; l < ports; l++) impedance[k * ports + l] = Across(response.AsSpan(l * n, n), port.High, port.Low);
            if (!corners[k] || port.IsStraight) impedance[k * ports + k] += port.SeriesOhms.Value(theta);
        }

        if (start.Length == ports) start.CopyTo(z);
        else z.AsSpan(0, ports).Clear();
        if (!portSolver.TrySolve(openVolts.AsSpan(0, ports), impedance.AsSpan(0, ports * ports), curves, drops, z.AsSpan(0, ports)))
        {
            // A start far away can mislead the first search; once more from everything off.
            z.AsSpan(0, ports).Clear();
            if (!portSolver.TrySolve(openVolts.AsSpan(0, ports), impedance.AsSpan(0, ports * ports), curves, drops, z.AsSpan(0, ports)))
                throw new NoOperatingStateException($"no state of the devices satisfies the equations in condition \"{net.Condition.Name}\"");
        }

        open.AsSpan(0, n).CopyTo(x);
        for (var k = 0; k < ports; k++)
        {
            if (z[k] != 0) LuFactor.AddScaled(x.AsSpan(0, n), response.AsSpan(k * n, n), -z[k]);
        }

        portSolver.Slope.AsSpan(0, ports).CopyTo(slope);
        portSolver.IsLive.AsSpan(0, ports).CopyTo(isLive);
        FactorTangent(impedance, slope, isLive, tangent, tangentPivot);
    }

    /// <summary>What a meter shows on the network last solved, and its derivatives.</summary>
    /// <param name="gradient">receives ∂y/∂θ in SI units, one entry a parameter; empty when not wanted</param>
    /// <exception cref="NoOperatingStateException">the devices find no state with the meter connected</exception>
    public double Read(in Measurement m, Span<double> gradient)
    {
        var reading = Across(x, m.High, m.Low);
        var load = m.LoadSiemens;
        var isConnected = load != 0 || m.TestAmperes != 0;
        if (!isConnected && gradient.IsEmpty) return reading;

        var thevenin = Inverse(m.High, m.High) - Inverse(m.High, m.Low) - Inverse(m.Low, m.High) + Inverse(m.Low, m.Low);
        for (var k = 0; k < ports; k++)
        {
            ref readonly var port = ref network.Ports[k];
            reach[k] = Inverse(port.High, m.High) - Inverse(port.High, m.Low) - Inverse(port.Low, m.High) + Inverse(port.Low, m.Low);
            seen[k] = Across(response.AsSpan(k * n, n), m.High, m.Low);
            yielding[k] = isLive[k] ? reach[k] : 0;
        }

        // With every device on its tangent the board is linear: the meter meets one resistance and draws one current.
        if (ports > 0) LuFactor.Solve(tangent, ports, tangentPivot, yielding.AsSpan(0, ports));
        var effective = thevenin - LuFactor.Dot(seen.AsSpan(0, ports), yielding.AsSpan(0, ports));
        var volts = (reading + m.TestAmperes * effective) / (1 + load * effective);
        var meterAmperes = load * volts - m.TestAmperes;
        var factor = tangent;
        var factorPivot = tangentPivot;
        var live = isLive;
        var share = 1 / (1 + load * effective);
        if (!isConnected || StaysOnTangents(meterAmperes))
        {
            for (var k = 0; k < ports; k++) loadedZ[k] = z[k] - meterAmperes * yielding[k];
            if (isConnected && !gradient.IsEmpty && ports > 0)
            {
                // The reading is that of the tangents; its derivatives are those of the slopes where the meter has moved the devices to.
                for (var k = 0; k < ports; k++) loadedSlope[k] = corners[k] ? slope[k] : curves[k].SlopeOhms(loadedZ[k]);
                LoadedView(m, 1 / (1 + load * thevenin));
                FactorTangent(loadedImpedance, loadedSlope, isLive, loadedTangent, loadedPivot);
                (factor, factorPivot) = (loadedTangent, loadedPivot);
                share = 1 / (1 + load * thevenin);
            }
        }
        else
        {
            volts = SolveLoaded(m, thevenin);
            meterAmperes = load * volts - m.TestAmperes;
            (factor, factorPivot, live) = (loadedTangent, loadedPivot, portSolver.IsLive);
            share = 1 / (1 + load * thevenin);
        }

        var scale = m.TestAmperes == 0 ? 1 : 1 / m.TestAmperes;
        if (gradient.IsEmpty) return volts * scale;

        // (view + S)ᵀ μ = h · share, then λ = α A⁻ᵀ c − Σ μ A⁻ᵀ d.
        for (var k = 0; k < ports; k++) mu[k] = live[k] ? seen[k] * share : 0;
        if (ports > 0) LuFactor.SolveTransposed(factor, ports, factorPivot, mu.AsSpan(0, ports));
        var alpha = (1 + load * LuFactor.Dot(mu.AsSpan(0, ports), reach.AsSpan(0, ports))) / (1 + load * thevenin);
        AdjointOf(m, alpha);
        SolutionWith(m, meterAmperes);
        gradient.Clear();
        Accumulate(lambda.AsSpan(0, n), at.AsSpan(0, n), loadedZ, scale, gradient);
        return volts * scale;
    }

    /// <summary>Adds Σ wₖ ∂zₖ/∂θ, the derivatives of the port currents of the last solution without any meter.</summary>
    /// <param name="weights">w, one a port</param>
    /// <param name="gradient">one entry a parameter; added to</param>
    public void AddPortGradient(ReadOnlySpan<double> weights, Span<double> gradient)
    {
        // Aᵀ λ + Dᵀ μ = 0, Cᵀ λ = w + S μ, so (D A⁻¹ C + S)ᵀ μ = −w.
        for (var k = 0; k < ports; k++) mu[k] = isLive[k] ? -weights[k] : 0;
        if (ports > 0) LuFactor.SolveTransposed(tangent, ports, tangentPivot, mu.AsSpan(0, ports));
        AdjointOf(new Measurement(-1, -1), 0);
        Accumulate(lambda.AsSpan(0, n), x.AsSpan(0, n), z, 1, gradient);
    }

    /// <summary>Resistance between two unknowns on the network last solved, sources dead, every port at its slope.</summary>
    /// <param name="low">−1 for the reference</param>
    public double TheveninOhms(int high, int low = -1)
    {
        for (var k = 0; k < ports; k++)
        {
            ref readonly var port = ref network.Ports[k];
            yielding[k] = isLive[k] ? Inverse(port.High, high) - Inverse(port.Low, high) - Inverse(port.High, low) + Inverse(port.Low, low) : 0;
            seen[k] = Across(response.AsSpan(k * n, n), high, low);
        }

        if (ports > 0) LuFactor.Solve(tangent, ports, tangentPivot, yielding.AsSpan(0, ports));
        var open = Inverse(high, high) - Inverse(high, low) - Inverse(low, high) + Inverse(low, low);
        return open - LuFactor.Dot(seen.AsSpan(0, ports), yielding.AsSpan(0, ports));
    }

    /// <summary>True when the meter's current moves no device off its tangent, or over a corner, by more than a hair.</summary>
    private bool StaysOnTangents(double meterAmperes)
    {
        for (var k = 0; k < ports; k++)
        {
            if (corners[k])
            {
                // A dead port yields no current; whether it would come alive shows in its voltage, so any loading is solved anew.
                if (!isLive[k] || z[k] - meterAmperes * yielding[k] <= 0) return false;
                continue;
            }

            if (!(curves[k].TangentMiss(z[k], -meterAmperes * yielding[k]) <= TangentVolts)) return false;
        }

        return true;
    }

    /// <summary>Finds the devices' state with the meter connected: to them it is another source and another impedance.</summary>
    private double SolveLoaded(in Measurement m, double thevenin)
    {
        var share = 1 / (1 + m.LoadSiemens * thevenin);
        var openReading = Across(open, m.High, m.Low);
        var view = loadedImpedance.AsSpan(0, ports * ports);
        LoadedView(m, share);
        for (var k = 0; k < ports; k++) loadedOpen[k] = openVolts[k] - reach[k] * (m.LoadSiemens * share * openReading - m.TestAmperes);

        var loaded = loadedZ.AsSpan(0, ports);
        z.AsSpan(0, ports).CopyTo(loaded);
        if (!portSolver.TrySolve(loadedOpen.AsSpan(0, ports), view, curves, drops, loaded))
            throw new NoOperatingStateException($"no state of the devices satisfies the equations with the meter connected in condition \"{network.Condition.Name}\"");
        FactorTangent(view, portSolver.Slope, portSolver.IsLive, loadedTangent, loadedPivot);
        return (openReading + m.TestAmperes * thevenin - LuFactor.Dot(seen.AsSpan(0, ports), loaded)) * share;
    }

    /// <summary>The ports' impedance with the meter's conductance across its leads: a change of rank one.</summary>
    private void LoadedView(in Measurement m, double share)
    {
        for (var k = 0; k < ports; k++)
        {
            var row = loadedImpedance.AsSpan(k * ports, ports);
            impedance.AsSpan(k * ports, ports).CopyTo(row);
            LuFactor.AddScaled(row, seen.AsSpan(0, ports), -reach[k] * m.LoadSiemens * share);
        }
    }

    /// <summary>Factors view + S; a dead port keeps its current at zero.</summary>
    private void FactorTangent(ReadOnlySpan<double> view, ReadOnlySpan<double> slopes, ReadOnlySpan<bool> live, double[] factor, int[] order)
    {
        for (var k = 0; k < ports; k++)
        {
            for (var l = 0; l < ports; l++) factor[k * ports + l] = live[k] && live[l] ? view[k * ports + l] : 0;
            factor[k * ports + k] = live[k] ? factor[k * ports + k] + slopes[k] : 1;
        }

        LuFactor.Factor(factor.AsSpan(0, ports * ports), ports, order);
    }

    private void AdjointOf(in Measurement m, double alpha)
    {
        var adjoint = lambda.AsSpan(0, n);
        adjoint.Clear();
        AddRow(adjoint, m.High, alpha);
        AddRow(adjoint, m.Low, -alpha);
        for (var k = 0; k < ports; k++)
        {
            if (mu[k] == 0) continue;
            AddRow(adjoint, network.Ports[k].High, -mu[k]);
            AddRow(adjoint, network.Ports[k].Low, mu[k]);
        }
    }

    /// <summary>The unknowns with the meter connected.</summary>
    private void SolutionWith(in Measurement m, double meterAmperes)
    {
        var solution = at.AsSpan(0, n);
        open.AsSpan(0, n).CopyTo(solution);
        for (var k = 0; k < ports; k++)
        {
            if (loadedZ[k] != 0) LuFactor.AddScaled(solution, response.AsSpan(k * n, n), -loadedZ[k]);
        }

        if (meterAmperes == 0) return;
        for (var i = 0; i < n; i++) solution[i] -= meterAmperes * (Inverse(i, m.High) - Inverse(i, m.Low));
    }

    private void AddRow(Span<double> sum, int row, double factor)
    {
        if (row >= 0) LuFactor.AddScaled(sum, inverse.AsSpan(row * n, n), factor);
    }

    private double Inverse(int row, int column) => row < 0 || column < 0 ? 0 : inverse[row * n + column];

    /// <summary>∂y/∂θ from the adjoint λ, the solution x and the port currents: one term a coefficient.</summary>
    private void Accumulate(ReadOnlySpan<double> adj, ReadOnlySpan<double> at, ReadOnlySpan<double> loaded, double scale, Span<double> gradient)
    {
        for (var i = 0; i < network.Conductors.Length; i++)
        {
            ref readonly var e = ref network.Conductors[i];
            AddTerm(e.Ohms, scale * Across(adj, e.From, e.To) * Across(at, e.From, e.To) * conductance[i] * conductance[i], gradient);
        }

        foreach (ref readonly var e in network.Voltages.AsSpan())
        {
            var weight = scale * adj[e.Row];
            AddTerm(e.Emf, weight, gradient);
            AddTerm(e.Ohms, weight * at[e.Row], gradient);
            if (e.Control != Network.ControlKind.None) AddTerm(e.Gain, weight * Across(at, e.ControlPlus, e.ControlMinus), gradient);
        }

        foreach (ref readonly var e in network.Currents.AsSpan())
        {
            var weight = -scale * Across(adj, e.From, e.To);
            AddTerm(e.Amperes, weight, gradient);
            if (e.Control != Network.ControlKind.None) AddTerm(e.Gain, weight * Across(at, e.ControlPlus, e.ControlMinus), gradient);
        }

        foreach (ref readonly var e in network.Amplifiers.AsSpan())
        {
            var weight = -scale * adj[e.Row];
            AddTerm(e.Offset, weight, gradient);
            if (e.Gain.IsConstantZero) continue;
            var gain = e.Gain.Value(theta);
            AddTerm(e.Gain, weight * (e.Output < 0 ? 0 : at[e.Output]) / (gain * gain), gradient);
        }

        for (var k = 0; k < ports; k++)
        {
            ref readonly var e = ref network.Ports[k];
            AddTerm(e.Drop, scale * mu[k] * (corners[k] ? 1 : curves[k].VoltsByDrop(loaded[k])), gradient);
            if (corners[k]) AddTerm(e.Excess, scale * mu[k], gradient);
            if (!corners[k] || e.IsStraight) AddTerm(e.SeriesOhms, scale * mu[k] * loaded[k], gradient);
            if (!corners[k]) AddTerm(e.Ideality, scale * mu[k] * network.ThermalVolts * curves[k].VoltsByThermal(loaded[k]), gradient);
            if (e.Row >= 0 || loaded[k] == 0) continue;
            var gain = e.Gain.Value(theta);
            AddTerm(e.Gain, scale * Across(adj, e.High, e.Low) * loaded[k] / (gain * gain), gradient);
        }
    }

    private void AddTerm(in Coefficient c, double weight, Span<double> gradient)
    {
        if (weight == 0 || c.Factor == 0) return;
        if (c.First >= 0) gradient[c.First] += weight * c.ByFirst(theta);
        if (c.Second >= 0) gradient[c.Second] += weight * c.BySecond(theta);
    }

    private void Adopt(Network net, ReadOnlySpan<double> parameters)
    {
        if (theta.Length != parameters.Length) theta = new double[parameters.Length];
        parameters.CopyTo(theta);
        network = net;
        n = net.Size;
        ports = net.PortCount;
        if (x.Length < n || z.Length < ports) Grow();
        if (conductance.Length < net.Conductors.Length) conductance = new double[net.Conductors.Length];
        for (var k = 0; k < ports; k++)
        {
            ref readonly var port = ref net.Ports[k];
            corners[k] = law == JunctionLaw.ConstantDrop || port.IsStraight;
            drops[k] = port.Drop.Value(theta);
            if (corners[k]) drops[k] += port.Excess.Value(theta);
            else curves[k] = new JunctionCurve(drops[k], port.ReferenceAmperes, port.Ideality.Value(theta) * net.ThermalVolts);
        }

        portSolver.Begin(corners.AsSpan(0, ports));
    }

    private void Stamp()
    {
        a.AsSpan(0, n * n).Clear();
        var b = open.AsSpan(0, n);
        b.Clear();
        foreach (var (node, siemens) in network.Leaks) a[node * n + node] += siemens;
        for (var i = 0; i < network.Conductors.Length; i++)
        {
            ref readonly var e = ref network.Conductors[i];
            var siemens = conductance[i] = 1 / e.Ohms.Value(theta);
            Add(e.From, e.From, siemens);
            Add(e.To, e.To, siemens);
            Add(e.From, e.To, -siemens);
            Add(e.To, e.From, -siemens);
        }

        foreach (ref readonly var e in network.Voltages.AsSpan())
        {
            Add(e.Plus, e.Row, 1);
            Add(e.Minus, e.Row, -1);
            Add(e.Row, e.Plus, 1);
            Add(e.Row, e.Minus, -1);
            Add(e.Row, e.Row, -e.Ohms.Value(theta));
            b[e.Row] += e.Emf.Value(theta);
            if (e.Control == Network.ControlKind.None) continue;
            var gain = e.Gain.Value(theta);
            Add(e.Row, e.ControlPlus, -gain);
            Add(e.Row, e.ControlMinus, gain);
        }

        foreach (ref readonly var e in network.Currents.AsSpan())
        {
            var amperes = e.Amperes.Value(theta);
            if (e.From >= 0) b[e.From] -= amperes;
            if (e.To >= 0) b[e.To] += amperes;
            if (e.Control == Network.ControlKind.None) continue;
            var gain = e.Gain.Value(theta);
            Add(e.From, e.ControlPlus, gain);
            Add(e.From, e.ControlMinus, -gain);
            Add(e.To, e.ControlPlus, -gain);
            Add(e.To, e.ControlMinus, gain);
        }

        foreach (ref readonly var e in network.Amplifiers.AsSpan())
        {
            Add(e.Output, e.Row, 1);
            Add(e.Row, e.Plus, 1);
            Add(e.Row, e.Minus, -1);
            Add(e.Row, e.Output, -1 / (e.Gain.IsConstantZero ? IdealGain : e.Gain.Value(theta)));
            b[e.Row] -= e.Offset.Value(theta);
        }
    }

    /// <summary>A⁻¹ times the column of C that belongs to a port.</summary>
    private void Respond(int k)
    {
        ref readonly var port = ref network.Ports[k];
        var column = response.AsSpan(k * n, n);
        if (port.Row >= 0)
        {
            for (var i = 0; i < n; i++) column[i] = port.RowSign * Inverse(i, port.Row);
            return;
        }

        var through = 1 / port.Gain.Value(theta);
        for (var i = 0; i < n; i++)
        {
            column[i] = through * (Inverse(i, port.High) - Inverse(i, port.Low)) + Inverse(i, port.TransportFrom) - Inverse(i, port.TransportTo);
        }
    }

    private void Add(int row, int column, double value)
    {
        if (row >= 0 && column >= 0) a[row * n + column] += value;
    }

    private static double Across(ReadOnlySpan<double> values, int high, int low) => (high < 0 ? 0 : values[high]) - (low < 0 ? 0 : values[low]);

    private void Grow()
    {
        var size = Math.Max(n, x.Length);
        var count = Math.Max(ports, z.Length);
        a = new double[size * size];
        inverse = new double[size * size];
        pivot = new int[size];
        open = new double[size];
        x = new double[size];
        at = new double[size];
        lambda = new double[size];
        response = new double[size * count];
        impedance = new double[count * count];
        loadedImpedance = new double[count * count];
        tangent = new double[count * count];
        loadedTangent = new double[count * count];
        openVolts = new double[count];
        loadedOpen = new double[count];
        drops = new double[count];
        z = new double[count];
        loadedZ = new double[count];
        reach = new double[count];
        seen = new double[count];
        yielding = new double[count];
        mu = new double[count];
        slope = new double[count];
        loadedSlope = new double[count];
        tangentPivot = new int[count];
        loadedPivot = new int[count];
        isLive = new bool[count];
        curves = new JunctionCurve[count];
        corners = new bool[count];
    }
}
