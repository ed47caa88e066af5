using System.Collections.Immutable;

namespace BenchCheck.Core.Quantities;

/// <summary>A series of preferred values (IEC 60063:2015): so many steps a decade, evenly spread by ratio.</summary>
/// <remarks>
/// E48, E96 and E192 are 100·10^(n/N) rounded to three digits, with the one exception 920 for 919 in E192. E24 is 10·10^(n/24) rounded to two
/// digits except for eight values that are older than the rule (27 30 33 36 39 43 47 82); E12, E6 and E3 are every second, fourth and eighth of it.
/// </remarks>
public sealed class PreferredSeries
{
    private readonly int digits;

    private PreferredSeries(int steps, double tolerancePercent, int digits, ImmutableArray<int> values)
    {
        Name = FormattableString.Invariant($"E{steps}");
        TolerancePercent = tolerancePercent;
        Values = values;
        this.digits = digits;
    }

    public static PreferredSeries E24 { get; } = new(
        24, 5, 2, [10, 11, 12, 13, 15, 16, 18, 20, 22, 24, 27, 30, 33, 36, 39, 43, 47, 51, 56, 62, 68, 75, 82, 91]);

    public static PreferredSeries E12 { get; } = new(12, 10, 2, [.. E24.Values.Where((_, n) => n % 2 == 0)]);

    public static PreferredSeries E6 { get; } = new(6, 20, 2, [.. E24.Values.Where((_, n) => n % 4 == 0)]);

    public static PreferredSeries E3 { get; } = new(3, 40, 2, [.. E24.Values.Where((_, n) => n % 8 == 0)]);

    public static PreferredSeries E48 { get; } = new(48, 2, 3, ByRule(48));

    public static PreferredSeries E96 { get; } = new(96, 1, 3, ByRule(96));

    public static PreferredSeries E192 { get; } = new(192, 0.5, 3, ByRule(192).Replace(919, 920));

    /// <summary>Coarsest first.</summary>
    public static ImmutableArray<PreferredSeries> All { get; } = [E3, E6, E12, E24, E48, E96, E192];

    /// <summary>"E24".</summary>
    public string Name { get; }

    /// <summary>Tolerance of the parts that are made in this series; "over 20 %" of E3 is given as 40.</summary>
    public double TolerancePercent { get; }

    /// <summary>One decade: two digits (10 to 91) up to E24, three digits (100 to 988) above.</summary>
    public ImmutableArray<int> Values { get; }

    /// <summary>The series in which parts of a tolerance are made: E24 for 5 %, E96 for 1 %, E192 below.</summary>
    public static PreferredSeries ForTolerance(double percent) => All.FirstOrDefault(s => s.TolerancePercent <= percent * 1.0001) ?? E192;

    /// <summary>The value of the series nearest by ratio.</summary>
    /// <param name="value">above zero, in any unit</param>
    public double Nearest(double value)
    {
        var (step, exponent) = Place(value);
        return Enumerable.Range(step - 1, 3).Select(n => At(n, exponent)).MinBy(v => Math.Abs(Math.Log(v / value)));
    }

    /// <summary>The values of the series next below and next above; a value of the series itself is neither.</summary>
    /// <param name="value">above zero, in any unit</param>
    public (double Below, double Above) Neighbours(double value)
    {
        var (step, exponent) = Place(value);
        var around = Enumerable.Range(step - 2, 5).Select(n => At(n, exponent)).Where(v => !IsSame(v, value)).ToList();
        return (around.Last(v => v < value), around.First(v => v > value));
    }

    public bool Contains(double value) => value > 0 && double.IsFinite(value) && IsSame(Nearest(value), value);

    private static bool IsSame(double a, double b) => Math.Abs(a - b) <= 1e-9 * b;

    private static ImmutableArray<int> ByRule(int steps) =>
        [.. Enumerable.Range(0, steps).Select(n => (int)Math.Round(100 * Math.Pow(10, (double)n / steps), MidpointRounding.AwayFromZero))];

    /// <summary>Position in the decade of the largest value that is not above, and the decade's power of ten.</summary>
    private (int Step, int Exponent) Place(double value)
    {
        if (!(value > 0) || double.IsInfinity(value)) throw new ArgumentOutOfRangeException(nameof(value), value, "preferred values are above zero");
        var exponent = (int)Math.Floor(Math.Log10(value));
        var step = 0;
        while (step + 1 < Values.Length && At(step + 1, exponent) <= value * (1 + 1e-9)) step++;
        return (step, exponent);
    }

    /// <summary>The n-th value from the start of a decade; n may lie in the decades before or after.</summary>
    private double At(int n, int exponent)
    {
        var decade = Math.DivRem(n, Values.Length, out var step);
        if (step < 0) (decade, step) = (decade - 1, step + Values.Length);
        return DecimalScale.Apply(Values[step], exponent + decade - digits + 1);
    }
}
