using System.Collections.Immutable;
using BenchCheck.Core.Boards;
using BenchCheck.Core.Quantities;

namespace BenchCheck.Files;

/// <summary>How a kind of part is written in a board file: its word and the keys from which it is made.</summary>
/// <param name="Make">takes the kind's keys and makes the part, or returns null after reporting why not; second argument: nodes in pin order</param>
internal sealed record PartSyntax(PartKind Kind, Func<PartReader, ImmutableArray<string>, Part?> Make)
{
    private static readonly ImmutableArray<PartSyntax> All =
    [
        new(Resistor.PartKind, (p, nodes) =>
            p.Required("value", Unit.Ohm, UsualTolerance.Resistor, Limits.Resistance) is { } ohms ? new Resistor(p.Designator, nodes, ohms) : null),
        new(Potentiometer.PartKind, MakePotentiometer),
        new(Jumper.PartKind, MakeJumper),
        new(Switch.PartKind, MakeSwitch),
        new(Supply.PartKind, MakeSupply),
        new(CurrentSource.PartKind, (p, nodes) =>
            p.Required("value", Unit.Ampere, UsualTolerance.CurrentSource, Limits.Amperes) is { } amperes
                ? new CurrentSource(p.Designator, nodes, amperes) : null),
        new(Diode.Plain, (p, nodes) => MakeDiode(p, nodes, Diode.Plain, UsualTolerance.Drop, Diode.UsualDrop)),
        new(Diode.Led, (p, nodes) => MakeDiode(p, nodes, Diode.Led, UsualTolerance.LedDrop, Diode.UsualLedDrop)),
        new(Diode.Zener, (p, nodes) => MakeDiode(p, nodes, Diode.Zener, UsualTolerance.Drop, Diode.UsualDrop)),
        new(Transistor.Npn, (p, nodes) => MakeTransistor(p, nodes, Transistor.Npn)),
        new(Transistor.Pnp, (p, nodes) => MakeTransistor(p, nodes, Transistor.Pnp)),
        new(Mosfet.NChannel, (p, nodes) => MakeMosfet(p, nodes, Mosfet.NChannel)),
        new(Mosfet.PChannel, (p, nodes) => MakeMosfet(p, nodes, Mosfet.PChannel)),
        new(OpAmp.PartKind, MakeOpAmp),
        new(Regulator.PartKind, MakeRegulator),
        new(Capacitor.PartKind, (p, nodes) =>
            p.Required("value", Unit.Farad, UsualTolerance.Capacitor, Limits.Farads) is { } farads ? new Capacitor(p.Designator, nodes, farads) : null),
        new(Inductor.PartKind, MakeInductor),
        new(ControlledSource.VoltageByVoltage, (p, nodes) => MakeControlled(p, nodes, ControlledSource.VoltageByVoltage, Unit.One)),
        new(ControlledSource.CurrentByVoltage, (p, nodes) => MakeControlled(p, nodes, ControlledSource.CurrentByVoltage, Unit.Siemens)),
        new(ControlledSource.VoltageByCurrent, (p, nodes) => MakeControlled(p, nodes, ControlledSource.VoltageByCurrent, Unit.Ohm)),
        new(ControlledSource.CurrentByCurrent, (p, nodes) => MakeControlled(p, nodes, ControlledSource.CurrentByCurrent, Unit.One)),
    ];

    /// <summary>Every word that <c>kind</c> may be.</summary>
    public static ImmutableArray<string> Names { get; } = [.. All.Select(s => s.Kind.Name)];

    public static PartSyntax? Find(string kind) => All.FirstOrDefault(s => s.Kind.Name == kind);

    private static Potentiometer? MakePotentiometer(PartReader p, ImmutableArray<string> nodes)
    {
        var ohms = p.Required("value", Unit.Ohm, UsualTolerance.Potentiometer, Limits.Resistance);
        var position = p.OrUsual("position", Unit.One, UsualTolerance.Position, Limits.Position, UsualTolerance.AnyPosition);
        if (ohms is null || position is null) return null;
        var any = UsualTolerance.AnyPosition;
        if (position.IsUnknown) position = any;
        var (low, high) = (Math.Max(position.Low, any.Low), Math.Min(position.High, any.High));
        if (low > position.Low || high < position.High) position = Nominal.Between(Math.Min(low, any.High), Math.Max(high, any.Low));
        return new Potentiometer(p.Designator, nodes, ohms, position);
    }

    private static Jumper? MakeJumper(PartReader p, ImmutableArray<string> nodes)
    {
        if (p.OrUsual("value", Unit.Ohm, UsualTolerance.Jumper, Limits.LinkResistance, Jumper.UsualOhms) is not { } ohms) return null;
        if (ohms.IsUnknown || ohms.Low > 0) return new Jumper(p.Designator, nodes, ohms);

        // "0" is what the parts list says of a link; what the board has is the resistance of wire and joints.
        p.Assume($"zero ohms stated, {EngineeringNotation.Range(Jumper.UsualOhms.Low, Jumper.UsualOhms.High, Unit.Ohm)} taken for wire and joints");
        return new Jumper(p.Designator, nodes, Jumper.UsualOhms);
    }

    private static Switch? MakeSwitch(PartReader p, ImmutableArray<string> nodes)
    {
        if (!p.Has("state"))
        {
            p.Assume("no state stated, open taken");
            return new Switch(p.Designator, nodes, false);
        }

        if (p.Table.TakeText("state") is not { } state) return null;
        if (state.Text is Switch.Open or Switch.Closed) return new Switch(p.Designator, nodes, state.Text == Switch.Closed);
        p.Table.Problems.Error(state.Place, $"{p.Designator}: state {TextFault.Quote(state.Text)}", "\"open\" or \"closed\"",
            NearMiss.Suggest(state.Text, [Switch.Open, Switch.Closed]));
        return null;
    }

    private static Supply? MakeSupply(PartReader p, ImmutableArray<string> nodes)
    {
        var volts = p.Required("value", Unit.Volt, UsualTolerance.Supply, Limits.Volts);
        var ohms = p.Optional("resistance", Unit.Ohm, UsualTolerance.SeriesResistance, Limits.SeriesResistance);
        if (volts is null || (ohms is null && p.Has("resistance"))) return null;
        if (volts.Value == 0 && volts.High < UsualTolerance.SupplyFloor) volts = Nominal.Within(0, Tolerance.Absolute(UsualTolerance.SupplyFloor));
        return new Supply(p.Designator, nodes, volts, ohms);
    }

    private static Diode? MakeDiode(PartReader p, ImmutableArray<string> nodes, PartKind kind, Tolerance usual, Nominal usualDrop)
    {
        var drop = p.OrUsual("drop", Unit.Volt, usual, Limits.Drop, usualDrop);
        var at = p.Table.TakeNumber("at", Unit.Ampere, Limits.StatedAmperes);
        if (!ReferenceEquals(kind, Diode.Zener))
        {
            if (drop is null) return null;
            var diode = new Diode(kind, p.Designator, nodes, drop);
            return at is { } forward ? diode with { ReferenceAmperes = forward } : diode;
        }

        var breakdown = p.Required("breakdown", Unit.Volt, UsualTolerance.Breakdown, Limits.PositiveVolts);
        if (drop is null || breakdown is null) return null;
        var zener = new Diode(kind, p.Designator, nodes, drop, breakdown);
        return at is { } test ? zener with { BreakdownAmperes = test } : zener;
    }

    private static Transistor? MakeTransistor(PartReader p, ImmutableArray<string> nodes, PartKind kind)
    {
        var gain = p.OrUsual("gain", Unit.One, UsualTolerance.TransistorGain, Limits.TransistorGain, Transistor.UsualGain);
        var drop = p.OrUsual("drop", Unit.Volt, UsualTolerance.Drop, Limits.Drop, Transistor.UsualDrop);
        var saturation = p.OrUsual("saturation", Unit.Volt, UsualTolerance.Saturation, Limits.Saturation, Transistor.UsualSaturation);
        var output = p.Optional("output_resistance", Unit.Ohm, UsualTolerance.OutputResistance, Limits.SeriesResistance);
        if (gain is null || drop is null || saturation is null || (output is null && p.Has("output_resistance"))) return null;
        return new Transistor(kind, p.Designator, nodes, gain, drop, saturation)
        {
            OutputOhms = output,
            StatedAmperes = p.Table.TakeNumber("at", Unit.Ampere, Limits.StatedAmperes),
        };
    }

    private static Mosfet? MakeMosfet(PartReader p, ImmutableArray<string> nodes, PartKind kind)
    {
        var ohms = p.OrUsual("on_resistance", Unit.Ohm, UsualTolerance.OnResistance, Limits.SeriesResistance, Mosfet.UsualOnOhms);
        var threshold = p.OrUsual("threshold", Unit.Volt, UsualTolerance.Threshold, Limits.PositiveVolts, Mosfet.UsualThreshold);
        var siemens = p.Optional("transconductance", Unit.Siemens, UsualTolerance.OutputResistance, Limits.ControlledGain);
        if (ohms is null || threshold is null || (siemens is null && p.Has("transconductance"))) return null;
        return new Mosfet(kind, p.Designator, nodes, ohms, threshold) { Siemens = siemens };
    }

    private static Regulator? MakeRegulator(PartReader p, ImmutableArray<string> nodes)
    {
        var volts = p.Required("value", Unit.Volt, UsualTolerance.Regulator, Limits.PositiveVolts);
        var dropOut = p.OrUsual("drop_out", Unit.Volt, UsualTolerance.DropOut, Limits.PositiveVolts, Regulator.UsualDropOut);
        var idle = p.OrUsual("idle_current", Unit.Ampere, UsualTolerance.IdleCurrent, Limits.StatedAmperes with { Hint = null }, Regulator.UsualIdleAmperes);
        return volts is null || dropOut is null || idle is null ? null : new Regulator(p.Designator, nodes, volts, dropOut, idle);
    }

    private static OpAmp? MakeOpAmp(PartReader p, ImmutableArray<string> nodes)
    {
        var gain = p.Optional("gain", Unit.One, UsualTolerance.AmplifierGain, Limits.AmplifierGain);
        var headroom = OpAmp.UsualHeadroom;
        if (p.Has("headroom"))
        {
            if (p.Table.TakeNumber("headroom", Unit.Volt, Limits.Headroom) is not { } stated) return null;
            headroom = stated;
        }
        else
        {
            p.Assume($"no headroom stated, {EngineeringNotation.Format(headroom, Unit.Volt, 2)} taken");
        }

        if (Offset(p) is not { } offset || (gain is null && p.Has("gain"))) return null;
        return new OpAmp(p.Designator, nodes, gain, offset, headroom);
    }

    /// <summary>Data sheets state an offset as its largest magnitude, so one without a tolerance lies anywhere between both signs.</summary>
    private static Nominal? Offset(PartReader p)
    {
        if (!p.Has("offset")) return p.OrUsual("offset", Unit.Volt, default, Limits.OffsetVolts, OpAmp.UsualOffset);
        if (p.Table.TakeNominal("offset", Unit.Volt, default, Limits.OffsetVolts) is not { } offset) return null;
        if (!offset.ToleranceAssumed) return offset;
        p.Assume($"offset read as up to {EngineeringNotation.Format(Math.Abs(offset.Value), Unit.Volt, 3)} of either sign");
        return Nominal.Within(0, Tolerance.Absolute(Math.Abs(offset.Value)));
    }

    private static Inductor? MakeInductor(PartReader p, ImmutableArray<string> nodes)
    {
        var henries = p.Required("value", Unit.Henry, UsualTolerance.Inductor, Limits.Henries);
        var winding = p.OrUsual("resistance", Unit.Ohm, UsualTolerance.SeriesResistance, Limits.Resistance with { Hint = null }, UsualTolerance.Winding);
        return henries is null || winding is null ? null : new Inductor(p.Designator, nodes, henries, winding);
    }

    private static ControlledSource? MakeControlled(PartReader p, ImmutableArray<string> nodes, PartKind kind, Unit unit)
    {
        var gain = p.Required("gain", unit, UsualTolerance.ControlledGain, Limits.ControlledGain);
        var byVoltage = ReferenceEquals(kind, ControlledSource.VoltageByVoltage) || ReferenceEquals(kind, ControlledSource.CurrentByVoltage);
        var expected = byVoltage ? "control = [\"node\", \"node\"]" : "control = \"R1\", the part whose current controls it";
        Control? control = p.Table.Take("control")?.Value switch
        {
            TomlList { Items: [TomlText plus, TomlText minus] } when byVoltage => new Control.NodePair(plus.Text, minus.Text),
            TomlText part when !byVoltage => new Control.PartCurrent(part.Text),
            _ => null,
        };
        if (control is null)
            p.Table.Problems.Error(p.Table.Take("control")?.Value.Place ?? p.Table.Place, $"{p.Designator}: no usable control", expected);
        return gain is null || control is null ? null : new ControlledSource(kind, p.Designator, nodes, gain, control);
    }
}
