using System.Collections.Immutable;
using BenchCheck.Core.Boards;
using BenchCheck.Core.Metering;
using BenchCheck.Core.Quantities;

namespace BenchCheck.Benchmarks.Scoreboard.Boards;

/// <summary>Writes a board down part by part; the reference is GND, the meter the usual hand-held.</summary>
internal sealed class BoardDraft(string title, BoardOrigin origin)
{
    private readonly List<Part> parts = [];
    private readonly List<Condition> conditions = [];

    public BoardDraft Supply(string name, string plus, double volts, double percent = 1, string minus = "GND") =>
        Add(new Supply(name, [plus, minus], Nominal.Within(volts, SupplyTolerance(volts, percent))));

    public BoardDraft R(string name, string a, string b, double ohms, double percent = 5) =>
        Add(new Resistor(name, [a, b], Nominal.Within(ohms, Tolerance.Percent(percent))));

    public BoardDraft Pot(string name, string low, string wiper, string high, double ohms, double position) =>
        Add(new Potentiometer(name, [low, wiper, high], Nominal.Within(ohms, Tolerance.Percent(10)), Nominal.Within(position, Tolerance.Absolute(0.03))));

    public BoardDraft C(string name, string a, string b, double farads) =>
        Add(new Capacitor(name, [a, b], Nominal.Within(farads, Tolerance.Percent(20))));

    public BoardDraft Coil(string name, string a, string b, double ohms) =>
        Add(new Inductor(name, [a, b], Nominal.Within(0.1, Tolerance.Percent(20)), Nominal.Within(ohms, Tolerance.Percent(10))));

    public BoardDraft Npn(string name, string collector, string @base, string emitter, double low, double high) =>
        Add(Bipolar(Transistor.Npn, name, collector, @base, emitter, low, high));

    public BoardDraft Pnp(string name, string collector, string @base, string emitter, double low, double high) =>
        Add(Bipolar(Transistor.Pnp, name, collector, @base, emitter, low, high));

    public BoardDraft D(string name, string anode, string cathode) => Add(new Diode(Diode.Plain, name, [anode, cathode], Diode.UsualDrop));

    public BoardDraft Led(string name, string anode, string cathode, double volts) =>
        Add(new Diode(Diode.Led, name, [anode, cathode], Nominal.Within(volts, Tolerance.Absolute(0.15))));

    public BoardDraft Zener(string name, string anode, string cathode, double volts) =>
        Add(new Diode(Diode.Zener, name, [anode, cathode], Diode.UsualDrop, Nominal.Within(volts, Tolerance.Percent(5))));

    public BoardDraft Switch(string name, string a, string b, bool isClosed) => Add(new Switch(name, [a, b], isClosed));

    /// <summary>A condition that sets a supply.</summary>
    public BoardDraft With(string condition, string supply, double volts, double percent = 1) =>
        Add(Condition.Powered with
        {
            Name = condition,
            Set = ImmutableDictionary<string, Nominal>.Empty.Add(supply, Nominal.Within(volts, SupplyTolerance(volts, percent))),
        });

    /// <summary>A condition that puts a switch into a position.</summary>
    public BoardDraft With(string condition, string name, string position) =>
        Add(Condition.Powered with { Name = condition, Switches = ImmutableDictionary<string, string>.Empty.Add(name, position) });

    public Bench Bench() => new(new Board(title, "GND", origin, [.. parts], [.. conditions]), [Meter.Usual], []);

    /// <summary>No supply on a bench is steadier than 10 mV.</summary>
    private static Tolerance SupplyTolerance(double volts, double percent) => Tolerance.Absolute(Math.Max(0.01, Math.Abs(volts) * percent / 100));

    private static Transistor Bipolar(PartKind kind, string name, string collector, string @base, string emitter, double low, double high) =>
        new(kind, name, [collector, @base, emitter], Nominal.Between(low, high), Transistor.UsualDrop, Transistor.UsualSaturation);

    private BoardDraft Add(Part part)
    {
        parts.Add(part);
        return this;
    }

    private BoardDraft Add(Condition condition)
    {
        conditions.Add(condition);
        return this;
    }
}
