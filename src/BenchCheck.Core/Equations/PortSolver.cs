namespace BenchCheck.Core.Equations;

/// <summary>
/// Finds the operating state: the port currents z at which every port obeys its law on the linear network seen from the ports,
/// v = v_open − Z z.
/// </summary>
/// <remarks>
/// <para>
/// Ports with a smooth law (junction law) are solved by Newton's method. Each tangent is laid at a point of the curve that keeps the new
/// current when it grows and the new voltage when it falls, so a junction can leave any state and no exponential overflows. Where that does not come to
/// rest it starts again from the state that the board would take if every junction conducted along one and the same tangent, or not at all, and at last
/// from where every junction has a resistance of its own, which then falls to nothing.
/// </para>
/// <para>
/// Ports with a corner (constant drop, output limit) form with these tangents a linear complementarity problem: w = drop − v ≥ 0, z ≥ 0, z w = 0.
/// A state in which an amplifier works between its limits although its feedback is positive is one that no board stays in; then, and where the
/// search fails, the combinations of limits are gone through one by one, an output at its upper limit first. A stated number of factorisations ends the search.
/// </para>
/// <para>Shapes: ports p; Z p×p row-major; all other spans p.</para>
/// </remarks>
internal sealed class PortSolver
{
    private const int NewtonSteps = 80;

    /// <summary>Steps that go the whole way whatever comes of them, and the least share of it that later ones go.</summary>
    private const int FreeSteps = 16;
    private const double LeastShare = 1.0 / 16;

    private const double VoltTolerance = 1e-10;

    /// <summary>Volts that a current is out of step by, in the stead of a voltage that hardly hangs on it.</summary>
    private const double OhmsOfMiss = 1e7;

    /// <summary>Slope given to every junction of the constant-drop law, so that junctions in parallel share and no state is ambiguous.</summary>
    private const double CornerOhms = 1e-5;

    /// <summary>Current below which a junction is taken to be off when the state of the junction law leads to that of the corners.</summary>
    private const double OffAmperes = 1e-7;

    /// <summary>Slope given to a limit, so that an output with its supplies crossed has a state, too: between them.</summary>
    private const double LimitSlope = 1e-9;

    /// <summary>Limits whose combinations are gone through at most: those of five amplifiers.</summary>
    private const int MostLimits = 10;

    /// <summary>Factorisations after which a search is given up.</summary>
    private const int MostFactorings = 20_000;

    /// <summary>Where <see cref="Ease"/> begins and ends, and how far one step goes.</summary>
    private const double MostSeriesOhms = 1e9;
    private const double LeastSeriesOhms = 1e-4;
    private const double SeriesFall = 0.4;

    private readonly LinearComplementarity complementarity = new();
    private readonly PortTangent tangent = new();
    private double[] intercept = [];
    private double[] curveVolts = [];
    private double[] target = [];
    private double[] unstable = [];
    private double[] easedView = [];
    private double[] below = [];
    private double[] matrix = [];
    private double[] offset = [];
    private double[] slope = [];
    private bool[] isLive = [];
    private bool[] isSoft = [];
    private PortLaw[] laws = [];
    private PairState[] pairs = [];
    private int[] rows = [];
    private int[] limits = [];
    private int[] pivot = [];
    private int limitCount;
    private bool hasCorners;
    private bool hasCurves;
    private bool hasSoft;
    private bool hasUnstable;
    private int ports;

    /// <summary>Slope dv/dz of each port at the solution; for a port with a corner that of its conducting side.</summary>
    public ReadOnlySpan<double> Slope => slope.AsSpan(0, ports);

    /// <summary>False for a port with a corner that does not conduct: its current is held at zero.</summary>
    public ReadOnlySpan<bool> IsLive => isLive.AsSpan(0, ports);

    /// <summary>Takes the ports of a network; must precede <see cref="TrySolve"/> whenever that changes.</summary>
    /// <param name="network">of these ports</param>
    /// <param name="portLaws">the law of each</param>
    public void Begin(Network network, ReadOnlySpan<PortLaw> portLaws)
    {
        ports = portLaws.Length;
        if (intercept.Length < ports) Grow();
        portLaws.CopyTo(laws);
        var devices = network.Ports.Length;
        (limitCount, hasCorners, hasCurves, hasSoft) = (0, false, false, false);
        for (var k = 0; k < ports; k++)
        {
            hasCurves |= laws[k] == PortLaw.Junction;
            isSoft[k] = laws[k] == PortLaw.Corner && !network.Ports[k].IsStraight;
            hasSoft |= isSoft[k];
            hasCorners |= laws[k] is PortLaw.Corner or PortLaw.Limit;
            if (laws[k] == PortLaw.Limit)
            {
                rows[k] = network.Ports[k].Row;
                limits[limitCount++] = k;
            }

            slope[k] = laws[k] switch { PortLaw.Corner => CornerOhms, PortLaw.Limit => LimitSlope, PortLaw.Line => network.Props[k - devices].Slope, _ => 0 };
        }
    }

    /// <param name="open">voltages of the open ports</param>
    /// <param name="view">Z</param>
    /// <param name="curves">of the junctions, with a corner or without</param>
    /// <param name="drops">of those with a corner</param>
    /// <param name="z">where to start; receives the solution</param>
    /// <returns>false when no state was found</returns>
    public bool TrySolve(ReadOnlySpan<double> open, ReadOnlySpan<double> view, ReadOnlySpan<JunctionCurve> curves, ReadOnlySpan<double> drops, Span<double> z)
    {
        if (ports == 0) return true;
        complementarity.FactoringsLeft = MostFactorings;
        hasUnstable = false;
        FreeCorners();
        if (Settle(open, view, curves, drops, z) || Harden(open, view, curves, drops, z)) return true;
        for (var combination = 0; limitCount is > 0 and <= MostLimits && combination < 1 << limitCount; combination++)
        {
            for (var i = 0; i < limitCount; i++) pairs[limits[i]] = (combination >> i & 1) == 1 ? PairState.Held : PairState.Released;
            z.Clear();
            if (Settle(open, view, curves, drops, z)) return true;
        }

        if (!hasUnstable) return false;
        unstable.AsSpan(0, ports).CopyTo(z);
        Rest(curves, z);
        return true;
    }

    private void FreeCorners()
    {
        for (var k = 0; k < ports; k++) pairs[k] = laws[k] is PortLaw.Corner or PortLaw.Limit ? PairState.Either : PairState.Held;
    }

    /// <summary>Follows the state of the junction law to that of the corners.</summary>
    private bool Harden(ReadOnlySpan<double> open, ReadOnlySpan<double> view, ReadOnlySpan<JunctionCurve> curves, ReadOnlySpan<double> drops, Span<double> z)
    {
        if (!hasSoft) return false;
        z.Clear();
        Soften(PortLaw.Junction);
        FreeCorners();
        var found = Settle(open, view, curves, drops, z);
        Soften(PortLaw.Corner);
        FreeCorners();
        if (!found) return false;
        for (var k = 0; k < ports; k++)
        {
            if (isSoft[k] && z[k] < OffAmperes) z[k] = 0;
        }

        return Settle(open, view, curves, drops, z);
    }

    /// <summary>Gives every junction with a corner another law.</summary>
    private void Soften(PortLaw law)
    {
        hasCurves = law == PortLaw.Junction;
        for (var k = 0; k < ports; k++)
        {
            if (isSoft[k]) (laws[k], slope[k]) = (law, CornerOhms);
        }
    }

    /// <summary>Newton's method from one start after the other until it finds a state that a board stays in.</summary>
    private bool Settle(ReadOnlySpan<double> open, ReadOnlySpan<double> view, ReadOnlySpan<JunctionCurve> curves, ReadOnlySpan<double> drops, Span<double> z)
    {
        if (Comes(open, view, curves, drops, z)) return true;

        // Without a curve to follow every start leads along the same path.
        if (!hasCurves) return false;
        z.Fill(1e-3);
        if (Comes(open, view, curves, drops, z)) return true;
        foreach (var amperes in (ReadOnlySpan<double>)[1e-3, 1e-5, 0.1])
        {
            z.Clear();
            for (var k = 0; k < ports; k++)
            {
                if (laws[k] == PortLaw.Junction) LayTangent(curves[k], k, amperes, curves[k].Volts(amperes));
            }

            if (SolveTangents(open, view, drops, PairState.Either, z) && Comes(open, view, curves, drops, z)) return true;
        }

        return Ease(open, view, curves, drops, z);
    }

    /// <summary>
    /// Gives every port so much resistance in series that it stands alone, and follows the state as that falls to nothing: a path along which junctions that
    /// drive one another turn on one by one.
    /// </summary>
    private bool Ease(ReadOnlySpan<double> open, ReadOnlySpan<double> view, ReadOnlySpan<JunctionCurve> curves, ReadOnlySpan<double> drops, Span<double> z)
    {
        z.Clear();
        var eased = easedView.AsSpan(0, ports * ports);
        view[..(ports * ports)].CopyTo(eased);
        for (var ohms = MostSeriesOhms; ohms > LeastSeriesOhms && complementarity.FactoringsLeft > 0; ohms *= SeriesFall)
        {
            for (var k = 0; k < ports; k++) eased[k * ports + k] = view[k * ports + k] + (laws[k] == PortLaw.Junction ? ohms : 0);
            z.CopyTo(below);
            if (!Newton(open, eased, curves, drops, z)) below.AsSpan(0, ports).CopyTo(z);
        }

        return Comes(open, view, curves, drops, z);
    }

    private bool Comes(ReadOnlySpan<double> open, ReadOnlySpan<double> view, ReadOnlySpan<JunctionCurve> curves, ReadOnlySpan<double> drops, Span<double> z)
    {
        if (!Newton(open, view, curves, drops, z) || !Holds(open, view, drops, z)) return false;
        if (IsStable(view)) return true;
        hasUnstable = true;
        z.CopyTo(unstable);
        return false;
    }

    /// <summary>True when each output that was put at a limit, or off it, is where its input drives it.</summary>
    private bool Holds(ReadOnlySpan<double> open, ReadOnlySpan<double> view, ReadOnlySpan<double> drops, ReadOnlySpan<double> z)
    {
        for (var i = 0; i < limitCount; i++)
        {
            var k = limits[i];
            if (pairs[k] == PairState.Either) continue;
            var room = drops[k] - open[k] + LuFactor.Dot(view.Slice(k * ports, ports), z);
            if (pairs[k] == PairState.Held ? z[k] < -1e-9 : room < -1e-9 * (1 + Math.Abs(open[k]))) return false;
        }

        return true;
    }

    /// <summary>
    /// False when an amplifier works between its limits while pushing its output down, as its limit would, lets the output rise: its feedback is positive.
    /// </summary>
    private bool IsStable(ReadOnlySpan<double> view)
    {
        if (limitCount == 0) return true;
        if (!tangent.TryFactor(view, Slope, IsLive)) return false;
        var answer = offset.AsSpan(0, ports);
        for (var i = 0; i < limitCount; i++)
        {
            var k = limits[i];
            if (IsAtLimit(rows[k])) continue;
            for (var l = 0; l < ports; l++) answer[l] = isLive[l] ? view[l * ports + k] : 0;
            tangent.Solve(answer);
            if (view[k * ports + k] - LuFactor.Dot(view.Slice(k * ports, ports), answer) < 0) return false;
        }

        return true;
    }

    private bool IsAtLimit(int row)
    {
        for (var i = 0; i < limitCount; i++)
        {
            if (rows[limits[i]] == row && isLive[limits[i]]) return true;
        }

        return false;
    }

    private bool Newton(ReadOnlySpan<double> open, ReadOnlySpan<double> view, ReadOnlySpan<JunctionCurve> curves, ReadOnlySpan<double> drops, Span<double> z)
    {
        var next = target.AsSpan(0, ports);
        z.CopyTo(next);
        for (var k = 0; k < ports; k++)
        {
            if (laws[k] == PortLaw.Junction) curveVolts[k] = curves[k].Volts(z[k]);
        }

        var (share, before) = (1.0, 0.0);
        for (var step = 0; step < NewtonSteps; step++)
        {
            for (var k = 0; k < ports; k++)
            {
                if (laws[k] == PortLaw.Junction) LayTangent(curves[k], k, z[k], curveVolts[k]);
            }

            if (!SolveTangents(open, view, drops, PairState.Held, next)) return false;
            var worst = Step(curves, next, z, share);
            if (double.IsNaN(worst)) return false;
            if (worst > VoltTolerance)
            {
                // Where whole steps go round in a circle, shorter ones come to the middle of it.
                if (step >= FreeSteps) share = worst < before ? Math.Min(1, 2 * share) : Math.Max(LeastShare, share / 2);
                before = worst;
                continue;
            }

            next.CopyTo(z);
            Rest(curves, z);
            return true;
        }

        return false;
    }

    /// <summary>Moves the points at which the tangents are laid.</summary>
    /// <param name="share">of the whole way, in volts</param>
    /// <returns>how far, in volts, the state on the tangents misses a curve at worst; NaN when it is beyond all numbers</returns>
    private double Step(ReadOnlySpan<JunctionCurve> curves, ReadOnlySpan<double> next, Span<double> z, double share)
    {
        var worst = 0.0;
        for (var k = 0; k < ports; k++)
        {
            if (laws[k] != PortLaw.Junction)
            {
                z[k] = next[k];
                continue;
            }

            var volts = intercept[k] + slope[k] * next[k];
            if (!double.IsFinite(volts)) return double.NaN;
            var onCurve = curves[k].Volts(next[k]);
            var miss = Math.Abs(volts - onCurve);
            if (share < 1)
            {
                worst = Math.Max(worst, Math.Min(miss, Math.Abs(curves[k].Amperes(volts) - next[k]) * OhmsOfMiss));
                curveVolts[k] += share * ((next[k] > z[k] ? onCurve : volts) - curveVolts[k]);
                z[k] = curves[k].Amperes(curveVolts[k]);
            }
            else if (next[k] > z[k])
            {
                worst = Math.Max(worst, miss);
                (z[k], curveVolts[k]) = (next[k], onCurve);
            }
            else
            {
                var amperes = curves[k].Amperes(volts);
                worst = Math.Max(worst, Math.Min(miss, Math.Abs(amperes - next[k]) * OhmsOfMiss));
                (z[k], curveVolts[k]) = (amperes, volts);
            }
        }

        return worst;
    }

    /// <summary>Says of each port what it is at the state found.</summary>
    private void Rest(ReadOnlySpan<JunctionCurve> curves, ReadOnlySpan<double> z)
    {
        for (var k = 0; k < ports; k++)
        {
            isLive[k] = laws[k] is PortLaw.Junction or PortLaw.Line || z[k] > 0;
            if (laws[k] == PortLaw.Junction) slope[k] = curves[k].SlopeOhms(z[k]);
        }
    }

    private void LayTangent(in JunctionCurve curve, int k, double amperes, double volts)
    {
        slope[k] = curve.SlopeOhms(amperes);
        intercept[k] = volts - slope[k] * amperes;
    }

    /// <summary>Port currents on the network with every smooth port replaced by its tangent.</summary>
    /// <param name="junctions">whether each junction stays on its tangent, or may go off instead</param>
    /// <param name="next">the state to try first; receives the solution</param>
    private bool SolveTangents(ReadOnlySpan<double> open, ReadOnlySpan<double> view, ReadOnlySpan<double> drops, PairState junctions, Span<double> next)
    {
        var m = matrix.AsSpan(0, ports * ports);
        view[..(ports * ports)].CopyTo(m);
        for (var k = 0; k < ports; k++)
        {
            m[k * ports + k] += slope[k];
            offset[k] = (laws[k] switch { PortLaw.Line => 0, PortLaw.Junction => intercept[k], _ => drops[k] }) - open[k];
            if (laws[k] == PortLaw.Junction) pairs[k] = junctions;
        }

        if (hasCorners || junctions != PairState.Held) return complementarity.TrySolve(m, offset.AsSpan(0, ports), pairs.AsSpan(0, ports), next);
        if (!LuFactor.Factor(m, ports, pivot)) return false;
        for (var k = 0; k < ports; k++) next[k] = -offset[k];
        LuFactor.Solve(m, ports, pivot, next);
        return true;
    }

    private void Grow()
    {
        matrix = new double[ports * ports];
        offset = new double[ports];
        intercept = new double[ports];
        curveVolts = new double[ports];
        target = new double[ports];
        unstable = new double[ports];
        easedView = new double[ports * ports];
        below = new double[ports];
        laws = new PortLaw[ports];
        pairs = new PairState[ports];
        rows = new int[ports];
        limits = new int[ports];
        pivot = new int[ports];
        slope = new double[ports];
        isLive = new bool[ports];
        isSoft = new bool[ports];
    }
}
