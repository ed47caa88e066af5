namespace BenchCheck.Core.Equations;

/// <summary>A compiled network without its devices, factored for one parameter vector: what its ports and its meters meet.</summary>
/// <remarks>
/// With A x + C z = b: x at open ports A⁻¹ b, the responses A⁻¹ C, and the ports' view v = D A⁻¹ b − (D A⁻¹ C) z. Shapes: n unknowns, p ports, A⁻¹
/// n×n and D A⁻¹ C p×p row-major. Owns its buffers and allocates only when a larger network than any before arrives.
/// </remarks>
internal sealed class LinearNetwork
{
    private double[] a = [];
    private double[] inverse = [];
    private int[] pivot = [];
    private double[] open = [];
    private double[] response = [];
    private double[] view = [];
    private double[] openVolts = [];
    private double[] conductance = [];
    private double[] theta = [];
    private int[] high = [];
    private int[] low = [];

    public Network Network { get; private set; } = null!;

    public int Size { get; private set; }

    public int Ports { get; private set; }

    /// <summary>θ, in SI units.</summary>
    public ReadOnlySpan<double> Theta => theta;

    /// <summary>x at open ports.</summary>
    public ReadOnlySpan<double> Open => open.AsSpan(0, Size);

    /// <summary>Voltages of the open ports.</summary>
    public ReadOnlySpan<double> OpenVolts => openVolts.AsSpan(0, Ports);

    /// <summary>D A⁻¹ C, with what a port has in series on the diagonal.</summary>
    public ReadOnlySpan<double> View => view.AsSpan(0, Ports * Ports);

    /// <summary>Conductance of each conductor of the network.</summary>
    public ReadOnlySpan<double> Conductances => conductance;

    public int High(int port) => high[port];

    public int Low(int port) => low[port];

    /// <summary>One entry of A⁻¹; an index of −1, the reference, gives zero.</summary>
    public double Inverse(int row, int column) => row < 0 || column < 0 ? 0 : inverse[row * Size + column];

    /// <summary>A row of A⁻¹.</summary>
    public ReadOnlySpan<double> InverseRow(int row) => inverse.AsSpan(row * Size, Size);

    /// <summary>dᵀ A⁻¹ c with d and c differences of two unknowns.</summary>
    public double Transfer(int high, int low, int into, int outOf) =>
        Inverse(high, into) - Inverse(high, outOf) - Inverse(low, into) + Inverse(low, outOf);

    /// <summary>A⁻¹ times the column of C that belongs to a port.</summary>
    public ReadOnlySpan<double> Response(int port) => response.AsSpan(port * Size, Size);

    /// <summary>Difference of two unknowns; −1 is the reference.</summary>
    public static double Across(ReadOnlySpan<double> values, int high, int low) => (high < 0 ? 0 : values[high]) - (low < 0 ? 0 : values[low]);

    /// <summary>Takes a network and its parameters; to be called before <see cref="TryFactor"/>.</summary>
    public void Adopt(Network network, ReadOnlySpan<double> parameters)
    {
        if (theta.Length != parameters.Length) theta = new double[parameters.Length];
        parameters.CopyTo(theta);
        (Network, Size, Ports) = (network, network.Size, network.PortCount);
        if (open.Length < Size || openVolts.Length < Ports) Grow();
        if (conductance.Length < network.Conductors.Length) conductance = new double[network.Conductors.Length];
        var devices = network.Ports.Length;
        for (var k = 0; k < Ports; k++)
            (high[k], low[k]) = k < devices ? (network.Ports[k].High, network.Ports[k].Low) : (network.Props[k - devices].High, network.Props[k - devices].Low);
    }

    /// <param name="seriesOhms">of each port of a device, beside its law</param>
    /// <returns>false when the equations are singular</returns>
    public bool TryFactor(ReadOnlySpan<double> seriesOhms)
    {
        var (n, ports) = (Size, Ports);
        Stamp();
        if (!LuFactor.Factor(a.AsSpan(0, n * n), n, pivot)) return false;
        LuFactor.Invert(a, n, pivot, inverse);
        LuFactor.Solve(a, n, pivot, open.AsSpan(0, n));
        for (var k = 0; k < ports; k++) Respond(k);
        for (var k = 0; k < ports; k++)
        {
            openVolts[k] = Across(Open, high[k], low[k]);
            for (var l = 0; l < ports; l++) view[k * ports + l] = Across(Response(l), high[k], low[k]);
            if (k < seriesOhms.Length) view[k * ports + k] += seriesOhms[k];
        }

        return true;
    }

    private void Stamp()
    {
        a.AsSpan(0, Size * Size).Clear();
        var b = open.AsSpan(0, Size);
        b.Clear();
        foreach (ref readonly var e in Network.Ties.AsSpan()) Conduct(e.From, e.To, e.Siemens);
        for (var i = 0; i < Network.Conductors.Length; i++)
        {
            ref readonly var e = ref Network.Conductors[i];
            Conduct(e.From, e.To, conductance[i] = 1 / e.Ohms.Value(theta));
        }

        foreach (ref readonly var e in Network.Voltages.AsSpan())
        {
            Add(e.Plus, e.Row, 1);
            Add(e.Minus, e.Row, -1);
            AddDifference(e.Row, e.Plus, e.Minus, 1);
            Add(e.Row, e.Row, -e.Ohms.Value(theta));
            b[e.Row] += e.Emf.Value(theta);
            if (e.Control != Network.ControlKind.None) AddDifference(e.Row, e.ControlPlus, e.ControlMinus, -e.Gain.Value(theta));
        }

        foreach (ref readonly var e in Network.Currents.AsSpan())
        {
            var amperes = e.Amperes.Value(theta);
            if (e.From >= 0) b[e.From] -= amperes;
            if (e.To >= 0) b[e.To] += amperes;
            if (e.Control == Network.ControlKind.None) continue;
            var gain = e.Gain.Value(theta);
            AddDifference(e.From, e.ControlPlus, e.ControlMinus, gain);
            AddDifference(e.To, e.ControlPlus, e.ControlMinus, -gain);
        }

        foreach (ref readonly var e in Network.Amplifiers.AsSpan())
        {
            Add(e.Output, e.Row, 1);
            AddDifference(e.Row, e.Plus, e.Minus, 1);
            Add(e.Row, e.Output, -Network.PropInverseGain - 1 / (e.Gain.IsConstantZero ? Network.IdealGain : e.Gain.Value(theta)));
            b[e.Row] -= e.Offset.Value(theta);
        }
    }

    private void Respond(int k)
    {
        var devices = Network.Ports.Length;
        var column = response.AsSpan(k * Size, Size);
        if (k >= devices)
        {
            ref readonly var prop = ref Network.Props[k - devices];
            for (var i = 0; i < Size; i++) column[i] = prop.Row >= 0 ? Inverse(i, prop.Row) : Inverse(i, prop.High) - Inverse(i, prop.Low);
            return;
        }

        ref readonly var port = ref Network.Ports[k];
        if (port.Row >= 0)
        {
            for (var i = 0; i < Size; i++) column[i] = port.RowSign * Inverse(i, port.Row);
            return;
        }

        var through = 1 / port.Gain.Value(theta);
        for (var i = 0; i < Size; i++)
            column[i] = through * (Inverse(i, port.High) - Inverse(i, port.Low)) + Inverse(i, port.TransportFrom) - Inverse(i, port.TransportTo);
    }

    private void Conduct(int from, int to, double siemens)
    {
        AddDifference(from, from, to, siemens);
        AddDifference(to, to, from, siemens);
    }

    private void AddDifference(int row, int plus, int minus, double value)
    {
        Add(row, plus, value);
        Add(row, minus, -value);
    }

    private void Add(int row, int column, double value)
    {
        if (row >= 0 && column >= 0) a[row * Size + column] += value;
    }

    private void Grow()
    {
        var size = Math.Max(Size, open.Length);
        var count = Math.Max(Ports, openVolts.Length);
        a = new double[size * size];
        inverse = new double[size * size];
        pivot = new int[size];
        open = new double[size];
        response = new double[size * count];
        view = new double[count * count];
        openVolts = new double[count];
        high = new int[count];
        low = new int[count];
    }
}
