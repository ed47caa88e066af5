using BenchCheck.Core.Equations;
using CsCheck;
using MathNet.Numerics.LinearAlgebra;
using Xunit;

namespace BenchCheck.Core.Tests.Equations;

/// <summary>Our factorisation against Math.NET Numerics' LU on random matrices.</summary>
public class LuFactorTests
{
    /// <summary>Some entries zero, so that the diagonal needs exchanges.</summary>
    private static readonly Gen<(double[,] A, double[] B)> Systems = Gen.Int[1, 40].SelectMany(n =>
        Gen.Select(Gen.Frequency((3, Gen.Double[-10, 10]), (1, Gen.Const(0.0))).Array2D[n, n], Gen.Double[-10, 10].Array[n]));

    [Fact]
    public void Solutions_agree_with_Math_NET() => Systems.Sample(s => Compare(s.A, s.B, (a, b) => a.LU().Solve(b), LuFactor.Solve), iter: 1000);

    [Fact]
    public void Transposed_solutions_agree_with_Math_NET() => Systems.Sample(s => Compare(s.A, s.B, (a, b) => a.Transpose().LU().Solve(b), LuFactor.SolveTransposed), iter: 1000);

    [Fact]
    public void Inverses_agree_with_Math_NET() => Systems.Sample(s =>
    {
        var n = s.B.Length;
        var (matrix, lu, pivot) = (Matrix<double>.Build.DenseOfArray(s.A), Flat(s.A), new int[n]);
        if (!LuFactor.Factor(lu, n, pivot) || matrix.ConditionNumber() > 1e8) return;
        var inverse = new double[n * n];
        LuFactor.Invert(lu, n, pivot, inverse);
        var expected = matrix.Inverse();
        for (var i = 0; i < n; i++)
        {
            for (var j = 0; j < n; j++) Assert.True(Math.Abs(expected[i, j] - inverse[i * n + j]) <= 1e-7 * expected.InfinityNorm());
        }
    }, iter: 500);

    [Fact]
    public void A_matrix_with_a_row_of_zeros_is_called_singular() => Systems.Sample(s =>
    {
        var n = s.B.Length;
        for (var j = 0; j < n; j++) s.A[n / 2, j] = 0;
        Assert.False(LuFactor.Factor(Flat(s.A), n, new int[n]));
    }, iter: 200);

    private delegate void Solver(ReadOnlySpan<double> lu, int n, ReadOnlySpan<int> pivot, Span<double> b);

    private static void Compare(double[,] a, double[] b, Func<Matrix<double>, Vector<double>, Vector<double>> oracle, Solver solve)
    {
        var n = b.Length;
        var (matrix, lu, pivot) = (Matrix<double>.Build.DenseOfArray(a), Flat(a), new int[n]);
        var factored = LuFactor.Factor(lu, n, pivot);
        var condition = matrix.ConditionNumber();
        if (!(condition <= 1e8)) return; // rounding decides there
        Assert.True(factored);
        var expected = oracle(matrix, Vector<double>.Build.DenseOfArray(b));
        solve(lu, n, pivot, b);
        var allowed = 1e-14 * n * condition * expected.InfinityNorm();
        for (var i = 0; i < n; i++) Assert.True(Math.Abs(expected[i] - b[i]) <= allowed, $"n {n}, condition {condition}: {expected[i]}, {b[i]}");
    }

    private static double[] Flat(double[,] a) => [.. a.Cast<double>()];
}
