using BenchCheck.Core.Boards;
using BenchCheck.Core.Equations;
using CsCheck;
using Xunit;

namespace BenchCheck.Core.Tests.Equations;

/// <summary>Adjoint derivatives against central differences, with a loading meter.</summary>
public class SensitivityTests
{
    [Theory]
    [InlineData(JunctionLaw.Exponential)]
    [InlineData(JunctionLaw.ConstantDrop)]
    public void Adjoint_derivatives_agree_with_central_differences(JunctionLaw law) =>
        Gen.Select(Gen.Double[1, 5], Gen.Double[3, 6], Gen.Double[2, 4], Gen.Double[1.5, 2.7], Gen.Double[4.5, 7], Gen.Int[0, 3]).Sample((supply, rb, rc, gain, meter, place) =>
        {
            var board = new BoardSketch()
                .Supply("V1", "VCC", 3 * supply).Resistor("R1", "VCC", "B1", Math.Pow(10, rb)).Resistor("R2", "B1", "0", Math.Pow(10, rb - 0.4))
                .Resistor("R3", "VCC", "C1", Math.Pow(10, rc)).Resistor("R4", "E1", "0", Math.Pow(10, rc - 0.7)).Npn("Q1", "C1", "B1", "E1", Math.Pow(10, gain), 0.65)
                .Resistor("R5", "VCC", "E2", Math.Pow(10, rc - 1)).Pnp("Q2", "C2", "C1", "E2", 150, 0.65).Resistor("R6", "C2", "0", Math.Pow(10, rc))
                .Diode("D1", "C2", "K").Resistor("R7", "K", "0", 1e4).Zener("D2", "0", "C1", 6.2).Board;
            var table = new ParameterTable(board);
            var network = NetworkCompiler.Compile(board, table, board.Conditions[0]);
            var theta = BoardSketch.NominalValues(table);
            var solver = new NetworkSolver(law);
            var node = network.IndexOf(new[] { "C1", "B1", "C2", "E2" }[place]);
            var m = new Measurement(node, -1, Math.Pow(10, -meter));
            var gradient = new double[table.Count];
            solver.Solve(network, theta);
            solver.Read(m, gradient);
            for (var p = 0; p < theta.Length; p++)
            {
                if (theta[p] == 0) continue;
                double At(double relative)
                {
                    var moved = (double[])theta.Clone();
                    moved[p] *= 1 + relative;
                    solver.Solve(network, moved);
                    return solver.Read(m, []);
                }

                const double h = 1e-5;
                var difference = (At(h) - At(-h)) / (2 * h);
                var kink = Math.Abs(At(h) + At(-h) - 2 * At(0));
                if (kink > 1e-7) continue; // the constant-drop law has corners: no derivative there
                var adjoint = gradient[p] * theta[p];
                Assert.True(Math.Abs(difference - adjoint) <= 1e-5 * Math.Max(1, Math.Abs(difference)),
                    $"{table.Entries[p].Part.Designator} {table.Entries[p].Kind}: {difference} {adjoint}");
            }
        }, iter: 300);
}
