using BenchCheck.Core.Boards;
using BenchCheck.Core.Quantities;

namespace BenchCheck.Core.Diagnosis.Faults;

/// <summary>Supplies and current sources: missing, off value, the wrong way round; controlled sources of another gain.</summary>
internal static class SourceFaults
{
    /// <summary>How far a wrong supply is sought: half its value either way, at least a volt.</summary>
    private static Nominal Wrong(double volts) => Nominal.Within(volts, Tolerance.Absolute(Math.Max(1, Math.Abs(volts) * 0.6)));

    public static IEnumerable<FaultHypothesis> Of(Board board)
    {
        foreach (var supply in board.Parts.OfType<Supply>())
        {
            var name = supply.Designator;
            var isAnywhere = supply.Volts.IsUnknown || supply.Volts.Value != 0 || board.Conditions.Any(c => c.Set.ContainsKey(name));
            if (!isAnywhere) continue;
            var missing = new FaultName(FaultKind.SupplyMissing, $"{name} missing or off") { Parts = [name] };
            yield return new FaultHypothesis(missing with { Text = $"{name} not connected" }, Alteration.OpenPin(board, supply, 0));
            yield return new FaultHypothesis(missing, Rescaled(board, supply, _ => Nominal.Within(0, Tolerance.Absolute(0.02))));
            yield return new FaultHypothesis(
                new FaultName(FaultKind.SupplyReversed, $"{name} the wrong way round") { Parts = [name] },
                board.With([Alteration.Exchange(supply, 0, 1)], []));
            if (supply.Volts.IsUnknown) continue;
            yield return new FaultHypothesis(
                new FaultName(FaultKind.SupplyWrong, $"{name} of another voltage") { Parts = [name] },
                Rescaled(board, supply, n => Wrong(n.Value)), new FreeNumber(name, ParameterKind.Voltage, supply.Volts.Value));
        }

        foreach (var source in board.Parts.OfType<CurrentSource>())
        {
            var name = source.Designator;
            yield return new FaultHypothesis(
                new FaultName(FaultKind.SupplyMissing, $"{name} missing or off") { Parts = [name] },
                board.With([source with { Amperes = Nominal.Exactly(0) }], []));
            yield return new FaultHypothesis(
                new FaultName(FaultKind.SupplyReversed, $"{name} the wrong way round") { Parts = [name] },
                board.With([Alteration.Exchange(source, 0, 1)], []));
            if (source.Amperes.IsUnknown) continue;
            yield return new FaultHypothesis(
                new FaultName(FaultKind.SupplyWrong, $"{name} of another current") { Parts = [name] },
                board.With([source with { Amperes = Nominal.Within(source.Amperes.Value, Tolerance.Percent(90)) }], []),
                new FreeNumber(name, ParameterKind.Current, source.Amperes.Value));
        }

        foreach (var source in board.Parts.OfType<ControlledSource>())
        {
            if (source.Gain.IsUnknown || source.Gain.Value == 0) continue;
            var gain = source.Gain.Value > 0
                ? Nominal.Between(source.Gain.Value / 20, source.Gain.Value * 20)
                : Nominal.Within(source.Gain.Value, Tolerance.Percent(300));
            yield return new FaultHypothesis(
                new FaultName(FaultKind.GainFarOff, $"{source.Designator}'s gain far off") { Parts = [source.Designator] },
                board.With([source with { Gain = gain }], []), new FreeNumber(source.Designator, source.Parameters[0].Kind, source.Gain.Value));
        }
    }

    /// <summary>The supply changed in every condition, those that set it included.</summary>
    private static Board Rescaled(Board board, Supply supply, Func<Nominal, Nominal> change)
    {
        var conditions = board.Conditions.Select(c => c.Set.TryGetValue(supply.Designator, out var set)
            ? c with { Set = c.Set.SetItem(supply.Designator, change(set)) }
            : c);
        return board.With([supply with { Volts = change(supply.Volts) }], []).In([.. conditions]);
    }
}
