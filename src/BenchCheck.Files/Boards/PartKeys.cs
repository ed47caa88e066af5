using System.Collections.Immutable;
using BenchCheck.Core.Boards;

namespace BenchCheck.Files;

/// <summary>A key that a kind of part may have in a board file.</summary>
/// <param name="Example">how its value is written</param>
/// <param name="IsRequired">false where a usual value is taken instead</param>
public sealed record PartKey(string Name, string Example, bool IsRequired);

/// <summary>Kinds of parts as a form asks for them: their pins and keys in the order in which a board file states them.</summary>
public static class PartKeys
{
    private static readonly PartKey Rating = new("rating", "0.25 W", false);
    private static readonly PartKey Note = new("note", "any text", false);

    /// <summary>Every kind that a board file knows, in the order of the usual parts list.</summary>
    public static ImmutableArray<string> Kinds => PartSyntax.Names;

    /// <summary>Pin names of a kind; empty for an unknown kind.</summary>
    public static ImmutableArray<string> PinsOf(string kind) => PartSyntax.Find(kind)?.Kind.Pins ?? [];

    /// <summary>Class letter of the kind's designators (IEEE 315).</summary>
    public static string LetterOf(string kind) => PartSyntax.Find(kind)?.Kind.Letter ?? "";

    public static ImmutableArray<PartKey> Of(string kind) => [.. Own(kind), Rating, Note];

    private static ImmutableArray<PartKey> Own(string kind)
    {
        var drop = new PartKey("drop", "0.65 V 10%", false);
        var at = new PartKey("at", "5 mA, the current of the data sheet's figures", false);
        PartKey Value(string example, bool isRequired = true) => new("value", example, isRequired);
        return PartSyntax.Find(kind)?.Kind is not { } found ? []
            : found == Resistor.PartKind ? [Value("4k7 5%, or ? for unknown")]
            : found == Potentiometer.PartKind ? [Value("10k 20%"), new("position", "0.5 10%, from the low end", false)]
            : found == Jumper.PartKind ? [Value("0.02", false)]
            : found == Switch.PartKind ? [new("state", "open or closed", false)]
            : found == Supply.PartKind ? [Value("12 V 1%"), new("resistance", "0.5 10%, in series", false)]
            : found == CurrentSource.PartKind ? [Value("1 mA 2%")]
            : found == Diode.Plain || found == Diode.Led ? [drop, at]
            : found == Diode.Zener ? [new("breakdown", "6.2 V 5%", true), drop, at]
            : found == Transistor.Npn || found == Transistor.Pnp
                ? [new("gain", "100..300", false), drop, new("saturation", "0.12 V 50%", false), new("output_resistance", "50k 50%", false), at]
            : found == Mosfet.NChannel || found == Mosfet.PChannel
                ? [new("on_resistance", "0.1 50%", false), new("threshold", "1.5 V 30%", false), new("transconductance", "0.2 50%, in siemens", false)]
            : found == Regulator.PartKind ? [Value("5 V 4%"), new("drop_out", "2 V 20%", false), new("idle_current", "5 mA 50%", false)]
            : found == OpAmp.PartKind ? [new("gain", "100k", false), new("offset", "2 mV", false), new("headroom", "1.5 V", false)]
            : found == Capacitor.PartKind ? [Value("10 uF 20%")]
            : found == Inductor.PartKind ? [Value("10 mH 10%"), new("resistance", "12 10%, of the winding", false)]
            : [new("gain", "2 1%", true), new("control", ControlOf(found), true)];
    }

    private static string ControlOf(PartKind kind) =>
        kind == ControlledSource.VoltageByVoltage || kind == ControlledSource.CurrentByVoltage ? "A, B: the two nodes" : "R1: the part whose current controls it";
}
