using BenchCheck.Core.Checking;

namespace BenchCheck.Files;

/// <summary>The words of the result files for verdicts; fixed within a major version.</summary>
public static class ResultWords
{
    public static string Of(ReadingVerdict verdict) => verdict switch
    {
        ReadingVerdict.In => "in",
        ReadingVerdict.Doubtful => "doubtful",
        ReadingVerdict.Out => "out",
        _ => throw new ArgumentOutOfRangeException(nameof(verdict)),
    };

    public static string Of(BoardVerdict verdict) => verdict switch
    {
        BoardVerdict.Agrees => "agrees",
        BoardVerdict.Undecided => "undecided",
        BoardVerdict.Disagrees => "disagrees",
        _ => throw new ArgumentOutOfRangeException(nameof(verdict)),
    };

    /// <summary>The verdict of a word; null when it is none.</summary>
    public static BoardVerdict? BoardVerdictOf(string? word) => word switch
    {
        "agrees" => BoardVerdict.Agrees,
        "undecided" => BoardVerdict.Undecided,
        "disagrees" => BoardVerdict.Disagrees,
        _ => null,
    };

    public static string Of(Determination determined) => determined switch
    {
        Determination.Yes => "yes",
        Determination.Partly => "partly",
        Determination.No => "no",
        _ => throw new ArgumentOutOfRangeException(nameof(determined)),
    };
}
