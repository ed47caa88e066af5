using BenchCheck.Core.Boards;
using BenchCheck.Core.Equations;
using BenchCheck.Core.Fitting;
using BenchCheck.Core.Metering;
using Xunit;

namespace BenchCheck.Core.Tests.Equations.SmallSignal;

/// <summary>A board read with small signals, as a textbook takes its transistors: emission coefficient one, no resistance in series with a junction.</summary>
internal sealed class SignalBoard
{
    private static readonly Meter Ideal = new("ideal", double.PositiveInfinity, 6000, null);
    private readonly Board board;
    private readonly ParameterTable table;
    private readonly double[] theta;
    private readonly NetworkSolver solver;

    /// <param name="thermalVolts">kT/e that the book takes</param>
    /// <param name="hertz">null when every capacitor counts as a short</param>
    public SignalBoard(BoardSketch sketch, double thermalVolts = 0.026, double? hertz = null, Drive? drive = null, JunctionLaw law = JunctionLaw.ConstantDrop)
        : this(sketch.Board, thermalVolts, hertz, drive, law)
    {
    }

    public SignalBoard(Board plain, double thermalVolts = 0.026, double? hertz = null, Drive? drive = null, JunctionLaw law = JunctionLaw.ConstantDrop)
    {
        var signal = Condition.Powered with { Name = "signal", OperatingPoint = Condition.DefaultName, Hertz = hertz, Drive = drive };
        board = new Board(plain.Title, plain.Reference, plain.Origin, plain.Parts, [Condition.Powered, signal])
        {
            Celsius = thermalVolts / 8.617333262145177e-5 - 273.15,
        };
        table = new ParameterTable(board);
        theta = [.. table.Entries.Select(e =>
            e.Kind == ParameterKind.Ideality ? 1 : e.Kind == ParameterKind.SeriesResistance ? 0 : e.Nominal.Value)];
        solver = new NetworkSolver(law);
    }

    public ParameterTable Table => table;

    public double[] Theta => theta;

    public double Gain(string at, string from, Meter? meter = null) => Read(ReadingQuantity.Gain, at, from, meter);

    public double CurrentGain(string at, string? from = null) => Read(ReadingQuantity.CurrentGain, at, from);

    public double InputOhms(string at, string? against = null) => Read(ReadingQuantity.InputResistance, at, against);

    public double OutputOhms(string at, string? against = null) => Read(ReadingQuantity.OutputResistance, at, against);

    public double Volts(string at, string? against = null) => Read(ReadingQuantity.Voltage, at, against);

    public double Amperes(string at) => Read(ReadingQuantity.Current, at, null);

    /// <summary>A reading at θ and its derivatives.</summary>
    public double Read(ReadingQuantity quantity, string at, string? against, double[] parameters, double[] gradient, Meter? meter = null)
    {
        var probe = new Probe("signal", quantity, at, against, meter ?? Ideal, 1) { IsSmallSignal = true };
        var setup = Assert.Single(new ReadingArrangement(board, table, [probe], solver).Setups());
        setup.Solve(parameters);
        return setup.Read(0, gradient);
    }

    private double Read(ReadingQuantity quantity, string at, string? against, Meter? meter = null) => Read(quantity, at, against, theta, [], meter);
}
