using BenchCheck.Core.Boards;
using BenchCheck.Core.Diagnosis.Faults;

namespace BenchCheck.Core.Diagnosis;

/// <summary>Every single fault that a board can have, each kind of fault from its own file.</summary>
public static class FaultCatalogue
{
    public static IEnumerable<FaultHypothesis> Of(Board board) =>
    [
        .. TwoPinFaults.Of(board), .. ShortFaults.Of(board), .. TransistorFaults.Of(board), .. SourceFaults.Of(board), .. SwapFaults.Of(board),
        .. OtherPartFaults.Of(board), .. ConditionFaults.Of(board),
    ];
}
