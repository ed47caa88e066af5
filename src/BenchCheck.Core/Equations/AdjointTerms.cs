using BenchCheck.Core.Boards;

namespace BenchCheck.Core.Equations;

/// <summary>Derivatives of one reading by every parameter, from its adjoint: one term a coefficient of the equations.</summary>
/// <remarks>
/// ∂y/∂p = λᵀ (∂b/∂p − ∂A/∂p x − ∂C/∂p z) + μᵀ ∂drop/∂p. Source: Director and Rohrer, IEEE Trans. Circuit Theory CT-16 (1969).
/// </remarks>
/// <param name="linear">the network that was solved</param>
/// <param name="laws">of its devices' ports</param>
/// <param name="curves">of those with a junction law</param>
/// <param name="gradient">receives the sums, one entry a parameter; added to</param>
internal readonly ref struct AdjointTerms(
    LinearNetwork linear, ReadOnlySpan<PortLaw> laws, ReadOnlySpan<JunctionCurve> curves, Span<double> gradient)
{
    private readonly Network network = linear.Network;
    private readonly ReadOnlySpan<double> theta = linear.Theta;
    private readonly ReadOnlySpan<PortLaw> laws = laws;
    private readonly ReadOnlySpan<JunctionCurve> curves = curves;
    private readonly Span<double> gradient = gradient;

    /// <param name="lambda">adjoint of the unknowns, n</param>
    /// <param name="mu">adjoint of the ports, p</param>
    /// <param name="x">the unknowns, n</param>
    /// <param name="z">port currents, p</param>
    /// <param name="scale">unit of the reading over volts</param>
    public void Add(ReadOnlySpan<double> lambda, ReadOnlySpan<double> mu, ReadOnlySpan<double> x, ReadOnlySpan<double> z, double scale)
    {
        var conductances = linear.Conductances;
        for (var i = 0; i < network.Conductors.Length; i++)
        {
            ref readonly var e = ref network.Conductors[i];
            AddTerm(e.Ohms, scale * Across(lambda, e.From, e.To) * Across(x, e.From, e.To) * conductances[i] * conductances[i]);
        }

        foreach (ref readonly var e in network.Voltages.AsSpan())
        {
            var weight = scale * lambda[e.Row];
            AddTerm(e.Emf, weight);
            AddTerm(e.Ohms, weight * x[e.Row]);
            if (e.Control != Network.ControlKind.None) AddTerm(e.Gain, weight * Across(x, e.ControlPlus, e.ControlMinus));
        }

        foreach (ref readonly var e in network.Currents.AsSpan())
        {
            var weight = -scale * Across(lambda, e.From, e.To);
            AddTerm(e.Amperes, weight);
            if (e.Control != Network.ControlKind.None) AddTerm(e.Gain, weight * Across(x, e.ControlPlus, e.ControlMinus));
        }

        foreach (ref readonly var e in network.Amplifiers.AsSpan())
        {
            var weight = -scale * lambda[e.Row];
            AddTerm(e.Offset, weight);
            if (e.Gain.IsConstantZero) continue;
            var gain = e.Gain.Value(theta);
            AddTerm(e.Gain, weight * (e.Output < 0 ? 0 : x[e.Output]) / (gain * gain));
        }

        for (var k = 0; k < network.Ports.Length; k++) AddPort(k, scale * mu[k], lambda, z[k], scale);
    }

    private void AddPort(int k, double weight, ReadOnlySpan<double> lambda, double amperes, double scale)
    {
        ref readonly var e = ref network.Ports[k];
        if (laws[k] == PortLaw.Junction)
        {
            AddTerm(e.Drop, weight * curves[k].VoltsByDrop(amperes));
            AddTerm(e.Ideality, weight * network.ThermalVolts * curves[k].VoltsByThermal(amperes));
        }
        else
        {
            AddTerm(e.Drop, weight);
            AddTerm(e.Excess, weight);
        }

        if (e.HasSeries(laws[k])) AddTerm(e.SeriesOhms, weight * amperes);
        if (e.Row >= 0 || amperes == 0) return;
        var gain = e.Gain.Value(theta);
        AddTerm(e.Gain, scale * Across(lambda, e.High, e.Low) * amperes / (gain * gain));
    }

    private static double Across(ReadOnlySpan<double> values, int high, int low) => LinearNetwork.Across(values, high, low);

    private void AddTerm(in Coefficient c, double weight)
    {
        if (weight == 0 || c.Factor == 0) return;
        if (c.First >= 0) gradient[c.First] += weight * c.ByFirst(theta);
        if (c.Second >= 0) gradient[c.Second] += weight * c.BySecond(theta);
    }
}
