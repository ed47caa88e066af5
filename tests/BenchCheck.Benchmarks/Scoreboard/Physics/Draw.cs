using BenchCheck.Core.Quantities;

namespace BenchCheck.Benchmarks.Scoreboard.Physics;

/// <summary>Where the numbers of a real board come from: at random, or the middle of each interval for the board as drawn on paper.</summary>
public sealed class Draw
{
    private readonly Func<double> share;

    private Draw(Func<double> share) => this.share = share;

    /// <summary>The middle of every interval.</summary>
    public static Draw Middle { get; } = new(() => 0.5);

    public static Draw From(Random random) => new(random.NextDouble);

    public double Uniform(double low, double high) => low + (high - low) * share();

    public double LogUniform(double low, double high) => low * Math.Pow(high / low, share());

    /// <summary>A value within its tolerance: uniform about a nominal value, log-uniform over a range.</summary>
    public double Within(Nominal nominal)
    {
        if (nominal.IsUnknown) throw new ArgumentException("an unknown number cannot be drawn", nameof(nominal));
        var isRange = nominal.Low > 0 && Math.Abs(nominal.Value - Math.Sqrt(nominal.Low * nominal.High)) < 1e-9 * nominal.Value;
        return isRange ? LogUniform(nominal.Low, nominal.High) : Uniform(nominal.Low, nominal.High);
    }
}
