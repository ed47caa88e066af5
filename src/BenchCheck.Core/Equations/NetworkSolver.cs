using BenchCheck.Core.Boards;

namespace BenchCheck.Core.Equations;

/// <summary>Solves a compiled network for given parameters, predicts what meters show, and differentiates that by the adjoint method.</summary>
/// <remarks>
/// <para>
/// One factorisation of A serves everything: x = A⁻¹ (b − C z), the ports' view v = D A⁻¹ b − (D A⁻¹ C) z, the loading of a meter
/// (with g its conductance and r = cᵀ A⁻¹ c the Thevenin resistance it meets, a rank-one change of the ports' view), and the adjoints.
/// </para>
/// <para>
/// With reading y = cᵀ x, the adjoint (λ, μ) satisfies Aᵀ λ + g c cᵀ λ + Dᵀ μ = c, Cᵀ λ = S μ, S the slopes of the live ports; the derivatives are
/// those of <see cref="AdjointTerms"/>. Source: Director and Rohrer, IEEE Trans. Circuit Theory CT-16 (1969).
/// </para>
/// <para>Owns its buffers and allocates only when a larger network than any before arrives. Not for use by two threads at once.</para>
/// </remarks>
public sealed class NetworkSolver
{
    /// <summary>How far a tangent may miss a junction's curve, in volts, for a loaded reading to be taken from the tangents of the unloaded state.</summary>
    private const double TangentVolts = 1e-8;

    private readonly JunctionLaw law;
    private readonly LinearNetwork linear = new();
    private readonly PortSolver portSolver = new();
    private readonly PortTangent tangent = new();
    private readonly PortTangent loadedTangent = new();
    private Network network = null!;
    private double[] x = [];
    private double[] at = [];
    private double[] lambda = [];
    private double[] loadedView = [];
    private double[] loadedOpen = [];
    private double[] drops = [];
    private double[] seriesOhms = [];
    private double[] z = [];
    private double[] loadedZ = [];
    private double[] reach = [];
    private double[] seen = [];
    private double[] yielding = [];
    private double[] mu = [];
    private double[] slope = [];
    private double[] loadedSlope = [];
    private JunctionCurve[] curves = [];
    private PortLaw[] laws = [];
    private bool[] isLive = [];
    private int n;
    private int ports;

    public NetworkSolver(JunctionLaw law) => this.law = law;

    /// <summary>Workspace for small changes around what this one has solved.</summary>
    internal SmallSignal.SmallSignalSolver SmallSignals { get; } = new();

    /// <summary>Node voltages and branch currents of the last solution, without any meter.</summary>
    public ReadOnlySpan<double> Unknowns => x.AsSpan(0, n);

    /// <summary>Port currents of the last solution, without any meter: the devices' first.</summary>
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
        if (!linear.TryFactor(seriesOhms.AsSpan(0, net.Ports.Length))) throw Singular();
        if (start.Length == ports) start.CopyTo(z);
        else z.AsSpan(0, ports).Clear();
        if (!portSolver.TrySolve(linear.OpenVolts, linear.View, curves, drops, z.AsSpan(0, ports)))
            throw new NoOperatingStateException($"no state of the devices satisfies the equations in condition \"{net.Condition.Name}\"");

        linear.Open.CopyTo(x);
        AddPorts(x, z);
        portSolver.Slope.CopyTo(slope);
        portSolver.IsLive.CopyTo(isLive);
        if (!tangent.TryFactor(linear.View, portSolver.Slope, portSolver.IsLive)) throw Singular();
    }

    /// <summary>What a meter shows on the network last solved, and its derivatives.</summary>
    /// <param name="gradient">receives ∂y/∂θ in SI units, one entry a parameter; empty when not wanted</param>
    /// <exception cref="NoOperatingStateException">the devices find no state with the meter connected</exception>
    public double Read(in Measurement m, Span<double> gradient)
    {
        var reading = LinearNetwork.Across(x, m.High, m.Low);
        var load = m.LoadSiemens;
        var isConnected = load != 0 || m.TestAmperes != 0;
        if (!isConnected && gradient.IsEmpty) return reading;

        var thevenin = linear.Transfer(m.High, m.Low, m.High, m.Low);
        for (var k = 0; k < ports; k++)
        {
            reach[k] = linear.Transfer(linear.High(k), linear.Low(k), m.High, m.Low);
            seen[k] = LinearNetwork.Across(linear.Response(k), m.High, m.Low);
            yielding[k] = isLive[k] ? reach[k] : 0;
        }

        // With every device on its tangent the board is linear: the meter meets one resistance and draws one current.
        tangent.Solve(yielding);
        var effective = thevenin - LuFactor.Dot(seen.AsSpan(0, ports), yielding.AsSpan(0, ports));
        var volts = (reading + m.TestAmperes * effective) / (1 + load * effective);
        var meterAmperes = load * volts - m.TestAmperes;
        var factor = tangent;
        ReadOnlySpan<bool> live = isLive.AsSpan(0, ports);
        var share = 1 / (1 + load * effective);
        if (!isConnected || StaysOnTangents(meterAmperes))
        {
            for (var k = 0; k < ports; k++) loadedZ[k] = z[k] - meterAmperes * yielding[k];
            if (isConnected && !gradient.IsEmpty && ports > 0)
            {
                // The reading is that of the tangents; its derivatives are those of the slopes where the meter has moved the devices to.
                for (var k = 0; k < ports; k++) loadedSlope[k] = laws[k] == PortLaw.Junction ? curves[k].SlopeOhms(loadedZ[k]) : slope[k];
                share = 1 / (1 + load * thevenin);
                LoadView(m, share);
                factor = FactorLoaded(loadedSlope.AsSpan(0, ports), live);
            }
        }
        else
        {
            volts = SolveLoaded(m, thevenin);
            meterAmperes = load * volts - m.TestAmperes;
            factor = loadedTangent;
            live = portSolver.IsLive;
            share = 1 / (1 + load * thevenin);
        }

        var scale = m.TestAmperes == 0 ? 1 : 1 / m.TestAmperes;
        if (gradient.IsEmpty) return volts * scale;

        // (view + S)ᵀ μ = h · share, then λ = α A⁻ᵀ c − Σ μ A⁻ᵀ d.
        for (var k = 0; k < ports; k++) mu[k] = live[k] ? seen[k] * share : 0;
        factor.SolveTransposed(mu);
        var alpha = (1 + load * LuFactor.Dot(mu.AsSpan(0, ports), reach.AsSpan(0, ports))) / (1 + load * thevenin);
        AdjointOf(m, alpha);
        SolutionWith(m, meterAmperes);
        gradient.Clear();
        new AdjointTerms(linear, laws, curves, gradient).Add(lambda, mu, at, loadedZ, scale);
        return volts * scale;
    }

    /// <summary>Adds Σ wₖ ∂zₖ/∂θ, the derivatives of the port currents of the last solution without any meter.</summary>
    /// <param name="weights">w, one a port</param>
    /// <param name="gradient">one entry a parameter; added to</param>
    public void AddPortGradient(ReadOnlySpan<double> weights, Span<double> gradient)
    {
        // Aᵀ λ + Dᵀ μ = 0, Cᵀ λ = w + S μ, so (D A⁻¹ C + S)ᵀ μ = −w.
        for (var k = 0; k < ports; k++) mu[k] = isLive[k] ? -weights[k] : 0;
        tangent.SolveTransposed(mu);
        AdjointOf(new Measurement(-1, -1), 0);
        new AdjointTerms(linear, laws, curves, gradient).Add(lambda, mu, x, z, 1);
    }

    /// <summary>Resistance between two unknowns on the network last solved, sources dead, every port at its slope.</summary>
    /// <param name="low">−1 for the reference</param>
    public double TheveninOhms(int high, int low = -1)
    {
        for (var k = 0; k < ports; k++)
        {
            yielding[k] = isLive[k] ? linear.Transfer(linear.High(k), linear.Low(k), high, low) : 0;
            seen[k] = LinearNetwork.Across(linear.Response(k), high, low);
        }

        tangent.Solve(yielding);
        return linear.Transfer(high, low, high, low) - LuFactor.Dot(seen.AsSpan(0, ports), yielding.AsSpan(0, ports));
    }

    private NoOperatingStateException Singular() => new($"the equations in condition \"{network.Condition.Name}\" have no unique solution");

    /// <summary>True when the meter's current moves no device off its tangent, or over a corner, by more than a hair.</summary>
    private bool StaysOnTangents(double meterAmperes)
    {
        for (var k = 0; k < ports; k++)
        {
            if (laws[k] == PortLaw.Line) continue;
            if (laws[k] != PortLaw.Junction)
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
        var openReading = LinearNetwork.Across(linear.Open, m.High, m.Low);
        LoadView(m, share);
        for (var k = 0; k < ports; k++) loadedOpen[k] = linear.OpenVolts[k] - reach[k] * (m.LoadSiemens * share * openReading - m.TestAmperes);

        var loaded = loadedZ.AsSpan(0, ports);
        z.AsSpan(0, ports).CopyTo(loaded);
        if (!portSolver.TrySolve(loadedOpen.AsSpan(0, ports), loadedView.AsSpan(0, ports * ports), curves, drops, loaded))
            throw new NoOperatingStateException($"no state of the devices satisfies the equations with the meter connected in condition \"{network.Condition.Name}\"");
        FactorLoaded(portSolver.Slope, portSolver.IsLive);
        return (openReading + m.TestAmperes * thevenin - LuFactor.Dot(seen.AsSpan(0, ports), loaded)) * share;
    }

    /// <summary>The ports' view with the meter's conductance across its leads: a change of rank one.</summary>
    private void LoadView(in Measurement m, double share)
    {
        linear.View.CopyTo(loadedView);
        for (var k = 0; k < ports; k++) LuFactor.AddScaled(loadedView.AsSpan(k * ports, ports), seen.AsSpan(0, ports), -reach[k] * m.LoadSiemens * share);
    }

    private PortTangent FactorLoaded(ReadOnlySpan<double> slopes, ReadOnlySpan<bool> live) =>
        loadedTangent.TryFactor(loadedView.AsSpan(0, ports * ports), slopes, live) ? loadedTangent : throw Singular();

    private void AdjointOf(in Measurement m, double alpha)
    {
        var adjoint = lambda.AsSpan(0, n);
        adjoint.Clear();
        AddRow(adjoint, m.High, alpha);
        AddRow(adjoint, m.Low, -alpha);
        for (var k = 0; k < ports; k++)
        {
            if (mu[k] == 0) continue;
            AddRow(adjoint, linear.High(k), -mu[k]);
            AddRow(adjoint, linear.Low(k), mu[k]);
        }
    }

    /// <summary>The unknowns with the meter connected.</summary>
    private void SolutionWith(in Measurement m, double meterAmperes)
    {
        linear.Open.CopyTo(at);
        AddPorts(at, loadedZ);
        if (meterAmperes == 0) return;
        for (var i = 0; i < n; i++) at[i] -= meterAmperes * (linear.Inverse(i, m.High) - linear.Inverse(i, m.Low));
    }

    /// <summary>What the ports' currents add to the unknowns.</summary>
    private void AddPorts(double[] unknowns, double[] currents)
    {
        for (var k = 0; k < ports; k++)
        {
            if (currents[k] != 0) LuFactor.AddScaled(unknowns.AsSpan(0, n), linear.Response(k), -currents[k]);
        }
    }

    private void AddRow(Span<double> sum, int row, double factor)
    {
        if (row >= 0) LuFactor.AddScaled(sum, linear.InverseRow(row), factor);
    }

    private void Adopt(Network net, ReadOnlySpan<double> parameters)
    {
        (network, n, ports) = (net, net.Size, net.PortCount);
        if (x.Length < n || z.Length < ports) Grow();
        linear.Adopt(net, parameters);
        for (var k = 0; k < net.Ports.Length; k++)
        {
            ref readonly var port = ref net.Ports[k];
            laws[k] = port.Row >= 0 ? PortLaw.Limit : law == JunctionLaw.ConstantDrop || port.IsStraight ? PortLaw.Corner : PortLaw.Junction;
            seriesOhms[k] = port.HasSeries(laws[k]) ? port.SeriesOhms.Value(linear.Theta) : 0;
            drops[k] = port.Drop.Value(linear.Theta);
            if (laws[k] != PortLaw.Junction) drops[k] += port.Excess.Value(linear.Theta);
            if (!port.IsStraight) curves[k] = new JunctionCurve(drops[k], port.ReferenceAmperes, port.Ideality.Value(linear.Theta) * net.ThermalVolts);
        }

        laws.AsSpan(net.Ports.Length, net.Props.Length).Fill(PortLaw.Line);
        portSolver.Begin(net, laws.AsSpan(0, ports));
    }

    private void Grow()
    {
        var size = Math.Max(n, x.Length);
        var count = Math.Max(ports, z.Length);
        x = new double[size];
        at = new double[size];
        lambda = new double[size];
        loadedView = new double[count * count];
        loadedOpen = new double[count];
        drops = new double[count];
        seriesOhms = new double[count];
        z = new double[count];
        loadedZ = new double[count];
        reach = new double[count];
        seen = new double[count];
        yielding = new double[count];
        mu = new double[count];
        slope = new double[count];
        loadedSlope = new double[count];
        isLive = new bool[count];
        curves = new JunctionCurve[count];
        laws = new PortLaw[count];
    }
}
