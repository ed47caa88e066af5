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

    /// <summary>JCGM 101:2008, 9.2: Y = X1 + X2 + X3 + X4; published (from memory) ±3.88 for four rectangular inputs of standard uncertainty 1, 9.2.3.</summary>
    [Fact]
    public void Monte_Carlo_of_four_rectangular_inputs_is_that_of_JCGM_101_example_9_2_3()
    {
        // Four supplies in series, each 10 V ± √3 V.
        var band = Bands(Stack(10, 10, 10, 10), BandMethod.MonteCarlo, 60_000)[^1];
        Assert.Equal(40 - 3.88, band.Low, 0.05);
        Assert.Equal(40 + 3.88, band.High, 0.05);
    }

    /// <summary>9.2.2: four standard normal inputs give ±3.92, which is what first-order propagation takes for any.</summary>
    [Fact]
    public void First_order_band_of_four_inputs_is_that_of_JCGM_101_example_9_2_2()
    {
        var band = Bands(Stack(10, 10, 10, 10), BandMethod.FirstOrder)[^1];
        Assert.Equal(40 - 3.92, band.Low, 5e-3);
        Assert.Equal(40 + 3.92, band.High, 5e-3);
    }

    /// <summary>9.2.4: one rectangular input ten times as wide as the other three; published (from memory) ±17.0, where first order gives ±19.9.</summary>
    [Fact]
    public void Monte_Carlo_of_one_wide_input_is_that_of_JCGM_101_example_9_2_4()
    {
        var board = Stack(10, 10, 10, 100);
        var (carlo, first) = (Bands(board, BandMethod.MonteCarlo, 60_000)[^1], Bands(board, BandMethod.FirstOrder)[^1]);
        Assert.Equal(130 - 17.0, carlo.Low, 0.15);
        Assert.Equal(130 + 17.0, carlo.High, 0.15);
        Assert.Equal(19.9, first.High - 130, 0.05);
    }

    /// <summary>Among 13 toleranced parts, more than are tried corner by corner, derivatives choose the corner; enumerated here it is the worst all the same.</summary>
    [Theory]
    [InlineData(5)]
    [InlineData(6)]
    public void Worst_case_of_many_parts_is_the_worst_of_all_corners(int cells)
    {
        var sketch = new BoardSketch().Supply("V1", "N0", 10, percent: 2);
        for (var i = 1; i <= cells; i++) sketch.Resistor($"R{i}", $"N{i - 1}", $"N{i}", 1e3 * i, 5).Resistor($"S{i}", $"N{i}", "0", 4.7e3, 10);
        CornersAreWorst(sketch.Board);
    }

    [Fact]
    public void Worst_case_of_a_transistor_stage_is_the_worst_of_all_corners()
    {
        var stage = new BoardSketch().Supply("V1", "VCC", 12, percent: 1).Resistor("R1", "VCC", "B", 68e3, 5).Resistor("R2", "B", "0", 15e3, 5).Resistor("R3", "VCC", "C", 2.7e3, 5)
            .Resistor("R4", "E", "0", 680, 5).Npn("Q1", "C", "B", "E", 100, 300, 0.65);
        CornersAreWorst(stage.Board);
        CornersAreWorst(stage.Resistor("R5", "C", "OUT", 10e3, 5).Resistor("R6", "OUT", "0", 33e3, 5).Resistor("R7", "E", "X", 100, 5).Resistor("R8", "X", "0", 1e3, 5).Board);
    }

    [Fact]
    public void Worst_case_of_a_divider_is_at_the_corners_of_its_tolerances()
    {
        var band = Bands(new BoardSketch().Supply("V1", "A", 10).Resistor("R1", "A", "B", 1e3, 5).Resistor("R2", "B", "0", 1e3, 5).Board, BandMethod.WorstCase)[1];

        // Corners in the logarithm of a resistance: exp(±half) with half = ln(1.05/0.95)/2, so that the ratio of the two runs over (1.05/0.95)^±1.
        var ratio = 1.05 / 0.95;
        Assert.Equal(10 / (1 + ratio), band.Low, 1e-6);
        Assert.Equal(10 * ratio / (1 + ratio), band.High, 1e-6);
    }

    private static Board Stack(params double[] widths)
    {
        var sketch = new BoardSketch();
        for (var i = 0; i < widths.Length; i++)
        {
            var volts = Nominal.Within(widths[i], Tolerance.Absolute(Math.Sqrt(3) * widths[i] / 10));
            sketch.Add(new Supply($"V{i + 1}", [$"N{i + 1}", i == 0 ? "0" : $"N{i}"], volts));
        }

        return sketch.Resistor("R1", $"N{widths.Length}", "0", 1e3).Board;
    }

    private static void CornersAreWorst(Board board)
    {
        var bands = Bands(board, BandMethod.WorstCase);
        var model = Model(board);
        int[] free = [.. Enumerable.Range(0, model.BoardParameterCount).Where(k => model.Parameters[k].Sigma > 0)];
        var (low, high) = (Enumerable.Repeat(double.MaxValue, model.ReadingCount).ToArray(), Enumerable.Repeat(double.MinValue, model.ReadingCount).ToArray());
        var values = new double[model.ReadingCount];
        for (var corner = 0; corner < 1 << free.Length; corner++)
        {
            double[] phi = [.. model.Parameters.Select(p => p.Mean)];
            for (var k = 0; k < free.Length; k++) phi[free[k]] += Math.Sqrt(3) * model.Parameters[free[k]].Sigma * ((corner >> k & 1) == 0 ? -1 : 1);
            model.Predict(phi, values, []);
            for (var i = 0; i < values.Length; i++) (low[i], high[i]) = (Math.Min(low[i], values[i]), Math.Max(high[i], values[i]));
        }

        for (var i = 0; i < bands.Length; i++)
        {
            Assert.Equal(low[i], bands[i].Low, 1e-9 * Math.Abs(low[i]));
            Assert.Equal(high[i], bands[i].High, 1e-9 * Math.Abs(high[i]));
        }
    }

    private static BoardModel Model(Board board)
    {
        var meter = new Meter("ideal", double.PositiveInfinity, 6000, new MeterFunction(0, 2, [60]));
        Probe[] places = [.. board.Nodes.Skip(1).Select(n => new Probe(Condition.DefaultName, ReadingQuantity.Voltage, n, null, meter, 60))];
        return BoardModel.AtPlaces(board, places, new NetworkSolver(JunctionLaw.ConstantDrop));
    }

    private static PredictedBand[] Bands(Board board, BandMethod method, int draws = 40_000)
    {
        var model = Model(board);
        double[] start = [.. model.Parameters.Select(p => p.Mean)];
        var (predicted, jacobian) = (new double[model.ReadingCount], new double[model.ReadingCount * start.Length]);
        model.Predict(start, predicted, jacobian);
        return PredictedBand.Of(model, start, predicted, jacobian, CheckSettings.Default with { Bands = method, Draws = draws });
    }
}
