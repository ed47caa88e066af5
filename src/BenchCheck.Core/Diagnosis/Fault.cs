using System.Collections.Immutable;
using BenchCheck.Core.Checking;
using BenchCheck.Core.Fitting;

namespace BenchCheck.Core.Diagnosis;

/// <summary>A hypothesis fitted to the readings and scored.</summary>
/// <param name="Named">the fault under each of its names, with the value found; likeliest first</param>
/// <param name="LogRates">logarithm of the prior rate of each name</param>
/// <param name="Model">the board with the fault in it, read where the readings were taken</param>
/// <param name="Phi">where its fit ended</param>
/// <param name="Noise">variances of the readings under this hypothesis; large where it declares a reading wrong</param>
/// <param name="Explained">what each reading would be with this fault</param>
internal sealed record Fault(
    ImmutableArray<NamedFault> Named, ImmutableArray<double> LogRates, Evidence Evidence, BoardModel Model, double[] Phi, double[] Noise, double[] Explained)
{
    /// <summary>The reading that this fault declares wrong; −1 for a fault of the board.</summary>
    public int WrongReading { get; init; } = -1;

    /// <summary>True for the broad alternative that no listed fault explains the readings: it predicts nothing.</summary>
    public bool IsBroad { get; init; }

    /// <summary>Logarithm of prior times evidence, all names together.</summary>
    public double LogWeight => LogRate + Evidence.LogEvidence;

    /// <summary>Logarithm of the prior rate, all names together.</summary>
    public double LogRate => Math.Log(LogRates.Sum(Math.Exp));
}
