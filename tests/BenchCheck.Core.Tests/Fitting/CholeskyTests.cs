using BenchCheck.Core.Fitting;
using CsCheck;
using MathNet.Numerics.LinearAlgebra;
using Xunit;

namespace BenchCheck.Core.Tests.Fitting;

/// <summary>The Cholesky kernel against MathNet.Numerics, an independent implementation.</summary>
public class CholeskyTests
{
    private static readonly Gen<(int N, double[] B)> Roots =
        from n in Gen.Int[1, 14]
        from b in Draw.Plain(-2, 2).Array[n * n]
        select (n, b);

    [Fact]
    public void Solution_and_log_determinant_agree_with_MathNet() => Roots.Sample(m =>
    {
        var a = Definite(m.N, m.B);
        var reference = a.Cholesky();
        var l = a.ToRowMajorArray();
        Assert.True(Cholesky.Factor(l, m.N));
        Assert.Equal(reference.DeterminantLn, Cholesky.LogDeterminant(l, m.N), 1e-10 * (1 + Math.Abs(reference.DeterminantLn)));

        var b = m.B.Take(m.N).ToArray();
        var expected = reference.Solve(Vector<double>.Build.Dense(b));
        var x = (double[])b.Clone();
        Cholesky.Solve(l, m.N, x);
        for (var i = 0; i < m.N; i++) Assert.Equal(expected[i], x[i], 1e-9 * (1 + expected.L2Norm()));

        // Whitened: wᵀw = bᵀ A⁻¹ b.
        var w = (double[])b.Clone();
        Cholesky.SolveLower(l, m.N, w);
        Assert.Equal(b.Zip(expected, (p, q) => p * q).Sum(), w.Sum(v => v * v), 1e-9 * (1 + w.Sum(v => v * v)));
    });

    [Fact]
    public void A_matrix_that_is_not_positive_definite_is_refused() => Roots.Sample(m =>
    {
        var a = Definite(m.N, m.B);
        var least = a.Evd(Symmetricity.Symmetric).EigenValues[0].Real;
        var shifted = (a - (least + 0.05) * Matrix<double>.Build.DenseIdentity(m.N)).ToRowMajorArray();
        Assert.False(Cholesky.Factor(shifted, m.N));
        Assert.False(Cholesky.Factor([double.NaN], 1));
        Assert.False(Cholesky.Factor([double.PositiveInfinity], 1));
    });

    private static Matrix<double> Definite(int n, double[] root)
    {
        var b = Matrix<double>.Build.Dense(n, n, (i, j) => root[i * n + j]);
        return b.TransposeThisAndMultiply(b) + 0.1 * Matrix<double>.Build.DenseIdentity(n);
    }
}
