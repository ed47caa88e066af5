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

    private readonly JunctionLaw law;
    private readonly PortSolver portSolver = new();
    private Network network = null!;
    private double[] a = [];
    private int[] pivot = [];
    private double[] open = [];
    private double[] response = [];
    private double[] adjoint = [];
    private double[] x = [];
    private double[] xc = [];
    private double[] lc = [];
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
    private double[] mu = [];
    private double[] transposed = [];
    private int[] smallPivot = [];
    private JunctionCurve[] curves = [];
    private bool[] corners = [];
    private double[] theta = [];
    private bool adjointsReady;
    private int n;
    private int ports;

    public NetworkSolver(JunctionLaw law) => this.law = law;

    /// <summary>Node voltages and branch currents of the last solution, without any meter.</summary>
    public ReadOnlySpan<double> Unknowns => x.AsSpan(0, n);

    /// <summary>Port currents of the last solution, without any meter.</summary>
    public ReadOnlySpan<double> PortCurrents => z.AsSpan(0, ports);

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
        LuFactor.Solve(a, n, pivot, open.AsSpan(0, n));
        for (var k = 0; k < ports; k++)
        {
            var column = response.AsSpan(k * n, n);
            column.Clear();
            AddPortColumn(k, column, 1);
            LuFactor.Solve(a, n, pivot, column);
        }

        for (var k = 0; k < ports; k++)
        {
            ref readonly var port = ref net.Ports[k];
            openVolts[k] = Across(open, port.High, port.Low);
            for (var l = 0; l < ports; l++) impedance[k * ports + l] = Across(response.AsSpan(l * n, n), port.High, port.Low);
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

        adjointsReady = false;
    }

    /// <summary>What a meter shows on the network last solved, and its derivatives.</summary>
    /// <param name="gradient">receives ∂y/∂θ in SI units, one entry a parameter; empty when not wanted</param>
    /// <exception cref="NoOperatingStateException">the devices find no state with the meter connected</exception>
    public double Read(in Measurement m, Span<double> gradient)
    {
        var c = xc.AsSpan(0, n);
        c.Clear();
        if (m.High >= 0) c[m.High] = 1;
        if (m.Low >= 0) c[m.Low] = -1;
        if (m.LoadSiemens == 0 && m.TestAmperes == 0 && gradient.IsEmpty) return Across(x, m.High, m.Low);

        LuFactor.Solve(a, n, pivot, c);
        var thevenin = Across(c, m.High, m.Low);
        var load = m.LoadSiemens;
        var share = 1 / (1 + load * thevenin);
        for (var k = 0; k < ports; k++)
        {
            ref readonly var port = ref network.Ports[k];
            reach[k] = Across(c, port.High, port.Low);
            seen[k] = Across(response.AsSpan(k * n, n), m.High, m.Low);
        }

        // With the meter connected the ports see another source and another impedance.
        var openReading = Across(open, m.High, m.Low);
        var loaded = z.AsSpan(0, ports);
        var view = impedance.AsSpan(0, ports * ports);
        if (load != 0 || m.TestAmperes != 0)
        {
            loaded = loadedZ.AsSpan(0, ports);
            view = loadedImpedance.AsSpan(0, ports * ports);
            for (var k = 0; k < ports; k++)
            {
                loadedOpen[k] = openVolts[k] - reach[k] * (load * share * openReading - m.TestAmperes);
                for (var l = 0; l < ports; l++) view[k * ports + l] = impedance[k * ports + l] - reach[k] * load * share * seen[l];
            }

            z.AsSpan(0, ports).CopyTo(loaded);
            if (!portSolver.TrySolve(loadedOpen.AsSpan(0, ports), view, curves, drops, loaded))
                throw new NoOperatingStateException($"no state of the devices satisfies the equations with the meter connected in condition \"{network.Condition.Name}\"");
        }

        var unloaded = openReading + m.TestAmperes * thevenin;
        for (var k = 0; k < ports; k++) unloaded -= seen[k] * loaded[k];
        var volts = unloaded * share;
        var scale = m.TestAmperes == 0 ? 1 : 1 / m.TestAmperes;
        if (!gradient.IsEmpty) Differentiate(m, loaded, view, volts, share, scale, gradient);
        return volts * scale;
    }

    /// <summary>Resistance between an unknown and the reference on the network last solved, every port at its slope.</summary>
    public double TheveninOhms(int unknown)
    {
        Read(new Measurement(unknown, -1), new double[Math.Max(1, theta.Length)]);
        // The adjoint of the reading itself: λ at the node is the voltage there for one ampere into it.
        return lambda[unknown];
    }

    private void Differentiate(
        in Measurement m, ReadOnlySpan<double> loaded, ReadOnlySpan<double> view, double volts, double share, double scale, Span<double> gradient)
    {
        PrepareAdjoints();
        if (m.LoadSiemens == 0 && m.TestAmperes == 0 && ports > 0)
        {
            // Slopes at the unloaded solution: the last search may have been that of a loaded reading.
            portSolver.TrySolve(openVolts.AsSpan(0, ports), impedance.AsSpan(0, ports * ports), curves, drops, z.AsSpan(0, ports));
        }

        var l = lc.AsSpan(0, n);
        l.Clear();
        if (m.High >= 0) l[m.High] = 1;
        if (m.Low >= 0) l[m.Low] = -1;
        LuFactor.SolveTransposed(a, n, pivot, l);

        for (var k = 0; k < ports; k++)
        {
            for (var j = 0; j < ports; j++)
            {
                transposed[k * ports + j] = portSolver.IsLive[k] && portSolver.IsLive[j] ? view[j * ports + k] : 0;
            }

            transposed[k * ports + k] = portSolver.IsLive[k] ? transposed[k * ports + k] + portSolver.Slope[k] : 1;
            mu[k] = portSolver.IsLive[k] ? seen[k] * share : 0;
        }

        if (ports > 0)
        {
            LuFactor.Factor(transposed.AsSpan(0, ports * ports), ports, smallPivot);
            LuFactor.Solve(transposed, ports, smallPivot, mu.AsSpan(0, ports));
        }

        var alpha = share;
        for (var k = 0; k < ports; k++) alpha += m.LoadSiemens * share * mu[k] * reach[k];
        var adj = lambda.AsSpan(0, n);
        for (var i = 0; i < n; i++) adj[i] = alpha * l[i];
        for (var k = 0; k < ports; k++)
        {
            if (mu[k] != 0) LuFactor.AddScaled(adj, adjoint.AsSpan(k * n, n), -mu[k]);
        }

        // The solution with the meter connected; the reading's own response is no longer needed, so its buffer takes it.
        var meterAmperes = m.LoadSiemens * volts - m.TestAmperes;
        var at = xc.AsSpan(0, n);
        for (var i = 0; i < n; i++) at[i] = open[i] - meterAmperes * at[i];
        for (var k = 0; k < ports; k++)
        {
            if (loaded[k] != 0) LuFactor.AddScaled(at, response.AsSpan(k * n, n), -loaded[k]);
        }

        gradient.Clear();
        Accumulate(adj, at, loaded, scale, gradient);
    }

    /// <summary>∂y/∂θ from the adjoint λ, the solution x and the port currents: one term a coefficient.</summary>
    private void Accumulate(ReadOnlySpan<double> adj, ReadOnlySpan<double> at, ReadOnlySpan<double> loaded, double scale, Span<double> gradient)
    {
        foreach (ref readonly var e in network.Conductors.AsSpan())
        {
            var ohms = e.Ohms.Value(theta);
            AddTerm(e.Ohms, scale * Across(adj, e.From, e.To) * Across(at, e.From, e.To) / (ohms * ohms), gradient);
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
            AddTerm(e.Drop, scale * mu[k], gradient);
            if (law == JunctionLaw.ConstantDrop || e.Role is null) AddTerm(e.Excess, scale * mu[k], gradient);
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

    private void PrepareAdjoints()
    {
        if (adjointsReady) return;
        for (var k = 0; k < ports; k++)
        {
            var row = adjoint.AsSpan(k * n, n);
            row.Clear();
            ref readonly var port = ref network.Ports[k];
            if (port.High >= 0) row[port.High] = 1;
            if (port.Low >= 0) row[port.Low] -= 1;
            LuFactor.SolveTransposed(a, n, pivot, row);
        }

        adjointsReady = true;
    }

    private void Adopt(Network net, ReadOnlySpan<double> parameters)
    {
        if (theta.Length != parameters.Length) theta = new double[parameters.Length];
        parameters.CopyTo(theta);
        network = net;
        n = net.Size;
        ports = net.PortCount;
        if (x.Length < n || z.Length < ports || response.Length < n * ports) Grow();
        for (var k = 0; k < ports; k++)
        {
            ref readonly var port = ref net.Ports[k];
            corners[k] = law == JunctionLaw.ConstantDrop || port.Ideality == 0;
            drops[k] = port.Drop.Value(theta);
            if (corners[k]) drops[k] += port.Excess.Value(theta);
            else curves[k] = new JunctionCurve(drops[k], port.ReferenceAmperes, port.Ideality * net.ThermalVolts);
        }

        portSolver.Begin(corners.AsSpan(0, ports));
    }

    private void Stamp()
    {
        a.AsSpan(0, n * n).Clear();
        var b = open.AsSpan(0, n);
        b.Clear();
        foreach (var node in network.Leaks) a[node * n + node] += Network.LeakageSiemens;
        foreach (ref readonly var e in network.Conductors.AsSpan())
        {
            var siemens = 1 / e.Ohms.Value(theta);
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

    /// <summary>Adds factor times the column of C that belongs to a port.</summary>
    private void AddPortColumn(int k, Span<double> column, double factor)
    {
        ref readonly var port = ref network.Ports[k];
        if (port.Row >= 0)
        {
            column[port.Row] += factor * port.RowSign;
            return;
        }

        var through = factor / port.Gain.Value(theta);
        if (port.High >= 0) column[port.High] += through;
        if (port.Low >= 0) column[port.Low] -= through;
        if (port.TransportFrom >= 0) column[port.TransportFrom] += factor;
        if (port.TransportTo >= 0) column[port.TransportTo] -= factor;
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
        pivot = new int[size];
        open = new double[size];
        x = new double[size];
        xc = new double[size];
        lc = new double[size];
        lambda = new double[size];
        response = new double[size * count];
        adjoint = new double[size * count];
        impedance = new double[count * count];
        loadedImpedance = new double[count * count];
        transposed = new double[count * count];
        openVolts = new double[count];
        loadedOpen = new double[count];
        drops = new double[count];
        z = new double[count];
        loadedZ = new double[count];
        reach = new double[count];
        seen = new double[count];
        mu = new double[count];
        smallPivot = new int[count];
        curves = new JunctionCurve[count];
        corners = new bool[count];
    }
}
