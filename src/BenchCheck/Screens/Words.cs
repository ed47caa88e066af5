using System.Globalization;
using BenchCheck.Core.Checking;
using BenchCheck.Core.Quantities;

namespace BenchCheck.Screens;

/// <summary>Numbers and verdicts as the screen writes them; each verdict has a word and a mark beside its tone.</summary>
internal static class Words
{
    public static (string Text, Tone Tone) Of(ReadingVerdict verdict) => verdict switch
    {
        ReadingVerdict.In => ("in", Tone.Good),
        ReadingVerdict.Doubtful => ("doubtful ?", Tone.Doubt),
        _ => ("OUT !", Tone.Bad),
    };

    public static (string Text, Tone Tone) Of(BoardVerdict verdict) => verdict switch
    {
        BoardVerdict.Agrees => ("AGREES", Tone.Good),
        BoardVerdict.Undecided => ("UNDECIDED ?", Tone.Doubt),
        _ => ("DISAGREES !", Tone.Bad),
    };

    /// <summary>Below this no bench meter shows anything: leakage through junctions that are off.</summary>
    private const double LeastVolts = 1e-6;

    public static string Number(double value, Unit unit) => EngineeringNotation.Format(Shown(value, unit), unit);

    public static string Signed(double value, Unit unit) => (value >= 0 ? "+" : "") + EngineeringNotation.Format(Shown(value, unit), unit, 3);

    public static string Band(double low, double high, Unit unit) => EngineeringNotation.Range(Shown(low, unit), Shown(high, unit), unit, 4);

    /// <summary>Nothing is written as nothing, whatever the last digits of the equations say.</summary>
    private static double Shown(double value, Unit unit) => unit == Unit.Volt && Math.Abs(value) < LeastVolts ? 0 : value;

    public static string En(double value) => value.ToString(Math.Abs(value) < 100 ? "+0.0;-0.0;0.0" : "+0;-0;0", CultureInfo.InvariantCulture);

    public static string Percent(double share) =>
        share > 0.995 ? ">99 %" : share < 0.005 ? "<1 %" : Math.Round(100 * share).ToString("0", CultureInfo.InvariantCulture) + " %";
}
