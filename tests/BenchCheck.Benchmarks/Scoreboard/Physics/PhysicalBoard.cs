using System.Collections.Immutable;
using BenchCheck.Core.Boards;

namespace BenchCheck.Benchmarks.Scoreboard.Physics;

/// <summary>One real specimen of a board: parts with the values that they happen to have.</summary>
public sealed record PhysicalBoard(Board Design, ImmutableArray<PhysicalPart> Parts)
{
    /// <summary>Resistance of a supply's leads.</summary>
    private const double LeadOhms = 0.05;

    /// <summary>A specimen of the design, its parts drawn from their tolerances at some room temperature.</summary>
    public static PhysicalBoard Of(Board design, Draw draw)
    {
        var celsius = draw.Uniform(15, 35);
        return new PhysicalBoard(design, [.. design.Parts.Select(p => Specimen(p, design, draw, celsius))]);
    }

    public PhysicalPart Find(string designator) => Parts.First(p => p.Designator == designator);

    public PhysicalBoard With(PhysicalPart part) =>
        this with { Parts = [.. Parts.Select(p => p.Designator == part.Designator ? part : p)] };

    public PhysicalBoard Add(PhysicalPart part) => this with { Parts = Parts.Add(part) };

    public TruthCircuit Circuit(Condition condition)
    {
        var circuit = new TruthCircuit(Design.Reference);
        foreach (var node in Design.Nodes) circuit.Node(node);
        foreach (var part in Parts) part.Place(circuit, condition);
        return circuit;
    }

    /// <summary>Each part a little warmer than the room, by its own losses.</summary>
    private static PhysicalPart Specimen(Part part, Board design, Draw draw, double celsius) => part switch
    {
        Resistor r => new PhysicalResistor(r.Designator, r.Nodes, draw.Within(r.Ohms)),
        Jumper j => new PhysicalResistor(j.Designator, j.Nodes, draw.Within(j.Ohms)),
        Inductor l => new PhysicalResistor(l.Designator, l.Nodes, draw.Within(l.WindingOhms)),
        Capacitor c => new PhysicalCapacitor(c.Designator, c.Nodes),
        Potentiometer p => new PhysicalPotentiometer(p.Designator, p.Nodes, draw.Within(p.Ohms), draw.Within(p.Position)),
        Switch s => new PhysicalSwitch(s.Designator, s.Nodes, s.IsClosed, draw.LogUniform(0.05, 0.2), false),
        Supply v => new PhysicalSource(
            v.Designator, v.Nodes, draw.Within(v.Volts), v.SourceOhms is null ? LeadOhms : Math.Max(LeadOhms, draw.Within(v.SourceOhms)),
            design.Conditions.Where(c => c.Set.ContainsKey(v.Designator)).ToImmutableDictionary(c => c.Name, c => draw.Within(c.Set[v.Designator]))),
        CurrentSource i => new PhysicalCurrentSource(i.Designator, i.Nodes, draw.Within(i.Amperes)),
        Diode d => PhysicalDiode.Of(d, draw, celsius + draw.Uniform(0, 3)),
        Transistor q => PhysicalTransistor.Of(q, draw, celsius + draw.Uniform(0, 3)),
        _ => throw new NotSupportedException($"{part.Designator}: the truth generator has no {part.Kind.Name}"),
    };
}
