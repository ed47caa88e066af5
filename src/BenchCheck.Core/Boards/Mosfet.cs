using System.Collections.Immutable;
using BenchCheck.Core.Quantities;

namespace BenchCheck.Core.Boards;

/// <summary>An enhancement MOSFET, n or p channel, as a switch: its channel beyond a threshold, its body diode, no gate current.</summary>
/// <remarks>
/// Straight-line form: with z_F = (v_GS − threshold) / R_on and z_R = (v_GD − threshold) / R_on, each where positive, the drain current is
/// z_F − z_R. With both positive that is v_DS / R_on, the switch closed; with z_F alone a current that the gate sets; with neither, off.
/// </remarks>
/// <param name="OnOhms">drain to source, fully on</param>
/// <param name="Threshold">gate to source, positive for both polarities</param>
public sealed record Mosfet(PartKind Kind, string Designator, ImmutableArray<string> Nodes, Nominal OnOhms, Nominal Threshold) : Part(Kind, Designator, Nodes)
{
    public static readonly PartKind NChannel = new("nmos", ["drain", "gate", "source"], "Q");
    public static readonly PartKind PChannel = new("pmos", ["drain", "gate", "source"], "Q");

    public const int Drain = 0;
    public const int Gate = 1;
    public const int Source = 2;

    /// <summary>Taken when none is stated: small and power types; common practice, no source.</summary>
    public static readonly Nominal UsualOnOhms = Nominal.Between(0.05, 5);

    /// <summary>Taken when none is stated: common practice, no source.</summary>
    public static readonly Nominal UsualThreshold = Nominal.Between(1, 4);

    /// <summary>Share of the channel's current that the gate draws: none that could be read.</summary>
    private const double GateGain = 1e12;

    private const double BodyDrop = 0.7;
    private const double BodyIdeality = 1.5;
    private const double BodyOhms = 0.1;

    /// <summary>Transconductance at the operating point, siemens, for small signals; null when 1/R_on is meant.</summary>
    public Nominal? Siemens { get; init; }

    public bool IsNChannel => ReferenceEquals(Kind, NChannel);

    public override ImmutableArray<PartParameter> Parameters =>
    [
        new(ParameterKind.Resistance, OnOhms), new(ParameterKind.Threshold, Threshold),
        .. Siemens is null ? ImmutableArray<PartParameter>.Empty : [new(ParameterKind.Transconductance, Siemens)],
    ];

    public override void Describe(PartElements elements, string? setting)
    {
        var (none, gain, body) = (default(Coefficient), Coefficient.Constant(GateGain), Coefficient.Constant(BodyDrop));
        var siemens = Siemens is null ? none : Coefficient.Of(2);
        void Channel(int anode, int cathode, int from, int to, Coefficient slope, JunctionRole role) => elements.Add(
            new Junction(anode, cathode, Coefficient.Of(1), none, gain, from, to, 1, none, Coefficient.Of(0), role) { Siemens = slope });
        if (IsNChannel)
        {
            Channel(Gate, Source, Drain, Source, siemens, JunctionRole.Channel);
            Channel(Gate, Drain, Source, Drain, none, JunctionRole.ReverseChannel);
        }
        else
        {
            Channel(Source, Gate, Source, Drain, siemens, JunctionRole.Channel);
            Channel(Drain, Gate, Drain, Source, none, JunctionRole.ReverseChannel);
        }

        var (anode, cathode) = IsNChannel ? (Source, Drain) : (Drain, Source);
        elements.Add(new Junction(
            anode, cathode, body, none, Coefficient.Constant(1), -1, -1, 1e-3, Coefficient.Constant(BodyIdeality), Coefficient.Constant(BodyOhms), JunctionRole.Forward));
    }
}
