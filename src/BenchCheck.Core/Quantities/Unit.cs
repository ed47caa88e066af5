namespace BenchCheck.Core.Quantities;

/// <summary>A unit of measurement: SI units without prefix; the number beside it is always in that unit.</summary>
/// <param name="Symbol">the symbol as printed and as written in JSON; "1" for a pure ratio</param>
public readonly record struct Unit(string Symbol)
{
    public static readonly Unit One = new("1");
    public static readonly Unit Volt = new("V");
    public static readonly Unit Ampere = new("A");
    public static readonly Unit Ohm = new("Ω");
    public static readonly Unit Siemens = new("S");
    public static readonly Unit Watt = new("W");
    public static readonly Unit Farad = new("F");
    public static readonly Unit Henry = new("H");
    public static readonly Unit Hertz = new("Hz");
    public static readonly Unit Celsius = new("°C");

    public override string ToString() => Symbol;
}
