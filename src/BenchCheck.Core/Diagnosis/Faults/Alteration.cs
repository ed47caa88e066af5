using BenchCheck.Core.Boards;
using BenchCheck.Core.Quantities;

namespace BenchCheck.Core.Diagnosis.Faults;

/// <summary>What faults do to a board's connections.</summary>
internal static class Alteration
{
    /// <summary>Resistance of a short or a solder bridge: common practice, no source.</summary>
    private static readonly Nominal ShortOhms = Nominal.Exactly(0.05);

    /// <summary>Resistances met at a bad joint, through which some current still flows.</summary>
    private static readonly Nominal JointOhms = Nominal.Between(20, 1e6);

    /// <summary>One pin lifted off its node. A space keeps the new node's name apart from any that a file can give.</summary>
    public static Board OpenPin(Board board, Part part, int pin) => board.With([Lift(board, part, pin)], []);

    public static Board ShortNodes(Board board, string a, string b) => board.With([], [new Resistor(NewName(board, $"short {a} {b}"), [a, b], ShortOhms)]);

    /// <summary>A resistance between one pin and its node.</summary>
    public static (Board Board, FreeNumber Free) BadJoint(Board board, Part part, int pin)
    {
        var joint = new Resistor(NewName(board, $"joint {part.JointName(pin)}"), [part.Nodes[pin], Bare(board, part, pin)], JointOhms);
        return (board.With([Lift(board, part, pin)], [joint]), new FreeNumber(joint.Designator, ParameterKind.Resistance, double.NaN));
    }

    public static Part Exchange(Part part, int pin, int other) => part with
    {
        Nodes = part.Nodes.SetItem(pin, part.Nodes[other]).SetItem(other, part.Nodes[pin]),
    };

    /// <summary>A designator that no file can give, because of its spaces, and that no earlier fault has taken.</summary>
    public static string NewName(Board board, string text) => $"{text} {board.Parts.Length}";

    private static Part Lift(Board board, Part part, int pin) => part with { Nodes = part.Nodes.SetItem(pin, Bare(board, part, pin)) };

    private static string Bare(Board board, Part part, int pin) => NewName(board, $"lifted {part.JointName(pin)}");
}
