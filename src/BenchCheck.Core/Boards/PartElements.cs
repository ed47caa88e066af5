namespace BenchCheck.Core.Boards;

/// <summary>
/// The elements of one part: the small vocabulary of branches into which every kind is resolved. Currents and voltages are
/// counted from the first terminal named to the second.
/// </summary>
public sealed class PartElements
{
    private readonly List<Conductor> conductors = [];
    private readonly List<VoltageBranch> voltageBranches = [];
    private readonly List<AmplifierBranch> amplifiers = [];
    private readonly List<CurrentBranch> currentBranches = [];
    private readonly List<Junction> junctions = [];
    private readonly List<Limit> limits = [];
    private readonly List<Reactance> reactances = [];

    public IReadOnlyList<Conductor> Conductors => conductors;
    public IReadOnlyList<VoltageBranch> VoltageBranches => voltageBranches;
    public IReadOnlyList<AmplifierBranch> Amplifiers => amplifiers;
    public IReadOnlyList<CurrentBranch> CurrentBranches => currentBranches;
    public IReadOnlyList<Junction> Junctions => junctions;
    public IReadOnlyList<Limit> Limits => limits;
    public IReadOnlyList<Reactance> Reactances => reactances;

    /// <summary>How many nodes the part has inside.</summary>
    public int InnerNodes { get; private set; }

    /// <summary>A node inside the part; its number goes on from those of the pins.</summary>
    public int AddInnerNode(int pins) => pins + InnerNodes++;

    public void Add(Conductor element) => conductors.Add(element);
    public void Add(VoltageBranch element) => voltageBranches.Add(element);
    public void Add(AmplifierBranch element) => amplifiers.Add(element);
    public void Add(CurrentBranch element) => currentBranches.Add(element);
    public void Add(Junction element) => junctions.Add(element);
    public void Add(Limit element) => limits.Add(element);
    public void Add(Reactance element) => reactances.Add(element);
}
