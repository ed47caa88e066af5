using BenchCheck.Core.Boards;
using BenchCheck.Core.Equations;
using BenchCheck.Core.Metering;
using BenchCheck.Core.Quantities;

namespace BenchCheck.Core.Fitting;

/// <summary>A parameter that the fit moves, on the scale on which its uncertainty is even, with what was known before the readings.</summary>
/// <remarks>
/// The fit works on φ = ln θ for a quantity on a ratio scale (resistances, gains), else on φ = θ. A tolerance ±t becomes a standard
/// deviation t/√3, that of a rectangular distribution (JCGM 100:2008, 4.3.7); a range low..high on a ratio scale ln(high/low)/(2√3).
/// </remarks>
/// <param name="Owner">designator of the part; for a scale error the meter with its function and range</param>
/// <param name="ThetaIndex">position in the parameter vector of the board; −1 for a scale error</param>
/// <param name="IsLogarithmic">φ is the logarithm of the quantity</param>
/// <param name="Mean">prior mean of φ; where to start when nothing is known</param>
/// <param name="Sigma">prior standard deviation of φ; positive infinity when the parts list says "?"</param>
public sealed record FitParameter(
    string Owner, ParameterKind Kind, string? Condition, Nominal Nominal, int ThetaIndex, bool IsLogarithmic, double Mean, double Sigma)
{
    public bool IsUnknown => double.IsPositiveInfinity(Sigma);

    /// <summary>Value in SI units at φ.</summary>
    public double Value(double phi) => IsLogarithmic ? Math.Exp(Math.Clamp(phi, -LogReach, LogReach)) : phi;

    /// <summary>Farthest logarithm that is followed: 26 decades either way.</summary>
    private const double LogReach = 60;

    /// <summary>The parameter for one entry of θ; null when its tolerance is zero, so that there is nothing to fit.</summary>
    public static FitParameter? Of(BoardParameter entry, int thetaIndex)
    {
        ArgumentNullException.ThrowIfNull(entry);
        var nominal = entry.Nominal;
        if (nominal.IsUnknown)
        {
            var start = StartOf(entry.Kind);
            return new FitParameter(
                entry.Part.Designator, entry.Kind, entry.Condition, nominal, thetaIndex, entry.Kind.IsRatioScale,
                entry.Kind.IsRatioScale ? Math.Log(start) : start, double.PositiveInfinity);
        }

        var logarithmic = entry.Kind.IsRatioScale && nominal.Value > 0;
        if (!logarithmic)
        {
            var half = (nominal.High - nominal.Low) / 2;
            return half > 0
                ? new FitParameter(entry.Part.Designator, entry.Kind, entry.Condition, nominal, thetaIndex, false, nominal.Value, StandardUncertainty.Rectangular(half))
                : null;
        }

        // A tolerance of 100 % or more has no lower logarithm; a tenth of the nominal stands for it.
        var low = Math.Max(nominal.Low, nominal.Value / 10);
        var width = Math.Log(nominal.High / low);
        return width > 0
            ? new FitParameter(entry.Part.Designator, entry.Kind, entry.Condition, nominal, thetaIndex, true, Math.Log(nominal.Value), StandardUncertainty.Rectangular(width / 2))
            : null;
    }

    /// <summary>Where the search for an unknown begins; a plain middle of what is met on a board.</summary>
    public static double StartOf(ParameterKind kind) =>
        kind == ParameterKind.Resistance ? 10e3
        : kind == ParameterKind.Gain ? 100
        : kind == ParameterKind.Transconductance ? 10e-3
        : kind == ParameterKind.Position ? 0.5
        : kind == ParameterKind.Drop ? 0.65
        : kind == ParameterKind.Breakdown ? 5
        : kind == ParameterKind.ReverseGain ? 2
        : kind == ParameterKind.OutputResistance ? 50e3
        : kind == ParameterKind.Capacitance ? 1e-6
        : kind == ParameterKind.Inductance ? 1e-3
        : kind == ParameterKind.Threshold ? 2
        : kind == ParameterKind.DropOut ? 1.5
        : kind == ParameterKind.IdleCurrent ? 5e-3
        : 0;
}
