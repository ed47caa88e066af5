using System.Collections.Immutable;
using BenchCheck.Core.Boards;
using BenchCheck.Core.Equations;
using BenchCheck.Core.Fitting;
using BenchCheck.Core.Metering;

namespace BenchCheck.Core.Checking;

/// <summary>Predicts a healthy board: node voltages as the first meter would show them, currents, states, power.</summary>
public static class Predictor
{
    /// <exception cref="NoOperatingStateException">the board as drawn has no operating state</exception>
    public static Prediction Predict(Bench bench, CheckSettings settings)
    {
        ArgumentNullException.ThrowIfNull(bench);
        ArgumentNullException.ThrowIfNull(settings);
        var board = bench.Board;
        var conditions = board.Conditions.Where(c => !c.IsSmallSignal && !c.SuppliesRemoved).ToArray();
        Probe[] places = [.. conditions.SelectMany(c => board.Nodes.Skip(1).Select(n => new Probe(c.Name, ReadingQuantity.Voltage, n, null, bench.Meters[0], 1)))];
        var model = BoardModel.AtPlaces(board, places, new NetworkSolver(settings.Law));
        double[] start = [.. model.Parameters.Select(p => p.Mean)];
        var predicted = new double[places.Length];
        var jacobian = new double[places.Length * start.Length];
        model.Predict(start, predicted, jacobian);
        var bands = PredictedBand.Of(model, start, predicted, jacobian, settings);
        var points = conditions.Select(c => model.Operate(start, c)).ToArray();
        var highest = places.Select((p, i) => (Volts: Math.Abs(predicted[i]), Place: p.At)).DefaultIfEmpty((0, "")).MaxBy(x => x.Item1);
        return new Prediction
        {
            BoardTitle = board.Title,
            Nodes =
            [
                .. places.Select((p, i) => new PredictedNode(
                    p.Condition, p.At, predicted[i], bands[i].Low, bands[i].High, points[Array.FindIndex(conditions, c => c.Name == p.Condition)].TheveninOhms(p.At),
                    Influences.Of(model, jacobian.AsSpan(i * start.Length, start.Length)))),
            ],
            Currents = [.. points.SelectMany(p => p.Currents().Select(c => new PredictedCurrent(p.Condition.Name, c.At, c.Amperes)))],
            States = [.. points.SelectMany(p => OperatingReport.States(board, p))],
            Dissipation = OperatingReport.Dissipation(board, points),
            Cautions = Cautions.For(highest.Item1, highest.Item2),
            Assumed = [.. bench.Assumed, .. board.Parts.SelectMany(p => p.Parameters.Where(x => x.Nominal.IsUnknown).Select(x =>
                $"{p.Designator}: {x.Kind} unknown, predicted with {Quantities.EngineeringNotation.Format(FitParameter.StartOf(x.Kind), x.Kind.Unit)}"))],
        };
    }
}
