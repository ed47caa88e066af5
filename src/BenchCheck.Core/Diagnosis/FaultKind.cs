namespace BenchCheck.Core.Diagnosis;

/// <summary>Kinds of fault, by the words of the result file.</summary>
public static class FaultKind
{
    public const string None = "none";
    public const string Open = "open";
    public const string Shorted = "short";
    public const string WrongValue = "wrong value";
    public const string Leaky = "leaky";
    public const string HighResistanceJoint = "high-resistance joint";
    public const string Bridge = "bridge";
    public const string Reversed = "reversed";
    public const string Swapped = "swapped";
    public const string PinsExchanged = "pins exchanged";
    public const string WrongType = "wrong type";
    public const string BaseEmitterShort = "base-emitter short";
    public const string BaseEmitterOpen = "base-emitter open";
    public const string CollectorEmitterShort = "collector-emitter short";
    public const string CollectorBaseShort = "collector-base short";
    public const string GainFarOff = "gain far off";
    public const string StuckOutput = "stuck output";
    public const string SwitchPosition = "switch position";
    public const string SupplyMissing = "supply missing";
    public const string SupplyWrong = "supply wrong";
    public const string SupplyReversed = "supply reversed";
    public const string ReadingError = "reading error";
    public const string Unexplained = "unexplained";
}
