using System.Numerics;
using BenchCheck.Core.Boards;

namespace BenchCheck.Core.Equations.SmallSignal;

/// <summary>Solves a network for small changes around an operating state and differentiates what is read from it.</summary>
/// <remarks>
/// <para>
/// Sources are dead, every conducting junction is its tangent, transconductance t / (n V_T + R t) between its pins with t = z, under the junction
/// law t = z + I_s (for a transistor g_m = i_C/V_T and r_π = β/g_m; Gray, Hurst, Lewis and Meyer, Analysis and Design of Analog Integrated
/// Circuits, 1.4, from memory). The port currents of the tangents are unknowns beside those of the network: N = size + ports.
/// </para>
/// <para>
/// One factorisation serves every reading: with λ = A⁻ᵀ c and x = A⁻¹ d, T(c, d) = cᵀ x and ∂T/∂p = −λᵀ (∂A/∂p) x (Director and Rohrer 1969).
/// A complex matrix is kept as the real one [Re −Im; Im Re]; without a frequency the imaginary half is not there.
/// </para>
/// <para>Owns its buffers; not for use by two threads at once.</para>
/// </remarks>
public sealed class SmallSignalSolver
{
    /// <summary>Without a frequency, capacitors from here on are shorts and smaller ones open: common practice, no source.</summary>
    public const double ShortFarads = 100e-9;

    /// <summary>Without a frequency, inductors from here on are open to the signal and smaller ones their winding: common practice, no source.</summary>
    public const double OpenHenries = 1e-3;

    private const double ShortOhms = 1e-6;
    private const double OpenOhms = 1e13;

    /// <summary>A junction whose slope is as flat as this is off.</summary>
    private const double LeakageOhms = 0.99e13;

    /// <summary>Ties what nothing else ties to the reference.</summary>
    private const double TieSiemens = 1e-13;

    private const int Seen = 0;
    private const int Driven = 1;
    private const int Base = 2;

    private readonly Complex[][] right = [[], [], []];
    private readonly Complex[][] left = [[], [], []];
    private Network network = null!;
    private double[] theta = [];
    private double[] portCurrents = [];

    /// <summary>t, the current that sets the slope of a port; zero for one that is off.</summary>
    private double[] totals = [];

    private double[] matrix = [];
    private double[] work = [];
    private int[] pivot = [];
    private double? angular;
    private int size;
    private int unknowns;
    private int ports;

    /// <summary>Factors the equations of <paramref name="net"/>.</summary>
    /// <param name="net">compiled for small signals</param>
    /// <param name="parameters">θ, in SI units</param>
    /// <param name="currents">port currents of the operating state, one a port of the network</param>
    /// <param name="slopes">dv/dz of its ports by the junction law; empty where drops are constant</param>
    /// <param name="hertz">null when capacitors count as shorts</param>
    /// <exception cref="NoOperatingStateException">the equations are singular</exception>
    public void Solve(Network net, ReadOnlySpan<double> parameters, ReadOnlySpan<double> currents, ReadOnlySpan<double> slopes, double? hertz)
    {
        ArgumentNullException.ThrowIfNull(net);
        network = net;
        angular = 2 * Math.PI * hertz;
        ports = net.Ports.Length;
        size = net.Size;
        unknowns = size + ports;
        var order = unknowns * (angular is null ? 1 : 2);
        if (pivot.Length < order) Grow(order);
        if (theta.Length != parameters.Length) theta = new double[parameters.Length];
        if (portCurrents.Length < ports) (portCurrents, totals) = (new double[ports], new double[ports]);
        parameters.CopyTo(theta);
        currents[..ports].CopyTo(portCurrents);
        for (var k = 0; k < ports; k++) totals[k] = slopes.IsEmpty || net.Ports[k].IsStraight ? Math.Max(currents[k], 0) : slopes[k] >= LeakageOhms ? 0 : Thermal(net.Ports[k]) / slopes[k];
        matrix.AsSpan(0, order * order).Clear();
        Stamp();
        if (!LuFactor.Factor(matrix.AsSpan(0, order * order), order, pivot))
            throw new NoOperatingStateException($"the small-signal equations in condition \"{net.Condition.Name}\" have no unique solution");
    }

    /// <summary>What is read, and its derivatives.</summary>
    /// <param name="gradient">receives ∂y/∂θ at fixed port currents, one entry a parameter; empty when not wanted</param>
    /// <param name="byCurrent">receives ∂y/∂z, one entry a port</param>
    public double Read(in SmallSignalMeasurement m, Span<double> gradient, Span<double> byCurrent)
    {
        Prepare(m.Seen, Seen);
        Prepare(m.Driven, Driven);
        Prepare(m.Base, Base);
        var weights = new Weights();
        var value = m.IsImpedance ? Impedance(m, ref weights) : Transfer(m, ref weights);

        // Where no signal arrives at the node that a ratio is counted from, there is none to read.
        var magnitude = Complex.IsFinite(value) ? Complex.Abs(value) : 0;
        var shown = !m.IsMagnitude && value.Real < 0 ? -magnitude : magnitude;
        if (gradient.IsEmpty) return shown;
        gradient.Clear();
        byCurrent.Clear();
        if (magnitude == 0) return shown;

        // d|y| = Re(conj(y) dy) / |y|
        var phase = Complex.Conjugate(value) / shown;
        Accumulate(Seen, Driven, phase * weights.SeenDriven, gradient, byCurrent);
        Accumulate(Base, Driven, phase * weights.BaseDriven, gradient, byCurrent);
        Accumulate(Seen, Seen, phase * weights.SeenSeen, gradient, byCurrent);
        Accumulate(Base, Seen, phase * weights.BaseSeen, gradient, byCurrent);
        Accumulate(Driven, Seen, phase * weights.DrivenSeen, gradient, byCurrent);
        Accumulate(Driven, Driven, phase * weights.DrivenDriven, gradient, byCurrent);
        return shown;
    }

    private Complex Transfer(in SmallSignalMeasurement m, ref Weights w)
    {
        var (g, numerator) = (m.LoadSiemens, T(m.Seen, Driven));
        var (across, baseDriven, baseSeen) = (T(m.Seen, Seen), T(m.Base, Driven) + m.Ohms, T(m.Base, Seen));
        var loaded = 1 + g * across;
        var denominator = baseDriven * loaded - g * baseSeen * numerator;
        var square = denominator * denominator;
        w.SeenDriven = m.Scale * (1 / denominator + numerator * g * baseSeen / square);
        w.BaseDriven = -m.Scale * numerator * loaded / square;
        w.SeenSeen = -m.Scale * numerator * baseDriven * g / square;
        w.BaseSeen = m.Scale * numerator * numerator * g / square;
        return m.Scale * numerator / denominator;
    }

    private Complex Impedance(in SmallSignalMeasurement m, ref Weights w)
    {
        w.SeenSeen = 1;
        var open = T(m.Seen, Seen);
        if (m.Driven.IsNone) return open;
        var (there, back, closed) = (T(m.Seen, Driven), T(m.Driven, Seen), T(m.Driven, Driven) + m.Ohms);
        w.SeenDriven = -back / closed;
        w.DrivenSeen = -there / closed;
        w.DrivenDriven = there * back / (closed * closed);
        return open - there * back / closed;
    }

    /// <summary>T(c, d) with the response to d already solved for.</summary>
    private Complex T(Pair c, int d) => Across(right[d], c.High, c.Low);

    /// <summary>A⁻¹ c and A⁻ᵀ c.</summary>
    private void Prepare(Pair pair, int slot)
    {
        if (right[slot].Length < unknowns) (right[slot], left[slot]) = (new Complex[unknowns], new Complex[unknowns]);
        if (pair.IsNone)
        {
            right[slot].AsSpan(0, unknowns).Clear();
            left[slot].AsSpan(0, unknowns).Clear();
            return;
        }

        var order = unknowns * (angular is null ? 1 : 2);
        Unit(pair, order);
        LuFactor.Solve(matrix, order, pivot, work.AsSpan(0, order));
        for (var i = 0; i < unknowns; i++) right[slot][i] = new Complex(work[i], angular is null ? 0 : work[unknowns + i]);
        Unit(pair, order);
        LuFactor.SolveTransposed(matrix, order, pivot, work.AsSpan(0, order));

        // The transpose of the real form belongs to the conjugate transpose.
        for (var i = 0; i < unknowns; i++) left[slot][i] = new Complex(work[i], angular is null ? 0 : -work[unknowns + i]);
    }

    private void Unit(Pair pair, int order)
    {
        work.AsSpan(0, order).Clear();
        if (pair.High >= 0) work[pair.High] = 1;
        if (pair.Low >= 0) work[pair.Low] = -1;
    }

    private void Stamp()
    {
        foreach (ref readonly var e in network.Ties.AsSpan())
        {
            AddDifference(e.From, e.From, e.To, TieSiemens);
            AddDifference(e.To, e.To, e.From, TieSiemens);
        }

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
            AddBranch(e.Plus, e.Minus, e.Row);
            Add(e.Row, e.Row, -e.Ohms.Value(theta));
            if (e.Control == Network.ControlKind.None) continue;
            AddDifference(e.Row, e.ControlPlus, e.ControlMinus, -e.Gain.Value(theta));
        }

        foreach (ref readonly var e in network.Currents.AsSpan())
        {
            if (e.Control == Network.ControlKind.None) continue;
            var gain = e.Gain.Value(theta);
            AddDifference(e.From, e.ControlPlus, e.ControlMinus, gain);
            AddDifference(e.To, e.ControlPlus, e.ControlMinus, -gain);
        }

        foreach (ref readonly var e in network.Amplifiers.AsSpan())
        {
            Add(e.Output, e.Row, 1);
            AddDifference(e.Row, e.Plus, e.Minus, 1);
            Add(e.Row, e.Output, -1 / (e.Gain.IsConstantZero ? Network.IdealGain : e.Gain.Value(theta)));
        }

        foreach (ref readonly var e in network.Reactances.AsSpan())
        {
            AddBranch(e.From, e.To, e.Row);
            var z = Impedance(e);
            Add(e.Row, e.Row, -z.Real);
            AddImaginary(e.Row, e.Row, -z.Imaginary);
        }

        for (var k = 0; k < ports; k++) StampPort(k);
    }

    private void StampPort(int k)
    {
        ref readonly var e = ref network.Ports[k];
        var row = size + k;
        if (e.Row >= 0)
        {
            Add(e.Row, row, e.RowSign);
        }
        else
        {
            var through = 1 / e.Gain.Value(theta);
            Add(e.High, row, through);
            Add(e.Low, row, -through);
            Add(e.TransportFrom, row, 1);
            Add(e.TransportTo, row, -1);
        }

        if (totals[k] <= 0)
        {
            Add(row, row, 1);
        }
        else if (!e.Siemens.IsConstantZero)
        {
            AddDifference(row, e.High, e.Low, e.Siemens.Value(theta));
            Add(row, row, -1);
        }
        else if (!e.IsStraight)
        {
            AddDifference(row, e.High, e.Low, 1 / (Thermal(e) / totals[k] + e.SeriesOhms.Value(theta)));
            Add(row, row, -1);
        }
        else
        {
            AddDifference(row, e.High, e.Low, 1);
            Add(row, row, -e.SeriesOhms.Value(theta));
        }
    }

    private double Thermal(in Network.CompiledPort port) => port.Ideality.Value(theta) * network.ThermalVolts;

    private Complex Impedance(in Network.CompiledReactance e)
    {
        var (value, ohms) = (e.Value.Value(theta), e.Ohms.Value(theta));
        if (angular is { } w) return e.IsCapacitance ? new Complex(ohms, -1 / (w * value)) : new Complex(ohms, w * value);
        return (e.IsCapacitance ? value >= ShortFarads : value < OpenHenries) ? ohms + ShortOhms : OpenOhms;
    }

    /// <summary>Adds Re(weight · ∂T(left, right)/∂p) for every parameter and port current p.</summary>
    private void Accumulate(int c, int d, Complex weight, Span<double> gradient, Span<double> byCurrent)
    {
        if (weight == 0) return;
        var (l, x) = (left[c], right[d]);
        double Product(Complex adjoint, Complex solution) => (weight * adjoint * solution).Real;

        foreach (ref readonly var e in network.Conductors.AsSpan())
        {
            var ohms = e.Ohms.Value(theta);
            AddTerm(e.Ohms, Product(Across(l, e.From, e.To), Across(x, e.From, e.To)) / (ohms * ohms), gradient);
        }

        foreach (ref readonly var e in network.Voltages.AsSpan())
        {
            AddTerm(e.Ohms, Product(l[e.Row], x[e.Row]), gradient);
            if (e.Control != Network.ControlKind.None) AddTerm(e.Gain, Product(l[e.Row], Across(x, e.ControlPlus, e.ControlMinus)), gradient);
        }

        foreach (ref readonly var e in network.Currents.AsSpan())
        {
            if (e.Control != Network.ControlKind.None)
                AddTerm(e.Gain, -Product(Across(l, e.From, e.To), Across(x, e.ControlPlus, e.ControlMinus)), gradient);
        }

        foreach (ref readonly var e in network.Amplifiers.AsSpan())
        {
            if (e.Gain.IsConstantZero || e.Output < 0) continue;
            var gain = e.Gain.Value(theta);
            AddTerm(e.Gain, -Product(l[e.Row], x[e.Output]) / (gain * gain), gradient);
        }

        foreach (ref readonly var e in network.Reactances.AsSpan())
        {
            var flow = weight * l[e.Row] * x[e.Row];
            if (angular is { } w)
            {
                var value = e.Value.Value(theta);
                AddTerm(e.Value, (flow * (e.IsCapacitance ? new Complex(0, 1 / (w * value * value)) : new Complex(0, w))).Real, gradient);
            }

            AddTerm(e.Ohms, flow.Real, gradient);
        }

        for (var k = 0; k < ports; k++)
        {
            ref readonly var e = ref network.Ports[k];
            var row = size + k;
            if (e.Row >= 0 || totals[k] <= 0) continue;
            var gain = e.Gain.Value(theta);
            AddTerm(e.Gain, Product(Across(l, e.High, e.Low), x[row]) / (gain * gain), gradient);
            if (!e.Siemens.IsConstantZero)
            {
                AddTerm(e.Siemens, -Product(l[row], Across(x, e.High, e.Low)), gradient);
                continue;
            }

            if (e.IsStraight)
            {
                AddTerm(e.SeriesOhms, Product(l[row], x[row]), gradient);
                continue;
            }

            // g = t / (T + R t) with t = z + I_s; ln I_s falls with the drop by 1/T and rises with T by drop/T² (I_s zero: a constant drop).
            var (t, thermal) = (totals[k], Thermal(e));
            var saturation = t - portCurrents[k];
            var denominator = thermal + e.SeriesOhms.Value(theta) * t;
            var bySiemens = -Product(l[row], Across(x, e.High, e.Low)) / (denominator * denominator);
            byCurrent[k] += bySiemens * thermal;
            AddTerm(e.Drop, -bySiemens * saturation, gradient);
            AddTerm(e.Ideality, bySiemens * (saturation * e.Drop.Value(theta) / thermal - t) * network.ThermalVolts, gradient);
            AddTerm(e.SeriesOhms, -bySiemens * t * t, gradient);
        }
    }

    private void AddTerm(in Coefficient c, double weight, Span<double> gradient)
    {
        if (weight == 0 || c.Factor == 0) return;
        if (c.First >= 0) gradient[c.First] += weight * c.ByFirst(theta);
        if (c.Second >= 0) gradient[c.Second] += weight * c.BySecond(theta);
    }

    private void AddBranch(int plus, int minus, int row)
    {
        Add(plus, row, 1);
        Add(minus, row, -1);
        AddDifference(row, plus, minus, 1);
    }

    private void AddDifference(int row, int plus, int minus, double value)
    {
        Add(row, plus, value);
        Add(row, minus, -value);
    }

    private void Add(int row, int column, double value)
    {
        if (row < 0 || column < 0) return;
        var order = unknowns * (angular is null ? 1 : 2);
        matrix[row * order + column] += value;
        if (angular is not null) matrix[(unknowns + row) * order + unknowns + column] += value;
    }

    private void AddImaginary(int row, int column, double value)
    {
        if (angular is null || row < 0 || column < 0) return;
        var order = 2 * unknowns;
        matrix[row * order + unknowns + column] -= value;
        matrix[(unknowns + row) * order + column] += value;
    }

    private static Complex Across(Complex[] values, int high, int low) => (high < 0 ? 0 : values[high]) - (low < 0 ? 0 : values[low]);

    private void Grow(int order)
    {
        matrix = new double[order * order];
        work = new double[order];
        pivot = new int[order];
    }

    /// <summary>∂y/∂T of each transfer.</summary>
    private struct Weights
    {
        public Complex SeenDriven;
        public Complex BaseDriven;
        public Complex SeenSeen;
        public Complex BaseSeen;
        public Complex DrivenSeen;
        public Complex DrivenDriven;
    }
}
