using BenchCheck.Core.Boards;
using BenchCheck.Core.Equations;
using BenchCheck.Core.Quantities;
using Xunit;

namespace BenchCheck.Core.Tests.Equations;

/// <summary>
/// What loaded meters show, against printed examples: Kalsi, Electronic Instrumentation 3e, and Helfrick and Cooper, Modern Electronic Instrumentation
/// (2009), inputs and printed answers read in stored companion notebooks, more digits recomputed.
/// </summary>
public class MeterLoadingTests
{
    private const int Seeds = 800;

    private static double Divider(double supply, double upper, double lower, double meter) =>
        new SolvedBoard(new BoardSketch().Supply("V1", "P", supply).Resistor("R1", "P", "M", upper).Resistor("R2", "M", "0", lower).Board).Read("M", meter);

    [Theory]
    [InlineData(100, 10e3, 10e3, 50e3, 45.45, 45.454545)] // Kalsi 4.11 p. 87, 1 kΩ/V on 50 V
    [InlineData(100, 10e3, 10e3, 1e6, 49.75, 49.751244)] // Kalsi 4.11, 20 kΩ/V on 50 V
    [InlineData(30, 25e3, 5e3, 10e3, 3.53, 3.529412)] // Kalsi 4.12 p. 88, 1 kΩ/V on 10 V
    [InlineData(30, 25e3, 5e3, 200e3, 4.9, 4.897959)] // Kalsi 4.12, 20 kΩ/V on 10 V
    [InlineData(50, 45e3, 5e3, 100e3, 4.785, 4.784689)] // Kalsi 4.13 p. 89, 20 kΩ/V on 5 V
    [InlineData(50, 45e3, 5e3, 200e3, 4.89, 4.889976)] // on 10 V
    [InlineData(50, 45e3, 5e3, 600e3, 4.96, 4.962779)] // on 30 V
    public void Analogue_voltmeter_on_a_divider_shows_the_printed_voltage(double supply, double upper, double lower, double meter, double printed, double exact)
    {
        var shown = Divider(supply, upper, lower, meter);
        Assert.Equal(exact, shown, 1e-6);
        Assert.Equal(printed, shown, 6e-3);
    }

    /// <summary>V R_m/(R_m + R_th) with R_th = R/2 (own numbers).</summary>
    [Theory]
    [InlineData(10e3, 4.99750125)]
    [InlineData(100e3, 4.97512438)]
    [InlineData(1e6, 4.76190476)]
    public void Ten_megohm_meter_loads_a_divider_of_equal_resistors(double ohms, double shown) => Assert.Equal(shown, Divider(10, ohms, ohms, 10e6), 1e-8);

    /// <summary>Helfrick 1-7 p. 6: 5 mA and 100 V on the 150 V range of 1 kΩ/V mean 23.08 kΩ, not 20 kΩ. Kalsi 1.3a p. 6: 80 V, 10 mA mean 8.45 kΩ.</summary>
    [Theory]
    [InlineData(5e-3, 23.08e3, 100)]
    [InlineData(10e-3, 8.45e3, 80)]
    public void Voltmeter_takes_its_share_of_a_known_current(double amperes, double ohms, double shown)
    {
        var board = new BoardSketch().Current("I1", "A", "0", amperes).Resistor("R1", "A", "0", ohms).Board;
        Assert.Equal(shown, new SolvedBoard(board).Read("A", 150e3), shown * 1e-3);
    }

    /// <summary>A meter is to the board what a resistor of its resistance, or a source of its test current, soldered in its place would be.</summary>
    [Theory]
    [InlineData(JunctionLaw.Exponential)]
    [InlineData(JunctionLaw.ConstantDrop)]
    public void A_meter_shows_what_its_own_resistor_soldered_in_would_have_across_it(JunctionLaw law)
    {
        for (var seed = 0; seed < Seeds; seed++)
        {
            var (board, random) = (RandomBoards.Passive(seed), new Random(seed));
            var (high, low, decade) = (Node(board, random), Node(board, random), 4 + 3 * random.NextDouble());
            if (high == low) continue;
            var ohms = Math.Pow(10, decade);
            var metered = new SolvedBoard(board, law).Read(high, ohms, low);
            var soldered = new SolvedBoard(board.With([], [new Resistor("RM", [high, low], Nominal.Exactly(ohms))]), law);
            // Devices that hold one another can stand in two states; the meter finds the one near the state without it.
            if (Math.Abs(metered - soldered.Volts(high, low)) > 0.01 && CanLatch(board)) continue;
            AssertSame(seed, soldered.Volts(high, low), metered, soldered, ohms);
        }
    }

    [Theory]
    [InlineData(JunctionLaw.Exponential)]
    [InlineData(JunctionLaw.ConstantDrop)]
    public void An_ohmmeter_shows_what_a_source_of_its_test_current_would_make(JunctionLaw law)
    {
        for (var seed = 0; seed < Seeds; seed++)
        {
            var (board, random) = (RandomBoards.Passive(seed), new Random(seed));
            var (high, low, decade) = (Node(board, random), Node(board, random), -6 + 3 * random.NextDouble());
            if (high == low) continue;
            var amperes = Math.Pow(10, decade);
            var metered = new SolvedBoard(board, law, Condition.Unpowered).Ohms(high, low, amperes) * amperes;
            if (Math.Abs(metered) > 1e3) continue; // open: the source would find no way
            // Lifting the supplies off takes the source with it, so it is drawn as a controlled one that follows its own volt.
            Part[] source =
            [
                new Resistor("R1V", ["V1V", board.Reference], Nominal.Exactly(1)),
                new ControlledSource(ControlledSource.CurrentByVoltage, "IT", [high, low], Nominal.Exactly(amperes), new Control.NodePair("V1V", board.Reference)),
                new Supply("VT", ["V1V", board.Reference], Nominal.Exactly(1)),
            ];
            var bare = board.With(board.Parts.OfType<Supply>().Select(s => new Resistor(s.Designator, s.Nodes, Nominal.Exactly(1e15))), source);
            var driven = new SolvedBoard(bare, law);
            if (Math.Abs(metered - driven.Volts(high, low)) > 0.01 && CanLatch(board)) continue;
            AssertSame(seed, driven.Volts(high, low), metered, driven, Math.Abs(metered) / amperes);
        }
    }

    private static string Node(Board board, Random random) => board.Nodes[random.Next(board.Nodes.Length)];

    private static bool CanLatch(Board board) => board.Parts.OfType<Transistor>().Count() > 1;

    private static void AssertSame(int seed, double expected, double shown, SolvedBoard solved, double ohms)
    {
        var greatest = solved.Point.Currents().Max(c => Math.Abs(c.Amperes));
        if (greatest > 1e5) return; // a dead short across a stiff supply
        // A floating island leaks some picoamperes through the meter, a floating base its gain times as many.
        var gain = 1 + solved.Board.Parts.OfType<Transistor>().Select(q => q.Gain.Value).DefaultIfEmpty(0).Max();
        var leaked = 4e-12 * gain * ohms * solved.Board.Nodes.Max(n => Math.Abs(solved.Volts(n)));
        Assert.True(Math.Abs(expected - shown) <= 1e-6 * (1 + Math.Abs(expected)) + 1e-8 * greatest + leaked, $"seed {seed}: {expected} V soldered, {shown} V shown, {greatest} A");
    }
}
