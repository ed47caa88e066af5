using BenchCheck.Core.Boards;
using BenchCheck.Core.Quantities;
using Xunit;

namespace BenchCheck.Core.Tests.Equations;

/// <summary>
/// Resistor networks against exact answers and printed ones, every resistance read as an ohmmeter reads it: supplies lifted off, a test current in.
/// </summary>
public class ResistorNetworkTests
{
    /// <summary>What an ohmmeter shows on a board whose supply, lifted off, would short the whole network.</summary>
    private static double Ohms(IEnumerable<(string From, string To)> unitResistors, string a, string b)
    {
        var sketch = new BoardSketch().Supply("V1", a, 5, b).Supply("V2", a, 1);
        foreach (var (from, to) in unitResistors.Select((r, i) => r)) sketch.Resistor($"R{from}-{to}", from, to, 1000);
        return new SolvedBoard(sketch.Board, condition: Condition.Unpowered).Ohms(a, b) / 1000;
    }

    private static IEnumerable<(string, string)> Edges(int corners, Func<int, int, bool> areJoined) =>
        from i in Enumerable.Range(0, corners) from j in Enumerable.Range(0, corners) where i < j && areJoined(i, j) select ($"N{i}", $"N{j}");

    /// <summary>5/6, 7/12 and 3/4: schoolphysics.co.uk, "Resistance networks".</summary>
    [Theory]
    [InlineData(7, 5.0 / 6)]
    [InlineData(1, 7.0 / 12)]
    [InlineData(3, 3.0 / 4)]
    public void Cube_of_unit_resistors_has_its_published_resistances(int oppositeBits, double expected)
    {
        var cube = Edges(8, (i, j) => int.PopCount(i ^ j) == 1);
        Assert.Equal(expected, Ohms(cube, "N0", $"N{oppositeBits}"), 1e-9);
    }

    /// <summary>By symmetry and Foster's theorem (the edges' resistances sum to corners − 1): own exact values.</summary>
    [Fact]
    public void Tetrahedron_and_octahedron_have_their_exact_resistances()
    {
        var octahedron = Edges(6, (i, j) => i / 2 != j / 2);
        Assert.Equal(1.0 / 2, Ohms(Edges(4, (_, _) => true), "N0", "N3"), 1e-9);
        Assert.Equal(5.0 / 12, Ohms(octahedron, "N0", "N2"), 1e-9);
        Assert.Equal(1.0 / 2, Ohms(octahedron, "N0", "N1"), 1e-9);
    }

    /// <summary>Own exact values, solved in rationals.</summary>
    [Theory]
    [InlineData(2, 1.0, 3.0 / 4)]
    [InlineData(3, 3.0 / 2, 17.0 / 24)]
    [InlineData(4, 13.0 / 7, 157.0 / 224)]
    [InlineData(5, 47.0 / 22, 4613.0 / 6600)]
    public void Square_grids_have_their_exact_resistances(int side, double cornerToCorner, double cornerEdge)
    {
        var grid = Edges(side * side, (i, j) => (j == i + 1 && j % side != 0) || j == i + side);
        Assert.Equal(cornerToCorner, Ohms(grid, "N0", $"N{side * side - 1}"), 1e-9);
        Assert.Equal(cornerEdge, Ohms(grid, "N0", "N1"), 1e-9);
    }

    /// <summary>R(1,0) = 1/2, R(1,1) = 2/π of the infinite grid: Atkinson and van Steenwijk, Am. J. Phys. 67 (1999) 486, table I. A finite one comes near.</summary>
    [Fact]
    public void The_middle_of_a_large_grid_comes_near_the_infinite_one()
    {
        const int side = 15, middle = side * side / 2;
        var grid = Edges(side * side, (i, j) => (j == i + 1 && j % side != 0) || j == i + side).ToList();
        Assert.InRange(Ohms(grid, $"N{middle}", $"N{middle + 1}"), 0.5, 0.505);
        Assert.InRange(Ohms(grid, $"N{middle}", $"N{middle + side + 1}"), 2 / Math.PI, 2 / Math.PI + 0.01);
    }

    /// <summary>Ratios of Fibonacci numbers, tending to (1 + √5)/2.</summary>
    [Theory]
    [InlineData(1, 2.0)]
    [InlineData(2, 5.0 / 3)]
    [InlineData(3, 13.0 / 8)]
    [InlineData(4, 34.0 / 21)]
    [InlineData(5, 89.0 / 55)]
    [InlineData(7, 610.0 / 377)]
    [InlineData(20, 1.6180339887498949)]
    public void Ladder_of_equal_resistors_shows_the_Fibonacci_ratios(int sections, double expected)
    {
        var ladder = Enumerable.Range(0, sections).SelectMany(i => new[] { ($"N{i}", $"N{i + 1}"), ($"N{i + 1}", "0") });
        Assert.Equal(expected, Ohms(ladder, "N0", "0"), 1e-8);
    }

    /// <summary>1 + √3: schoolphysics.co.uk, "Resistance networks".</summary>
    [Fact]
    public void Long_chain_with_two_series_resistors_a_cell_comes_to_one_and_root_three()
    {
        var chain = Enumerable.Range(0, 20).SelectMany(i => new[] { ($"N{i}", $"N{i + 1}"), ($"M{i}", $"M{i + 1}"), ($"N{i + 1}", $"M{i + 1}") });
        Assert.Equal(1 + Math.Sqrt(3), Ohms(chain, "N0", "M0"), 1e-8);
    }

    private static SolvedBoard Bridge(double supply, double r1, double r2, double r3, double r4, double across) =>
        new(new BoardSketch().Supply("V1", "P", supply).Resistor("R1", "P", "A", r1).Resistor("R3", "A", "0", r3).Resistor("R2", "P", "B", r2)
            .Resistor("R4", "B", "0", r4).Resistor("RG", "A", "B", across).Board);

    /// <summary>Kalsi, Electronic Instrumentation 3e, 11.2 p. 325: 43 µA through 300 Ω (read in a stored companion notebook; recomputed 43.3213 µA).</summary>
    [Fact]
    public void Unbalanced_bridge_matches_Kalsi_11_2()
    {
        var bridge = Bridge(6, 1e3, 2.5e3, 3.5e3, 10e3, 300);
        Assert.Equal(43.3213e-6, bridge.Volts("B", "A") / 300, 1e-10);
        Assert.Equal(4.700361, bridge.Volts("A"), 1e-6);
        Assert.Equal(4.713357, bridge.Volts("B"), 1e-6);
    }

    /// <summary>
    /// Helfrick and Cooper, Modern Electronic Instrumentation (2009) 5-1 p. 101: 33.26 mm at 10 mm/µA with 100 Ω, 2.247 mm at 1 mm/µA with 500 Ω (read in
    /// a stored companion notebook).
    /// </summary>
    [Theory]
    [InlineData(100, 3.325574e-6)]
    [InlineData(500, 2.247494e-6)]
    public void Nearly_balanced_bridge_matches_Helfrick_5_1(double galvanometer, double amperes) =>
        Assert.Equal(amperes, Math.Abs(Bridge(5, 100, 1000, 200, 2005, galvanometer).Volts("A", "B")) / galvanometer, 1e-11);

    /// <summary>Robertson, Fundamental Electrical and Electronic Principles, ch. 2 p. 62: 0.195 V; balanced with 4 Ω (read in a stored companion notebook).</summary>
    [Fact]
    public void Bridge_matches_Robertson_and_balances_where_the_book_says()
    {
        var bridge = Bridge(10, 20, 10, 5, 2, 8);
        Assert.Equal(0.195, bridge.Volts("A", "B"), 5e-4);
        Assert.Equal(0.0, Bridge(10, 20, 10, 4, 2, 8).Volts("A", "B"), 1e-12);
    }

    /// <summary>Alexander and Sadiku, Fundamentals of Electric Circuits, example 4.13: −77 V, 990 Ω, −74.76 mA (from memory; recomputed −74.75728 mA).</summary>
    [Fact]
    public void Bridge_matches_Alexander_and_Sadiku_4_13()
    {
        var bridge = Bridge(220, 3e3, 400, 1e3, 600, 40);
        Assert.Equal(-74.75728e-3, bridge.Volts("A", "B") / 40, 1e-8);
        var dead = bridge.Board.With([new Supply("V1", ["P", "0"], Nominal.Exactly(0)), new Resistor("RG", ["A", "B"], Nominal.Exactly(1e12))], []);
        Assert.Equal(990, new SolvedBoard(dead).Ohms("A", "B"), 1e-3);
    }

    /// <summary>A converter of n bits in voltage mode gives V_ref · code / 2ⁿ whatever R is (textbook identity).</summary>
    [Theory]
    [InlineData(0b1000)]
    [InlineData(0b0100)]
    [InlineData(0b0010)]
    [InlineData(0b0001)]
    [InlineData(0b1011)]
    [InlineData(0b1111)]
    public void R_2R_ladder_weighs_its_bits(int code)
    {
        var sketch = new BoardSketch().Resistor("RT", "B0", "0", 20e3);
        for (var bit = 0; bit < 4; bit++)
        {
            sketch.Supply($"V{bit}", $"IN{bit}", (code >> bit & 1) * 16).Resistor($"R{bit}", $"IN{bit}", $"B{bit}", 20e3);
            if (bit > 0) sketch.Resistor($"S{bit}", $"B{bit - 1}", $"B{bit}", 10e3);
        }

        Assert.Equal(code, new SolvedBoard(sketch.Board).Volts("B3"), 1e-9);
    }

    /// <summary>Millman's theorem: (10/1 + 5/2 + 0/4)/(1/1 + 1/2 + 1/4) = 7.142857 V.</summary>
    [Fact]
    public void Parallel_sources_meet_at_the_voltage_of_Millmans_theorem()
    {
        var board = new BoardSketch().Supply("V1", "A", 10).Supply("V2", "B", 5).Resistor("R1", "A", "M", 1e3).Resistor("R2", "B", "M", 2e3).Resistor("R3", "M", "0", 4e3).Board;
        Assert.Equal(12.5 / 1.75, new SolvedBoard(board).Volts("M"), 1e-9);
    }
}
