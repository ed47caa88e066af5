using BenchCheck.Core.Fitting;
using Xunit;

namespace BenchCheck.Core.Tests.Fitting;

public class LevenbergMarquardtTests(ITestOutputHelper output)
{
    /// <summary>NIST StRD nonlinear regression; certified to 11 digits. Difficulty as NIST grades it.</summary>
    [Theory]
    [InlineData("Misra1a", 9)] // lower
    [InlineData("Chwirut2", 9)] // lower
    [InlineData("DanWood", 9)] // lower
    [InlineData("Lanczos3", 9)] // lower
    [InlineData("Misra1d", 9)] // average
    [InlineData("MGH09", 9)] // higher
    [InlineData("Thurber", 9)] // higher
    [InlineData("Rat42", 9)] // higher
    [InlineData("Eckerle4", 9)] // higher
    [InlineData("Bennett5", 9)] // higher
    public void Certified_nonlinear_estimates_are_reached_from_both_starts(string name, double leastDigits)
    {
        var set = CertifiedSet.Load(name);
        foreach (var start in new[] { set.Start1, set.Start2 })
        {
            var theta = (double[])start.Clone();
            var workspace = new LeastSquaresWorkspace(set.Rows, set.Columns);
            var summary = LevenbergMarquardt.Minimise(CertifiedModels.ResidualsOf(set), theta, workspace, LeastSquaresTolerances.Tight);
            var covariance = new double[set.Columns * set.Columns];
            workspace.Covariance(covariance);
            var s = Math.Sqrt(2 * summary.Cost / (set.Rows - set.Columns));
            var digits = theta.Zip(set.Estimates, ReferenceData.Digits).Min();
            var deviationDigits = set.Deviations.Select((sd, j) => ReferenceData.Digits(s * Math.Sqrt(covariance[j * set.Columns + j]), sd)).Min();
            output.WriteLine($"{name}: {digits:F1} digits, {deviationDigits:F1} of deviations; {summary}");
            Assert.True(summary.Converged, summary.ToString());
            Assert.Equal(set.Columns, summary.Rank);
            Assert.True(digits >= leastDigits, $"{digits:F1} digits, {summary}");
            Assert.True(deviationDigits >= leastDigits - 1, $"{deviationDigits:F1} digits of the deviations");
            Assert.True(ReferenceData.Digits(s, set.ResidualDeviation) >= leastDigits);
        }
    }

    /// <summary>Against central differences, so that the derivatives under the certified checks are themselves checked.</summary>
    [Theory]
    [InlineData("Misra1a"), InlineData("Misra1d"), InlineData("Chwirut2"), InlineData("DanWood"), InlineData("Lanczos3")]
    [InlineData("MGH09"), InlineData("Thurber"), InlineData("Rat42"), InlineData("Eckerle4"), InlineData("Bennett5")]
    public void Derivatives_of_the_certified_models_agree_with_central_differences(string name)
    {
        var set = CertifiedSet.Load(name);
        var model = CertifiedModels.ResidualsOf(set);
        var jacobian = new double[set.Rows * set.Columns];
        double[] up = new double[set.Rows], down = new double[set.Rows];
        model(set.Estimates, up, jacobian);
        for (var j = 0; j < set.Columns; j++)
        {
            var h = 1e-5 * set.Estimates[j];
            var moved = (double[])set.Estimates.Clone();
            moved[j] += h;
            model(moved, up, []);
            moved[j] -= 2 * h;
            model(moved, down, []);
            var largest = Enumerable.Range(0, set.Rows).Max(i => Math.Abs(jacobian[i * set.Columns + j]));
            for (var i = 0; i < set.Rows; i++) Assert.Equal((up[i] - down[i]) / (2 * h), jacobian[i * set.Columns + j], 1e-6 * largest);
        }
    }

    [Fact]
    public void Minimising_again_in_the_same_workspace_allocates_nothing()
    {
        var set = CertifiedSet.Load("MGH09");
        var model = CertifiedModels.ResidualsOf(set);
        var workspace = new LeastSquaresWorkspace(set.Rows, set.Columns);
        var theta = new double[set.Columns];
        var covariance = new double[set.Columns * set.Columns];
        long allocated = 0;
        var iterations = 0;
        for (var run = 0; run < 3; run++)
        {
            set.Start1.CopyTo(theta, 0);
            var before = GC.GetAllocatedBytesForCurrentThread();
            iterations = LevenbergMarquardt.Minimise(model, theta, workspace, LeastSquaresTolerances.Tight).Iterations;
            workspace.Covariance(covariance);
            allocated = GC.GetAllocatedBytesForCurrentThread() - before;
        }

        Assert.True(iterations > 100);
        Assert.Equal(0, allocated);
    }

    /// <summary>The minimum does not depend on units: scaling a parameter by 10¹² changes no step.</summary>
    [Fact]
    public void Units_of_the_parameters_do_not_matter()
    {
        var set = CertifiedSet.Load("Rat42");
        var model = CertifiedModels.ResidualsOf(set);
        Residuals scaled = (theta, residuals, jacobian) =>
        {
            double[] natural = [theta[0] * 1e12, theta[1], theta[2] * 1e-12];
            model(natural, residuals, jacobian);
            for (var i = 0; i < jacobian.Length; i += 3) (jacobian[i], jacobian[i + 2]) = (jacobian[i] * 1e12, jacobian[i + 2] * 1e-12);
        };
        double[] theta = (double[])set.Start1.Clone(), other = [set.Start1[0] * 1e-12, set.Start1[1], set.Start1[2] * 1e12];
        var workspace = new LeastSquaresWorkspace(set.Rows, set.Columns);
        var first = LevenbergMarquardt.Minimise(model, theta, workspace, LeastSquaresTolerances.Usual);
        var second = LevenbergMarquardt.Minimise(scaled, other, workspace, LeastSquaresTolerances.Usual);
        Assert.Equal(first.Iterations, second.Iterations);
        Assert.Equal(theta[0], other[0] * 1e12, 1e-6);
    }

    /// <summary>Rosenbrock, Comput. J. 3 (1960) 175: the curved valley, minimum zero at (1, 1).</summary>
    [Fact]
    public void The_curved_valley_is_followed_to_its_end()
    {
        Residuals valley = (t, r, j) =>
        {
            (r[0], r[1]) = (10 * (t[1] - t[0] * t[0]), 1 - t[0]);
            if (!j.IsEmpty) (j[0], j[1], j[2], j[3]) = (-20 * t[0], 10, -1, 0);
        };
        double[] theta = [-1.2, 1];
        var summary = LevenbergMarquardt.Minimise(valley, theta, new LeastSquaresWorkspace(2, 2), LeastSquaresTolerances.Usual);
        Assert.True(summary.Converged);
        Assert.Equal(12.1, summary.InitialCost, 1e-12);
        Assert.All(theta, t => Assert.Equal(1, t, 1e-9));
        Assert.True(summary.Iterations < 50, summary.ToString());
    }

    [Fact]
    public void Residuals_that_vanish_at_zero_are_reached_in_few_iterations()
    {
        Residuals model = (t, r, j) =>
        {
            (r[0], r[1]) = (Math.Exp(t[0]) - 1 + t[1], Math.Sinh(t[1]) - 0.5 * t[0]);
            if (!j.IsEmpty) (j[0], j[1], j[2], j[3]) = (Math.Exp(t[0]), 1, -0.5, Math.Cosh(t[1]));
        };
        double[] theta = [0.3, -0.2];
        var summary = LevenbergMarquardt.Minimise(model, theta, new LeastSquaresWorkspace(2, 2), LeastSquaresTolerances.Usual);
        Assert.Equal(StopReason.ResidualsVanished, summary.Reason);
        Assert.All(theta, t => Assert.Equal(0, t, 1e-9));
        Assert.True(summary.Iterations <= 12, summary.ToString());
    }

    /// <summary>A step into ln of a negative number gives NaN; the minimum ln t = 1 lies at e.</summary>
    [Fact]
    public void A_step_to_where_the_model_is_not_finite_is_taken_back()
    {
        var refused = 0;
        Residuals model = (t, r, j) =>
        {
            r[0] = Math.Log(t[0]) - 1;
            if (double.IsNaN(r[0])) refused++;
            if (!j.IsEmpty) j[0] = 1 / t[0];
        };
        double[] theta = [20];
        var summary = LevenbergMarquardt.Minimise(model, theta, new LeastSquaresWorkspace(1, 1), LeastSquaresTolerances.Usual);
        Assert.True(refused > 0);
        Assert.True(summary.Converged);
        Assert.Equal(Math.E, theta[0], 1e-8);
    }

    [Fact]
    public void A_start_where_the_model_is_not_finite_is_named_and_left_alone()
    {
        double[] theta = [-1];
        var summary = LevenbergMarquardt.Minimise(
            (t, r, j) => r[0] = Math.Log(t[0]), theta, new LeastSquaresWorkspace(1, 1), LeastSquaresTolerances.Usual);
        Assert.Equal(StopReason.NotFiniteAtStart, summary.Reason);
        Assert.False(summary.Converged);
        Assert.Equal(-1, theta[0]);
    }

    [Fact]
    public void A_fit_that_runs_out_of_iterations_says_so_and_keeps_the_best_point()
    {
        var set = CertifiedSet.Load("Bennett5");
        var theta = (double[])set.Start1.Clone();
        var workspace = new LeastSquaresWorkspace(set.Rows, set.Columns);
        var summary = LevenbergMarquardt.Minimise(CertifiedModels.ResidualsOf(set), theta, workspace, LeastSquaresTolerances.Usual with { Iterations = 20 });
        Assert.Equal(StopReason.IterationLimit, summary.Reason);
        Assert.Equal(20, summary.Iterations);
        Assert.True(summary.Cost < summary.InitialCost);
        Assert.Equal(summary.Cost, 0.5 * LeastSquaresWorkspace.SumOfSquares(workspace.Residuals));
    }

    [Fact]
    public void What_the_model_throws_passes_through() =>
        Assert.Throws<InvalidTimeZoneException>(() => LevenbergMarquardt.Minimise(
            (_, _, _) => throw new InvalidTimeZoneException(), new double[1], new LeastSquaresWorkspace(1, 1), LeastSquaresTolerances.Usual));

    /// <summary>Only a sum is seen: a + b; c is seen alone. More parameters than residuals.</summary>
    [Fact]
    public void Parameters_that_nothing_determines_have_infinite_variance_and_spoil_no_other()
    {
        Residuals model = (t, r, j) =>
        {
            (r[0], r[1]) = ((t[0] + t[1] - 3) / 0.1, (t[2] - 2) / 0.5);
            if (!j.IsEmpty) new double[] { 10, 10, 0, 0, 0, 2 }.CopyTo(j);
        };
        double[] theta = [0, 0, 0];
        var workspace = new LeastSquaresWorkspace(2, 3);
        var summary = LevenbergMarquardt.Minimise(model, theta, workspace, LeastSquaresTolerances.Usual);
        var covariance = new double[9];
        workspace.Covariance(covariance);
        Assert.True(summary.Converged, summary.ToString());
        Assert.Equal(2, summary.Rank);
        Assert.Equal(3, theta[0] + theta[1], 1e-9);
        Assert.Equal(2, theta[2], 1e-9);
        Assert.Equal(double.PositiveInfinity, covariance[0]);
        Assert.Equal(double.PositiveInfinity, covariance[4]);
        Assert.Equal(0.25, covariance[8], 1e-12);
        Assert.True(double.IsNaN(covariance[1]));
    }
}
