using BenchCheck.Core.Boards;
using BenchCheck.Core.Checking;
using BenchCheck.Core.Equations;
using BenchCheck.Core.Fitting;
using BenchCheck.Core.Metering;
using BenchCheck.Core.Quantities;
using Xunit;

namespace BenchCheck.Core.Tests.Checking;

/// <summary>The three ways to a predicted band, held against each other and against closed forms.</summary>
public class PredictedBandTests
{
    [Fact]
    public void First_order_bands_agree_with_Monte_Carlo_where_tolerances_are_small()
    {
        // Many 1 % parts of a ladder: their sum is near normal (central limit), so the two intervals agree to a few percent of their width.
        var sketch = new BoardSketch().Supply("V1", "N0", 10, percent: 1);
        for (var i = 1; i <= 6; i++) sketch.Resistor($"R{i}", $"N{i - 1}", $"N{i}", 1e3, 1).Resistor($"S{i}", $"N{i}", "0", 4.7e3, 1);
        var (first, carlo) = (Bands(sketch.Board, BandMethod.FirstOrder), Bands(sketch.Board, BandMethod.MonteCarlo));
        for (var i = 1; i < first.Length; i++)
        {
            var width = first[i].High - first[i].Low;
            Assert.Equal(first[i].Low, carlo[i].Low, 0.06 * width);
            Assert.Equal(first[i].High, carlo[i].High, 0.06 * width);
        }
    }

    [Fact]
    public void Monte_Carlo_of_one_toleranced_part_is_its_rectangular_distribution() =>
        // JCGM 101:2008, 6.4.2: 95 % of a rectangular distribution of half-width a lies within ±0.95 a.
        Assert.Equal(0.95 * 0.1, Bands(new BoardSketch().Supply("V1", "A", 10, percent: 1).Resistor("R1", "A", "0", 1e3).Board, BandMethod.MonteCarlo)[0].High - 10, 2e-3);

    [Fact]
    public void Worst_case_of_a_divider_is_at_the_corners_of_its_tolerances()
    {
        var band = Bands(new BoardSketch().Supply("V1", "A", 10).Resistor("R1", "A", "B", 1e3, 5).Resistor("R2", "B", "0", 1e3, 5).Board, BandMethod.WorstCase)[1];

        // Corners in the logarithm of a resistance: exp(±half) with half = ln(1.05/0.95)/2, so that the ratio of the two runs over (1.05/0.95)^±1.
        var ratio = 1.05 / 0.95;
        Assert.Equal(10 / (1 + ratio), band.Low, 1e-6);
        Assert.Equal(10 * ratio / (1 + ratio), band.High, 1e-6);
    }

    private static PredictedBand[] Bands(Board board, BandMethod method)
    {
        var meter = new Meter("ideal", double.PositiveInfinity, 6000, new MeterFunction(0, 2, [60]));
        Probe[] places = [.. board.Nodes.Skip(1).Select(n => new Probe(Condition.DefaultName, ReadingQuantity.Voltage, n, null, meter, 60))];
        var model = BoardModel.AtPlaces(board, places, new NetworkSolver(JunctionLaw.ConstantDrop));
        double[] start = [.. model.Parameters.Select(p => p.Mean)];
        var (predicted, jacobian) = (new double[places.Length], new double[places.Length * start.Length]);
        model.Predict(start, predicted, jacobian);
        return PredictedBand.Of(model, start, predicted, jacobian, CheckSettings.Default with { Bands = method, Draws = 40_000 });
    }
}
