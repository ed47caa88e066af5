namespace BenchCheck.Core.Equations;

/// <summary>The junction law z = I_s (exp(v / nV_T) − 1) with I_s set so that v = drop at the reference current, and its tangent.</summary>
/// <remarks>
/// Shockley, Bell Syst. Tech. J. 28 (1949). Below the voltage at which the slope resistance reaches 10 TΩ the curve goes on as a straight
/// line of that slope, so that tangent and inverse exist for every v and z.
/// </remarks>
internal readonly struct JunctionCurve
{
    /// <summary>Slope resistance at which a junction counts as a mere leakage.</summary>
    private const double LeakageOhms = 1e13;

    /// <summary>Share of the current up to which the series of <see cref="TangentMiss"/> holds to a millionth of itself.</summary>
    private const double SmallChange = 1e-2;

    private const double BoltzmannOverCharge = 8.617333262145177e-5;

    private readonly double thermal;
    private readonly double saturation;
    private readonly double reference;
    private readonly double bendVolts;
    private readonly double bendAmperes;

    public JunctionCurve(double drop, double referenceAmperes, double thermalVolts)
    {
        thermal = thermalVolts;
        reference = referenceAmperes;
        // Capped so that an absurd drop met on the way of a fit neither overflows nor underflows.
        saturation = referenceAmperes * Math.Exp(Math.Clamp(-drop / thermalVolts, -300, 30));
        // slope = thermal / (z + I_s) = LeakageOhms
        var total = thermalVolts / LeakageOhms;
        bendAmperes = total - saturation;
        bendVolts = thermal * Math.Log(total / saturation);
    }

    /// <summary>k T / e (k and e exact since the SI of 2019).</summary>
    public static double ThermalVolts(double celsius) => BoltzmannOverCharge * (celsius + 273.15);

    public double Volts(double amperes) =>
        amperes <= bendAmperes ? bendVolts + (amperes - bendAmperes) * LeakageOhms : thermal * Math.Log((amperes + saturation) / saturation);

    public double Amperes(double volts) =>
        volts <= bendVolts ? bendAmperes + (volts - bendVolts) / LeakageOhms : saturation * (Math.Exp(volts / thermal) - 1);

    /// <summary>dv/d(nV_T) at a current, the drop at the reference current held; zero where the curve is a mere leakage.</summary>
    public double VoltsByThermal(double amperes)
    {
        if (amperes <= bendAmperes) return 0;
        var share = saturation / (amperes + saturation);
        return Math.Log((amperes + saturation) / reference) + share * Math.Log(reference / saturation);
    }

    /// <summary>dv/d(drop) at a current: one, less what the saturation current has in it.</summary>
    public double VoltsByDrop(double amperes) => 1 - saturation / (Math.Max(amperes, bendAmperes) + saturation);

    /// <summary>How far, in volts, the tangent laid at a current misses the curve when the current changes.</summary>
    public double TangentMiss(double amperes, double change)
    {
        var u = change / (amperes + saturation);
        return Math.Abs(u) <= SmallChange && Math.Min(amperes, amperes + change) > bendAmperes
            ? thermal * u * u * (0.5 - u * (1.0 / 3 - u * (0.25 - u / 5)))
            : Math.Abs(Volts(amperes + change) - Volts(amperes) - SlopeOhms(amperes) * change);
    }

    /// <summary>dv/dz.</summary>
    public double SlopeOhms(double amperes) => amperes <= bendAmperes ? LeakageOhms : thermal / (amperes + saturation);
}
