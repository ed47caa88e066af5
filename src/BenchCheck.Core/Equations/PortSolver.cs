namespace BenchCheck.Core.Equations;

/// <summary>
/// Finds the operating state: the port currents z at which every port obeys its law on the linear network seen from the ports,
/// v = v_open − Z z.
/// </summary>
/// <remarks>
/// <para>
/// Ports with a smooth law (junction law) are solved by Newton's method. Each tangent is laid at a point of the curve that keeps the new
/// current when it grows and the new voltage when it falls, so a junction can leave any state and no exponential overflows.
/// </para>
/// <para>
/// Ports with a corner (constant drop, breakdown, output limit) form a linear complementarity problem at each tangent: w = drop − v ≥ 0, z ≥ 0,
/// z w = 0 (Lemke 1965). Where plain Newton does not come to rest, the sources are raised in steps from zero (Katzenelson 1965).
/// </para>
/// <para>Shapes: ports p; Z p×p row-major; all other spans p.</para>
/// </remarks>
internal sealed class PortSolver
{
    private const int NewtonSteps = 60;
    private const double VoltTolerance = 1e-10;

    /// <summary>Slope given to every port with a corner, so that junctions in parallel share and no state is ambiguous.</summary>
    private const double CornerOhms = 1e-7;

    private readonly LinearComplementarity complementarity = new();
    private double[] intercept = [];
    private double[] curveVolts = [];
    private double[] target = [];
    private double[] trial = [];
    private double[] smoothCurrent = [];
    private double[] openScaled = [];
    private double[] cornerMatrix = [];
    private double[] cornerOffset = [];
    private double[] cornerCurrent = [];
    private double[] smoothMatrix = [];
    private double[] smoothColumns = [];
    private int[] pivot = [];
    private int[] smooth = [];
    private int[] corner = [];
    private int smoothCount;
    private int cornerCount;
    private int ports;

    /// <summary>Slope dv/dz of each port at the solution; for a port with a corner zero while it conducts.</summary>
    public double[] Slope { get; private set; } = [];

    /// <summary>False for a port with a corner that does not conduct: its current is held at zero.</summary>
    public bool[] IsLive { get; private set; } = [];

    /// <summary>Sets which ports have a corner; must precede <see cref="TrySolve"/> whenever the network changes.</summary>
    public void Begin(ReadOnlySpan<bool> corners)
    {
        ports = corners.Length;
        if (intercept.Length < ports) Grow();
        smoothCount = cornerCount = 0;
        for (var k = 0; k < ports; k++)
        {
            if (corners[k]) corner[cornerCount++] = k;
            else smooth[smoothCount++] = k;
        }
    }

    /// <param name="z">where to start; receives the solution</param>
    public bool TrySolve(ReadOnlySpan<double> open, ReadOnlySpan<double> impedance, ReadOnlySpan<JunctionCurve> curves, ReadOnlySpan<double> drops, Span<double> z)
    {
        if (ports == 0) return true;
        if (Newton(open, impedance, curves, drops, z)) return true;

        // Sources raised in steps from zero; the step shrinks where the path turns.
        z.Clear();
        var (reached, step) = (0.0, 0.125);
        while (reached < 1)
        {
            var next = Math.Min(1, reached + step);
            for (var k = 0; k < ports; k++) openScaled[k] = next * open[k];
            z.CopyTo(trial);
            if (Newton(openScaled.AsSpan(0, ports), impedance, curves, drops, z))
            {
                reached = next;
                step = Math.Min(0.25, step * 2);
                continue;
            }

            trial.AsSpan(0, ports).CopyTo(z);
            step /= 4;
            if (step < 1e-5) return false;
        }

        return true;
    }

    private bool Newton(
        ReadOnlySpan<double> open, ReadOnlySpan<double> impedance, ReadOnlySpan<JunctionCurve> curves, ReadOnlySpan<double> drops, Span<double> z)
    {
        var slope = Slope;
        for (var i = 0; i < smoothCount; i++) curveVolts[smooth[i]] = curves[smooth[i]].Volts(z[smooth[i]]);
        for (var step = 0; step < NewtonSteps; step++)
        {
            for (var i = 0; i < smoothCount; i++)
            {
                var k = smooth[i];
                slope[k] = curves[k].SlopeOhms(z[k]);
                intercept[k] = curveVolts[k] - slope[k] * z[k];
            }

            if (!SolveTangent(open, impedance, drops)) return false;

            var worst = 0.0;
            for (var i = 0; i < smoothCount; i++)
            {
                var k = smooth[i];
                var volts = intercept[k] + slope[k] * target[k];
                if (!double.IsFinite(volts)) return false;
                var onCurve = curves[k].Volts(target[k]);
                if (target[k] > z[k])
                {
                    worst = Math.Max(worst, Math.Abs(volts - onCurve));
                    (z[k], curveVolts[k]) = (target[k], onCurve);
                }
                else
                {
                    var amperes = curves[k].Amperes(volts);
                    worst = Math.Max(worst, Math.Min(Math.Abs(volts - onCurve), Math.Abs(amperes - target[k]) * 1e3));
                    (z[k], curveVolts[k]) = (amperes, curves[k].Volts(amperes));
                }
            }

            for (var i = 0; i < cornerCount; i++) z[corner[i]] = target[corner[i]];
            if (worst > VoltTolerance) continue;
            for (var i = 0; i < smoothCount; i++)
            {
                var k = smooth[i];
                IsLive[k] = true;
                z[k] = target[k];
                slope[k] = curves[k].SlopeOhms(z[k]);
            }

            for (var i = 0; i < cornerCount; i++)
            {
                var k = corner[i];
                IsLive[k] = z[k] > 0;
                slope[k] = CornerOhms;
            }

            return true;
        }

        return false;
    }

    /// <summary>Port currents on the network with every smooth port replaced by its tangent.</summary>
    private bool SolveTangent(ReadOnlySpan<double> open, ReadOnlySpan<double> impedance, ReadOnlySpan<double> drops)
    {
        var (s, c) = (smoothCount, cornerCount);
        var matrix = smoothMatrix.AsSpan(0, s * s);
        var right = smoothCurrent.AsSpan(0, s);
        for (var i = 0; i < s; i++)
        {
            var k = smooth[i];
            for (var j = 0; j < s; j++) matrix[i * s + j] = impedance[k * ports + smooth[j]];
            matrix[i * s + i] += Slope[k];
            right[i] = open[k] - intercept[k];
        }

        if (s > 0)
        {
            if (!LuFactor.Factor(matrix, s, pivot)) return false;
            LuFactor.Solve(matrix, s, pivot, right);
        }

        if (c > 0)
        {
            // Smooth ports eliminated: w = q + M z over the corners.
            for (var j = 0; j < c; j++)
            {
                var column = smoothColumns.AsSpan(j * s, s);
                for (var i = 0; i < s; i++) column[i] = impedance[smooth[i] * ports + corner[j]];
                if (s > 0) LuFactor.Solve(matrix, s, pivot, column);
            }

            for (var i = 0; i < c; i++)
            {
                var k = corner[i];
                var q = drops[k] - open[k];
                for (var l = 0; l < s; l++) q += impedance[k * ports + smooth[l]] * right[l];
                cornerOffset[i] = q;
                for (var j = 0; j < c; j++)
                {
                    var m = impedance[k * ports + corner[j]];
                    for (var l = 0; l < s; l++) m -= impedance[k * ports + smooth[l]] * smoothColumns[j * s + l];
                    cornerMatrix[i * c + j] = m;
                }

                cornerMatrix[i * c + i] += CornerOhms;
            }

            if (!complementarity.TrySolve(cornerMatrix.AsSpan(0, c * c), cornerOffset.AsSpan(0, c), cornerCurrent.AsSpan(0, c))) return false;
            for (var j = 0; j < c; j++)
            {
                target[corner[j]] = cornerCurrent[j];
                if (cornerCurrent[j] != 0) LuFactor.AddScaled(right, smoothColumns.AsSpan(j * s, s), -cornerCurrent[j]);
            }
        }

        for (var i = 0; i < s; i++) target[smooth[i]] = right[i];
        return true;
    }

    private void Grow()
    {
        smoothMatrix = new double[ports * ports];
        smoothColumns = new double[ports * ports];
        cornerMatrix = new double[ports * ports];
        intercept = new double[ports];
        curveVolts = new double[ports];
        target = new double[ports];
        trial = new double[ports];
        smoothCurrent = new double[ports];
        openScaled = new double[ports];
        cornerOffset = new double[ports];
        cornerCurrent = new double[ports];
        pivot = new int[ports];
        smooth = new int[ports];
        corner = new int[ports];
        Slope = new double[ports];
        IsLive = new bool[ports];
    }
}
