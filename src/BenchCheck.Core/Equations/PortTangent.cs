namespace BenchCheck.Core.Equations;

/// <summary>The ports' view with every live port on its tangent, factored: view + S, S the slopes; a dead port keeps its current at zero.</summary>
/// <remarks>Shapes: p ports, view p×p row-major, other spans p.</remarks>
internal sealed class PortTangent
{
    private double[] factor = [];
    private int[] pivot = [];
    private int ports;

    /// <returns>false when it is singular</returns>
    public bool TryFactor(ReadOnlySpan<double> view, ReadOnlySpan<double> slopes, ReadOnlySpan<bool> live)
    {
        ports = slopes.Length;
        if (pivot.Length < ports) (factor, pivot) = (new double[ports * ports], new int[ports]);
        for (var k = 0; k < ports; k++)
        {
            for (var l = 0; l < ports; l++) factor[k * ports + l] = live[k] && live[l] ? view[k * ports + l] : 0;
            factor[k * ports + k] = live[k] ? factor[k * ports + k] + slopes[k] : 1;
        }

        return LuFactor.Factor(factor.AsSpan(0, ports * ports), ports, pivot);
    }

    public void Solve(Span<double> b)
    {
        if (ports > 0) LuFactor.Solve(factor, ports, pivot, b[..ports]);
    }

    public void SolveTransposed(Span<double> b)
    {
        if (ports > 0) LuFactor.SolveTransposed(factor, ports, pivot, b[..ports]);
    }
}
