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

    public static string Number(double value, Unit unit) => EngineeringNotation.Format(value, unit);

    public static string Signed(double value, Unit unit) => (value >= 0 ? "+" : "") + EngineeringNotation.Format(value, unit, 3);

    public static string En(double value) => value.ToString(Math.Abs(value) < 100 ? "+0.0;-0.0;0.0" : "+0;-0;0", CultureInfo.InvariantCulture);

    public static string Percent(double share) =>
        share > 0.995 ? ">99 %" : share < 0.005 ? "<1 %" : Math.Round(100 * share).ToString("0", CultureInfo.InvariantCulture) + " %";
}
