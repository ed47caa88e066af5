using BenchCheck.Core.Fitting;
using CsCheck;
using MathNet.Numerics.LinearAlgebra;
using Xunit;

namespace BenchCheck.Core.Tests.Fitting;

public class ParameterCovarianceTests
{
    private static readonly Gen<(int Rows, int Columns, double[] J)> Jacobians =
        from columns in Gen.Int[1, 9]
        from rows in Gen.Int[columns, 16]
        from j in Draw.Plain(-4, 4).Array[rows * columns]
        select (rows, columns, j);

    /// <summary>MathNet.Numerics inverts JᵀJ, formed explicitly: another way to the same matrix.</summary>
    [Fact]
    public void Covariance_is_the_inverse_of_the_normal_matrix() => Jacobians.Sample(m =>
    {
        var j = Matrix<double>.Build.Dense(m.Rows, m.Columns, (r, c) => m.J[r * m.Columns + c]);
        if (!(j.ConditionNumber() <= 1e4)) return;
        var expected = j.TransposeThisAndMultiply(j).Inverse();
        var covariance = CovarianceOf(m.J, m.Rows, m.Columns);
        for (var a = 0; a < m.Columns; a++)
        {
            for (var b = 0; b < m.Columns; b++)
                Assert.Equal(expected[a, b], covariance[a * m.Columns + b], 1e-7 * Math.Sqrt(expected[a, a] * expected[b, b]));
        }
    });

    /// <summary>
    /// The last column repeats the first: both are undetermined, and the others have the variances that they have without the copy
    /// (Searle, Linear Models, 1971, 5.4: estimable functions do not depend on the generalised inverse).
    /// </summary>
    [Fact]
    public void A_repeated_column_is_undetermined_and_leaves_the_others_as_they_were() => Jacobians.Where(m => m.Columns > 1).Sample(m =>
    {
        var j = Matrix<double>.Build.Dense(m.Rows, m.Columns, (r, c) => m.J[r * m.Columns + c]);
        if (!(j.ConditionNumber() <= 1e4)) return;
        var n = m.Columns;
        var alone = CovarianceOf(m.J, m.Rows, n);
        var doubled = CovarianceOf(j.Append(2 * j.SubMatrix(0, m.Rows, 0, 1)).ToRowMajorArray(), m.Rows, n + 1);
        Assert.Equal(double.PositiveInfinity, doubled[0]);
        Assert.Equal(double.PositiveInfinity, doubled[^1]);
        for (var a = 1; a < n; a++) Assert.Equal(alone[a * n + a], doubled[a * (n + 1) + a], 1e-7 * alone[a * n + a]);
    });

    private static double[] CovarianceOf(double[] jacobian, int rows, int columns)
    {
        var at = new Linearisation(rows, columns);
        jacobian.CopyTo(at.Jacobian, 0);
        at.Factor(new double[rows]);
        var covariance = new double[columns * columns];
        at.Covariance(covariance);
        return covariance;
    }
}
