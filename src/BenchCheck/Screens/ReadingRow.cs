using System.Collections.Immutable;
using BenchCheck.Core.Checking;
using BenchCheck.Core.Metering;

namespace BenchCheck.Screens;

/// <summary>One row of the readings table: a place, with its reading or without.</summary>
/// <param name="Reading">null while nothing was read there</param>
/// <param name="Result">null while the check of this reading is not done</param>
/// <param name="Expected">what the meter should show and the band, where known</param>
internal sealed record ReadingRow(Place Place, Reading? Reading, ReadingResult? Result, Expected? Expected)
{
    public bool IsFlagged => Result is { Verdict: not ReadingVerdict.In };
}

/// <summary>What a healthy board would show at a place.</summary>
internal sealed record Expected(double Value, double Low, double High, ImmutableArray<Influence> Influences);
