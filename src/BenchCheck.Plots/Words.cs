using System.Globalization;
using BenchCheck.Core.Boards;
using BenchCheck.Core.Checking;
using BenchCheck.Core.Metering;
using BenchCheck.Core.Quantities;

namespace BenchCheck.Plots;

/// <summary>The words of the pictures and the report.</summary>
internal static class Words
{
    public static string Of(BoardVerdict verdict) => verdict switch
    {
        BoardVerdict.Agrees => "Agrees",
        BoardVerdict.Undecided => "Undecided",
        _ => "Disagrees",
    };

    public static string Of(ReadingVerdict verdict) => verdict switch
    {
        ReadingVerdict.In => "in",
        ReadingVerdict.Doubtful => "doubtful",
        _ => "out",
    };

    public static string Of(Determination determined) => determined switch
    {
        Determination.Yes => "yes",
        Determination.Partly => "partly",
        _ => "no",
    };

    public static string Value(double value, Unit unit) => EngineeringNotation.Format(value, unit);

    public static string Signed(double value, Unit unit) => (value > 0 ? "+" : "") + EngineeringNotation.Format(value, unit, 3);

    /// <summary>A pure number with its sign, three digits, never wider than a column.</summary>
    public static string Ratio(double value) => value switch
    {
        double.NaN => "unknown",
        double.PositiveInfinity => "+∞",
        double.NegativeInfinity => "-∞",
        _ => value.ToString(Math.Abs(value) switch { < 9.995 => "+0.00;-0.00;0.00", < 99999.5 => "+0;-0;0", _ => "+0.0E0;-0.0E0" }, CultureInfo.InvariantCulture),
    };

    /// <summary>"R3 resistance", "handheld, voltage, 6 V range: scale error", with the condition where the parameter belongs to one only.</summary>
    public static string Name(Estimate estimate) =>
        $"{estimate.Part}{(estimate.Kind == ParameterKind.ScaleError ? ":" : "")} {estimate.Kind.Name}" + (estimate.Condition is null ? "" : $" ({estimate.Condition})");
}
