namespace BenchCheck.Benchmarks.Scoreboard.Physics;

/// <summary>A junction's exponential law: i = reference · (exp((v − volts)/slope) − exp(−volts/slope)), Shockley's equation written about a known point.</summary>
/// <param name="ReferenceAmperes">a current, more than zero</param>
/// <param name="Volts">voltage at that current</param>
/// <param name="Slope">n·kT/q in volts; for a breakdown the softness of its knee</param>
public readonly record struct Junction(double ReferenceAmperes, double Volts, double Slope)
{
    private const double BoltzmannOverCharge = 8.617333262e-5;

    /// <summary>Beyond this many slopes above the known point (some 1e14 A) the law goes on as a straight line, so that no step overflows.</summary>
    private const double Steepest = 40;

    /// <summary>kT/q in volts (CODATA 2018).</summary>
    public static double ThermalVolts(double celsius) => BoltzmannOverCharge * (celsius + 273.15);

    public (double Amperes, double Siemens) At(double volts)
    {
        var z = (volts - Volts) / Slope;
        var floor = Math.Exp(-Volts / Slope);
        var e = Math.Exp(Math.Min(z, Steepest));
        var beyond = Math.Max(0, z - Steepest);
        return (ReferenceAmperes * (e * (1 + beyond) - floor), ReferenceAmperes * e / Slope);
    }

    /// <summary>Below this many slopes under the known point (some picoamperes at 1 mA there) the current does not matter to any step.</summary>
    private const double Faintest = 20;

    /// <summary>The voltage that a step of the solver may reach: once a current flows that matters, a rise counts by its logarithm.</summary>
    public double Limit(double from, double to)
    {
        var start = Math.Max(from, Volts - Faintest * Slope);
        return to <= start ? to : start + Slope * double.LogP1((to - start) / Slope);
    }
}
