using System.Collections.Immutable;
using BenchCheck.Benchmarks.Scoreboard.Cases;
using BenchCheck.Core.Boards;
using BenchCheck.Core.Checking;

namespace BenchCheck.Benchmarks.Scoreboard.Scoring;

/// <summary>How right one group of suspects is.</summary>
/// <param name="Kind">kind of its leading member</param>
/// <param name="IsExact">its leading member is the truth to the letter</param>
/// <param name="IsNamed">one of its members is the truth under any of its names (<see cref="FaultIdentity"/>)</param>
/// <param name="IsAlike">… or looks the same in the readings taken (<see cref="Equivalence"/>)</param>
/// <param name="IsPartly">of two true faults one is among its members</param>
public sealed record GroupScore(double Probability, string Kind, string Text, bool IsExact, bool IsNamed, bool IsAlike, bool IsPartly);

/// <summary>Whether an interval held the true value.</summary>
public readonly record struct Coverage(ParameterKind Kind, Determination Determined, bool IsCovered);

/// <summary>What the program said of one case, held against the truth.</summary>
/// <param name="Verdict">null when the check failed</param>
/// <param name="Failure">type and message of the exception, when one came instead of a result</param>
/// <param name="Groups">in the order of the program, likeliest first</param>
/// <param name="Intervals">on healthy boards only</param>
public sealed record CaseScore(
    KnownCase Case, BoardVerdict? Verdict, string? Failure, TimeSpan Elapsed, ImmutableArray<GroupScore> Groups, ImmutableArray<Coverage> Intervals)
{
    public bool IsSingle => Case.Faults.Length == 1;

    public GroupScore? First => Groups.IsEmpty ? null : Groups[0];

    public bool IsFirst(Func<GroupScore, bool> credit) => Groups.Take(1).Any(credit);

    public bool IsInFirstThree(Func<GroupScore, bool> credit) => Groups.Take(3).Any(credit);
}
