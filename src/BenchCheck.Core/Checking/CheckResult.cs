using System.Collections.Immutable;
using BenchCheck.Core.Boards;
using BenchCheck.Core.Metering;
using BenchCheck.Core.Quantities;

namespace BenchCheck.Core.Checking;

/// <summary>Everything that one check found: the single value that every face of the program shows.</summary>
public sealed record CheckResult
{
    public required string BoardTitle { get; init; }

    /// <summary>Node that voltages are counted against unless a reading says otherwise.</summary>
    public required string Reference { get; init; }

    public string? Serial { get; init; }

    public required BoardVerdict Verdict { get; init; }

    /// <summary>One sentence that says why the verdict is what it is.</summary>
    public required string Reason { get; init; }

    /// <summary>Prior chi-squared of the readings as a whole: differences from the prediction against the uncertainties of both.</summary>
    public required double ChiSquared { get; init; }

    public required int DegreesOfFreedom { get; init; }

    /// <summary>Probability that a healthy board gives readings this far off or further.</summary>
    public required double PValue { get; init; }

    /// <summary>In the order of the readings file.</summary>
    public required ImmutableArray<ReadingResult> Readings { get; init; }

    /// <summary>What a meter would show where no reading was taken: every other node of every condition in use.</summary>
    public ImmutableArray<UnmeasuredNode> Unmeasured { get; init; } = [];

    public required ImmutableArray<Estimate> Parameters { get; init; }

    /// <summary>Pairs of estimates that the readings cannot tell apart well, strongest first.</summary>
    public ImmutableArray<CorrelatedPair> Correlated { get; init; } = [];

    public required ImmutableArray<DeviceState> States { get; init; }

    public required ImmutableArray<Dissipation> Dissipation { get; init; }

    /// <summary>Fault groups, likeliest first; empty when the faults were not searched.</summary>
    public ImmutableArray<Suspect> Suspects { get; init; } = [];

    /// <summary>Readings not yet taken, those that tell most first.</summary>
    public ImmutableArray<NextReading> Next { get; init; } = [];

    public required ImmutableArray<string> Cautions { get; init; }

    public required ImmutableArray<string> Assumed { get; init; }

    /// <summary>What the reader of the result should know about the computation itself (a fit that stopped early), plain sentences.</summary>
    public ImmutableArray<string> Remarks { get; init; } = [];
}

/// <summary>One reading beside its prediction.</summary>
/// <param name="Reading">as read</param>
/// <param name="StandardUncertainty">of the reading: meter and repeats, without the part tolerances</param>
/// <param name="Predicted">what the meter would show on a board of nominal parts</param>
/// <param name="BandLow">lower end of what tolerances (not the meter) allow</param>
/// <param name="BandHigh">upper end</param>
/// <param name="Difference">measured − predicted</param>
/// <param name="En">difference over the expanded uncertainty of the difference (ISO 13528)</param>
/// <param name="Fitted">what the fitted board would show</param>
/// <param name="NormalisedResidual">(measured − fitted) over the standard deviation of that residual; NaN when the fit passes through the reading whatever it is</param>
public sealed record ReadingResult(
    Reading Reading, double StandardUncertainty, double Predicted, double BandLow, double BandHigh, double Difference, double En,
    ReadingVerdict Verdict, double Fitted, double NormalisedResidual)
{
    /// <summary>Expanded uncertainty of the difference, meter and tolerances together, in the unit of the reading: what En is measured in.</summary>
    public double ExpandedUncertainty { get; init; } = Difference / En;

    /// <summary>Parts that move the prediction most, with the share of the band's variance each holds, largest first.</summary>
    public ImmutableArray<Influence> Influences { get; init; } = [];
}

/// <summary>How much of the uncertainty of a predicted reading comes from one parameter.</summary>
/// <param name="PerUnit">normalised sensitivity: change of the reading, in its unit, for a 1 % (or 10 mV) rise of the parameter</param>
public sealed record Influence(string Part, ParameterKind Parameter, double Share, double PerUnit);

/// <summary>A node without a reading, with what the meter would show there.</summary>
public sealed record UnmeasuredNode(string Condition, string Node, double Predicted, double BandLow, double BandHigh, double Fitted);

/// <summary>A fitted parameter.</summary>
/// <param name="Part">designator; for a scale error the meter, function and range</param>
/// <param name="Condition">set when the parameter belongs to one condition only (a supply that the condition sets)</param>
/// <param name="Nominal">what the parts list said; NaN for an unknown</param>
/// <param name="Low">lower end of the 95 % coverage interval</param>
/// <param name="High">upper end; positive infinity when the readings and the parts list set none</param>
public sealed record Estimate(
    string Part, ParameterKind Kind, string? Condition, double Nominal, double NominalLow, double NominalHigh, double Value,
    double StandardUncertainty, double Low, double High, Determination Determined)
{
    /// <summary>The same with the board's lot in place of the parts list; null when no lot was taken.</summary>
    public LotEstimate? WithLot { get; init; }
}

/// <summary>An estimate that a lot of like boards has tightened, in the unit of the parameter.</summary>
public sealed record LotEstimate(double Value, double StandardUncertainty);

public sealed record CorrelatedPair(Estimate First, Estimate Second, double Correlation);

/// <summary>Operating state of a device in a condition: active, saturated, off, reversed; conducting, off, breakdown; linear, high, low.</summary>
/// <param name="Remark">what follows for the estimates ("the gain is at least 23"); null for nothing</param>
public sealed record DeviceState(string Part, string Condition, string State, string? Remark = null);

/// <summary>Power turned into heat in a part, in the condition in which it is greatest.</summary>
public sealed record Dissipation(string Part, string Condition, double Watts, double? RatedWatts)
{
    public bool IsOver => RatedWatts is { } rated && Watts > rated;
}
