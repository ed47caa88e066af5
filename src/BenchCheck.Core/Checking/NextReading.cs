using System.Collections.Immutable;
using BenchCheck.Core.Metering;

namespace BenchCheck.Core.Checking;

/// <summary>A reading not yet taken, with what it is expected to tell.</summary>
/// <param name="Bits">expected information about the suspects (Lindley 1956)</param>
/// <param name="Expect">what each leading suspect predicts</param>
/// <param name="Caution">set where the node is hazardous or the reading needs the supplies removed</param>
/// <param name="Text">what to look for, in words</param>
public sealed record NextReading(
    string Condition, ReadingQuantity Quantity, string At, string? Against, double Bits, ImmutableArray<Expectation> Expect, string? Caution, string Text);

/// <summary>What one suspect predicts for a reading.</summary>
/// <param name="Suspect">position in <see cref="CheckResult.Suspects"/></param>
public sealed record Expectation(int Suspect, double Value, double StandardUncertainty);
