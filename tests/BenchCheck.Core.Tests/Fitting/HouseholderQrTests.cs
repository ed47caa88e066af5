using BenchCheck.Core.Fitting;
using CsCheck;
using MathNet.Numerics.LinearAlgebra;
using Xunit;

namespace BenchCheck.Core.Tests.Fitting;

/// <summary>The QR kernel against MathNet.Numerics' dense linear algebra, an independent implementation.</summary>
public class HouseholderQrTests
{
    private static readonly Gen<(int Rows, int Columns, double[] A)> Matrices =
        from columns in Gen.Int[1, 12]
        from rows in Gen.Int[columns, 25]
        from a in Draw.Plain(-10, 10).Array[rows * columns]
        select (rows, columns, a);

    [Fact]
    public void Factors_multiply_back_to_the_matrix_with_its_columns_in_pivoted_order() => Matrices.Sample(m =>
    {
        var (qr, tau, order, _) = Factor(m.A, m.Rows, m.Columns);
        for (var j = 0; j < m.Columns; j++)
        {
            var column = new double[m.Rows];
            for (var i = 0; i <= j; i++) column[i] = qr[i * m.Columns + j];
            HouseholderQr.Apply(qr, m.Rows, m.Columns, tau, column);
            for (var i = 0; i < m.Rows; i++) Assert.Equal(m.A[i * m.Columns + order[j]], column[i], 1e-11);
        }
    });

    [Fact]
    public void Q_has_orthonormal_columns_and_applying_it_transposed_undoes_it() => Matrices.Sample(m =>
    {
        var (qr, tau, _, _) = Factor(m.A, m.Rows, m.Columns);
        var q = Matrix<double>.Build.DenseOfColumnArrays(Enumerable.Range(0, m.Rows).Select(k =>
        {
            var column = new double[m.Rows];
            column[k] = 1;
            HouseholderQr.Apply(qr, m.Rows, m.Columns, tau, column);
            return column;
        }));
        Assert.True((q.TransposeThisAndMultiply(q) - Matrix<double>.Build.DenseIdentity(m.Rows)).L2Norm() < 1e-13 * m.Rows);

        var b = m.A.Take(m.Rows).ToArray();
        var turned = (double[])b.Clone();
        HouseholderQr.ApplyTransposed(qr, m.Rows, m.Columns, tau, turned);
        HouseholderQr.Apply(qr, m.Rows, m.Columns, tau, turned);
        Assert.All(b.Zip(turned), pair => Assert.Equal(pair.First, pair.Second, 1e-12));
    });

    [Fact]
    public void Least_squares_solution_agrees_with_MathNet() => Matrices.Sample(m =>
    {
        var a = Dense(m.A, m.Rows, m.Columns);
        if (!(a.ConditionNumber() <= 1e6)) return;
        var b = m.A.Select((x, i) => Math.Sin(i) * x).Take(m.Rows).ToArray();
        var expected = a.QR().Solve(Vector<double>.Build.Dense(b));

        var (qr, tau, order, rank) = Factor(m.A, m.Rows, m.Columns);
        HouseholderQr.ApplyTransposed(qr, m.Rows, m.Columns, tau, b);
        HouseholderQr.SolveUpper(qr, m.Columns, m.Columns, b);
        Assert.Equal(m.Columns, rank);
        for (var j = 0; j < m.Columns; j++) Assert.Equal(expected[order[j]], b[j], 1e-8 * (1 + expected.L2Norm()));
    });

    [Fact]
    public void Transposed_triangle_is_solved_as_MathNet_does() => Matrices.Sample(m =>
    {
        var (qr, _, _, _) = Factor(m.A, m.Rows, m.Columns);
        var r = Matrix<double>.Build.Dense(m.Columns, m.Columns, (i, j) => i <= j ? qr[i * m.Columns + j] : 0);
        if (!(r.ConditionNumber() <= 1e6)) return;
        var b = Enumerable.Range(1, m.Columns).Select(i => 1.0 / i).ToArray();
        var expected = r.Transpose().Solve(Vector<double>.Build.Dense(b));
        HouseholderQr.SolveUpperTransposed(qr, m.Columns, m.Columns, b);
        for (var j = 0; j < m.Columns; j++) Assert.Equal(expected[j], b[j], 1e-8 * (1 + expected.L2Norm()));
    });

    [Fact]
    public void Rank_of_a_product_of_thin_matrices_is_found_as_MathNet_finds_it() =>
        Gen.Select(Gen.Int[1, 6], Gen.Int[1, 12], Gen.Int[1, 12], Draw.Plain(-3, 3).Array[144]).Sample((inner, rows, columns, numbers) =>
        {
            var left = Matrix<double>.Build.Dense(rows, inner, (i, j) => numbers[i * 12 + j]);
            var right = Matrix<double>.Build.Dense(inner, columns, (i, j) => numbers[143 - i * 12 - j]);
            var product = left * right;
            var values = product.Svd(false).S;
            var expected = Math.Min(inner, Math.Min(rows, columns));
            if (values[0] == 0 || values[expected - 1] < 1e-6 * values[0]) return; // the thin factors are nearly dependent themselves
            Assert.Equal(expected, Factor(product.ToRowMajorArray(), rows, columns).Rank);
            Assert.Equal(expected, product.Rank());
        });

    [Fact]
    public void A_matrix_of_zeros_has_rank_zero() => Assert.Equal(0, Factor(new double[12], 4, 3).Rank);

    internal static (double[] Qr, double[] Tau, int[] Order, int Rank) Factor(double[] a, int rows, int columns)
    {
        var qr = (double[])a.Clone();
        var tau = new double[Math.Min(rows, columns)];
        var order = new int[columns];
        var rank = HouseholderQr.Factor(qr, rows, columns, tau, order, new double[2 * columns]);
        return (qr, tau, order, rank);
    }

    private static Matrix<double> Dense(double[] a, int rows, int columns) => Matrix<double>.Build.Dense(rows, columns, (i, j) => a[i * columns + j]);
}
