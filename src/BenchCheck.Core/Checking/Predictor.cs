using System.Collections.Immutable;
using BenchCheck.Core.Boards;
using BenchCheck.Core.Equations;
using BenchCheck.Core.Fitting;
using BenchCheck.Core.Metering;
using BenchCheck.Core.Quantities;

namespace BenchCheck.Core.Checking;

/// <summary>Predicts a healthy board: node voltages as the first meter would show them, small signals, currents, states, power.</summary>
public static class Predictor
{
    /// <param name="between">two nodes between which to look in; null for none</param>
    /// <param name="drawn">told how many draws of a Monte Carlo band are done</param>
    /// <exception cref="NoOperatingStateException">the board as drawn has no operating state</exception>
    public static Prediction Predict(Bench bench, CheckSettings settings, (string At, string Against)? between = null, Action<int>? drawn = null)
    {
        ArgumentNullException.ThrowIfNull(bench);
        ArgumentNullException.ThrowIfNull(settings);
        var board = bench.Board;
        var conditions = board.Conditions.Where(c => !c.IsSmallSignal && !c.SuppliesRemoved).ToArray();
        Probe[] nodes = [.. conditions.SelectMany(c => board.Nodes.Skip(1).Select(n => new Probe(c.Name, ReadingQuantity.Voltage, n, null, bench.Meters[0], 1)))];
        Probe[] places = [.. nodes, .. board.Conditions.Where(c => c.IsSmallSignal).SelectMany(c => Signals(board, c, bench.Meters[0]))];
        var model = BoardModel.AtPlaces(board, places, new NetworkSolver(settings.Law));
        double[] start = [.. model.Parameters.Select(p => p.Mean)];
        var predicted = new double[places.Length];
        var jacobian = new double[places.Length * start.Length];
        model.Predict(start, predicted, jacobian);
        var bands = PredictedBand.Of(model, start, predicted, jacobian, settings, drawn);
        ImmutableArray<Influence> InfluencesAt(int i) => Influences.Of(model, jacobian.AsSpan(i * start.Length, start.Length));
        var points = conditions.Select(c => model.Operate(start, c)).ToArray();
        var highest = nodes.Select((p, i) => (Volts: Math.Abs(predicted[i]), Place: p.At)).DefaultIfEmpty((0, "")).MaxBy(x => x.Item1);
        return new Prediction
        {
            BoardTitle = board.Title,
            Reference = board.Reference,
            Nodes =
            [
                .. nodes.Select((p, i) => new PredictedNode(
                    p.Condition, p.At, predicted[i], bands[i].Low, bands[i].High, points[Array.FindIndex(conditions, c => c.Name == p.Condition)].TheveninOhms(p.At), InfluencesAt(i))),
            ],
            Signals =
            [
                .. Enumerable.Range(nodes.Length, places.Length - nodes.Length).Select(i => new PredictedSignal(
                    places[i].Condition, places[i].Quantity, places[i].At, places[i].Against, predicted[i], bands[i].Low, bands[i].High, InfluencesAt(i))),
            ],
            LookingIn = between is { } pair ? [.. board.Conditions.Select(c => LookIn(board, c, pair, model, start, bench.Meters[0]))] : [],
            Currents = [.. points.SelectMany(p => p.Currents().Select(c => new PredictedCurrent(p.Condition.Name, c.At, c.Amperes)))],
            States = [.. points.SelectMany(p => OperatingReport.States(board, p))],
            Dissipation = OperatingReport.Dissipation(board, points),
            Cautions = Cautions.For(highest.Item1, highest.Item2),
            Assumed =
            [
                .. bench.Assumed, .. SmallSignalAssumptions.Of(board),
                .. board.Parts.SelectMany(p => p.Parameters.Where(x => x.Nominal.IsUnknown).Select(x =>
                    $"{p.Designator}: {x.Kind} unknown, predicted with {EngineeringNotation.Format(FitParameter.StartOf(x.Kind), x.Kind.Unit)}")),
            ],
        };
    }

    /// <summary>From the generator the gain to every node and the resistance that it meets; at every other node the resistance looking in.</summary>
    private static IEnumerable<Probe> Signals(Board board, Condition condition, Meter meter)
    {
        var reference = board.Reference;
        Probe Signal(ReadingQuantity quantity, string at, string against) => new(condition.Name, quantity, at, against, meter, 1) { IsSmallSignal = true };
        var driven = condition.Drive is { } drive && drive.Against == reference ? drive.At : null;
        if (driven is not null)
        {
            foreach (var node in board.Nodes.Skip(1).Where(n => n != driven)) yield return Signal(ReadingQuantity.Gain, node, driven);
            yield return Signal(ReadingQuantity.InputResistance, driven, reference);
        }

        foreach (var node in board.Nodes.Skip(1).Where(n => n != driven)) yield return Signal(ReadingQuantity.OutputResistance, node, reference);
    }

    private static LookingIn LookIn(Board board, Condition condition, (string At, string Against) pair, BoardModel model, double[] start, Meter meter)
    {
        if (!condition.IsSmallSignal)
        {
            var (volts, ohms) = model.LookingIn(start, condition, pair.At, pair.Against);
            return new LookingIn(condition.Name, pair.At, pair.Against, condition.SuppliesRemoved ? null : volts, ohms);
        }

        var probe = new Probe(condition.Name, ReadingQuantity.OutputResistance, pair.At, pair.Against, meter, 1) { IsSmallSignal = true };
        var value = new double[1];
        BoardModel.AtPlaces(board, [probe], model.Solver).Predict(start, value, []);
        return new LookingIn(condition.Name, pair.At, pair.Against, null, value[0]);
    }
}
