namespace BenchCheck.Core.Boards;

/// <summary>A coefficient of the equations: Factor · θ[First] · (θ[Second] or 1 − θ[Second]); absent parameters count as one.</summary>
/// <remarks>Enough for every part kind: a constant, one parameter, or a share of one (a potentiometer's two arms).</remarks>
public readonly record struct Coefficient(double Factor, int First, int Second, bool IsComplement)
{
    public static Coefficient Constant(double value) => new(value, -1, -1, false);

    public static Coefficient Of(int parameter, double factor = 1) => new(factor, parameter, -1, false);

    public static Coefficient Share(int whole, int share) => new(1, whole, share, false);

    public static Coefficient Rest(int whole, int share) => new(1, whole, share, true);

    public bool IsConstantZero => Factor == 0;

    /// <summary>Refers the same coefficient to a longer list in which this part's parameters begin at <paramref name="offset"/>.</summary>
    public Coefficient Shifted(int offset) =>
        new(Factor, First < 0 ? -1 : First + offset, Second < 0 ? -1 : Second + offset, IsComplement);

    public double Value(ReadOnlySpan<double> theta)
    {
        if (Factor == 0) return 0;
        var value = Factor;
        if (First >= 0) value *= theta[First];
        if (Second >= 0) value *= IsComplement ? 1 - theta[Second] : theta[Second];
        return value;
    }

    /// <summary>∂Value/∂θ[First].</summary>
    public double ByFirst(ReadOnlySpan<double> theta) =>
        Second < 0 ? Factor : Factor * (IsComplement ? 1 - theta[Second] : theta[Second]);

    /// <summary>∂Value/∂θ[Second].</summary>
    public double BySecond(ReadOnlySpan<double> theta) => (IsComplement ? -Factor : Factor) * (First < 0 ? 1 : theta[First]);
}
