using BenchCheck.Core.Equations;

namespace BenchCheck.Core.Fitting;

/// <summary>Fits a model to readings in the space of the readings and scores it by its evidence.</summary>
/// <remarks>
/// <para>
/// Minimises the same sum as the fit by QR, readings and tolerances together, but works with the m×m covariance of the readings
/// S = R + J Σ Jᵀ (R: noise, Σ: prior), which is small where a board has more parts than readings:
/// φ ← φ₀ + Σ Jᵀ S⁻¹ (y − f + J (φ − φ₀)), halved while it does not descend.
/// </para>
/// <para>
/// Evidence: −2 ln E = χ²_min + ln det S + m ln 2π, which is Laplace's approximation at the minimum (MacKay, Neural Computation 4
/// (1992) 415), exact for a linear model. Rank: S is regular because every reading has noise.
/// </para>
/// <para>Owns its buffers: no allocation once they have grown to the largest model.</para>
/// </remarks>
public sealed class EvidenceFit
{
    private const int Iterations = 40;

    /// <summary>Spread given to an unknown so that it has an evidence: a factor of about 50 either way, or as many volts as are met.</summary>
    private const double UnknownLogSigma = 4;

    private const double UnknownLinearSigma = 10;

    /// <summary>Expected decrease of χ² at which the fit stands still.</summary>
    private const double Still = 1e-7;

    /// <summary>The same for a fit whose evidence will be compared: φ is then within about 1e-6 standard deviations of the minimum.</summary>
    private const double Polished = 1e-12;

    /// <summary>Steps that even a hopeless model is given, since the first forecast may lie on the wrong side of a change of state.</summary>
    private const int LeastSteps = 2;

    /// <summary>Forecast over the limit beyond which one step is enough to give up.</summary>
    private const double FarOff = 10;

    /// <summary>How short a step may become before a fit is taken to stand still; one whose forecast is hopeless is not searched as far.</summary>
    private const double SmallestStep = 1e-4;

    private const double SmallestHopelessStep = 0.1;

    private double[] jacobian = [];
    private double[] trialJacobian = [];
    private double[] weighted = [];
    private double[] covariance = [];
    private double[] predicted = [];
    private double[] trialPredicted = [];
    private double[] innovation = [];
    private double[] whitened = [];
    private double[] phi = [];
    private double[] trialPhi = [];
    private double[] step = [];
    private double[] mean = [];
    private double[] variance = [];
    private double still = Still;
    private bool isLinearised;
    private int m;
    private int p;

    /// <summary>φ of the last fit.</summary>
    public ReadOnlySpan<double> Phi => phi.AsSpan(0, p);

    /// <summary>Predictions f(φ) of the last fit.</summary>
    public ReadOnlySpan<double> Predicted => predicted.AsSpan(0, m);

    /// <summary>m×p Jacobian of the last fit.</summary>
    public ReadOnlySpan<double> Jacobian => jacobian.AsSpan(0, m * p);

    /// <summary>Cholesky factor of S at the last fit, m×m, lower.</summary>
    public ReadOnlySpan<double> CovarianceFactor => covariance.AsSpan(0, m * m);

    /// <summary>S⁻¹ (y − f + J (φ − φ₀)) of the last fit: the weighted innovation.</summary>
    public ReadOnlySpan<double> Innovation => innovation.AsSpan(0, m);

    /// <summary>Prior variances that the last fit used; those of unknowns are broad but finite.</summary>
    public ReadOnlySpan<double> PriorVariance => variance.AsSpan(0, p);

    /// <summary>Minimises from the prior mean.</summary>
    /// <param name="measured">m readings, SI units</param>
    /// <param name="noise">m variances</param>
    public Evidence Fit(BoardModel model, ReadOnlySpan<double> measured, ReadOnlySpan<double> noise)
    {
        Prepare(model);
        return Run(model, measured, noise, double.PositiveInfinity);
    }

    /// <summary>Minimises from a start that was linearised before.</summary>
    /// <param name="giveUpAbove">χ² above which a model is of no interest: the fit stops as soon as the linear forecast of its minimum lies above</param>
    public Evidence Fit(BoardModel model, ReadOnlySpan<double> measured, ReadOnlySpan<double> noise, StartPoint start, double giveUpAbove)
    {
        Load(model, start);
        return Run(model, measured, noise, giveUpAbove);
    }

    /// <summary>Linearises a model at its prior mean, with one parameter moved where wanted; null when it has no operating state there.</summary>
    /// <param name="moved">position in φ; −1 for none</param>
    /// <param name="to">where it is moved</param>
    public StartPoint? Linearise(BoardModel model, int moved = -1, double to = 0)
    {
        Prepare(model);
        if (moved >= 0) phi[moved] = to;
        var start = new StartPoint(Phi.ToArray(), new double[m], new double[m * p], moved);
        try
        {
            model.Forget();
            model.Predict(start.Phi, start.Predicted, start.Jacobian);
            return start;
        }
        catch (NoOperatingStateException)
        {
            return null;
        }
    }

    /// <summary>Minimises from where an earlier fit ended, until nothing moves: the evidence is then good to 1e-6.</summary>
    public Evidence Polish(BoardModel model, ReadOnlySpan<double> measured, ReadOnlySpan<double> noise, ReadOnlySpan<double> start)
    {
        Prepare(model);
        start.CopyTo(phi);
        still = Polished;
        try
        {
            return Run(model, measured, noise, double.PositiveInfinity);
        }
        finally
        {
            still = Still;
        }
    }

    private Evidence Run(BoardModel model, ReadOnlySpan<double> measured, ReadOnlySpan<double> noise, double giveUpAbove)
    {
        try
        {
            return Minimise(model, measured, noise, giveUpAbove);
        }
        catch (NoOperatingStateException)
        {
            return Evidence.None;
        }
    }

    /// <summary>χ² of the readings under the linearised model, the moved parameter held: a forecast of where a fit from there would end.</summary>
    public double Forecast(BoardModel model, ReadOnlySpan<double> measured, ReadOnlySpan<double> noise, StartPoint start)
    {
        Load(model, start);
        if (start.Moved < 0) return TryInnovate(measured, noise) ? ForecastChiSquared(measured) : double.PositiveInfinity;
        for (var i = 0; i < m; i++) jacobian[i * p + start.Moved] = 0;
        var off = phi[start.Moved] - mean[start.Moved];
        return TryInnovate(measured, noise) ? ForecastChiSquared(measured) + off * off / variance[start.Moved] : double.PositiveInfinity;
    }

    private void Load(BoardModel model, StartPoint start)
    {
        ArgumentNullException.ThrowIfNull(start);
        Prepare(model);
        start.Phi.CopyTo(phi, 0);
        start.Predicted.CopyTo(predicted, 0);
        start.Jacobian.CopyTo(jacobian, 0);
        isLinearised = true;
    }

    /// <summary>Covariance C = Σ − Σ Jᵀ S⁻¹ J Σ of the first parameters after the last fit.</summary>
    /// <param name="count">how many parameters, from the first</param>
    /// <param name="covariance">receives count×count values, row-major</param>
    public void Posterior(int count, Span<double> covariance)
    {
        // Columns of L⁻¹ J Σ, kept transposed: one row of m values a parameter.
        for (var k = 0; k < count; k++)
        {
            var row = whitened.AsSpan(k * m, m);
            for (var i = 0; i < m; i++) row[i] = weighted[i * p + k];
            Cholesky.SolveLower(CovarianceFactor, m, row);
        }

        for (var k = 0; k < count; k++)
        {
            for (var l = 0; l <= k; l++)
            {
                var value = -LuFactor.Dot(whitened.AsSpan(k * m, m), whitened.AsSpan(l * m, m));
                covariance[k * count + l] = covariance[l * count + k] = value + (k == l ? variance[k] : 0);
            }
        }
    }

    private Evidence Minimise(BoardModel model, ReadOnlySpan<double> measured, ReadOnlySpan<double> noise, double giveUpAbove)
    {
        if (!isLinearised) model.Predict(Phi, predicted.AsSpan(0, m), jacobian.AsSpan(0, m * p));
        var chiSquared = ChiSquared(measured, noise, predicted, phi);
        if (!double.IsFinite(chiSquared)) return Evidence.None;
        for (var iteration = 0; iteration < Iterations; iteration++)
        {
            if (!TryInnovate(measured, noise)) return Evidence.None;
            var forecast = ForecastChiSquared(measured);
            var expected = chiSquared - forecast;
            if (expected < still * (1 + chiSquared)) return Score(chiSquared, true);
            if (forecast > giveUpAbove && iteration >= (forecast > FarOff * giveUpAbove ? 1 : LeastSteps)) return Score(chiSquared, false);
            var isHopeful = forecast <= giveUpAbove;

            for (var i = 0; i < p; i++)
            {
                var sum = 0.0;
                for (var j = 0; j < m; j++) sum += jacobian[j * p + i] * innovation[j];
                step[i] = mean[i] + variance[i] * sum - phi[i];
            }

            if (!TryDescend(model, measured, noise, expected, isHopeful ? SmallestStep : SmallestHopelessStep, ref chiSquared)) return Score(chiSquared, expected < 1e-4 * (1 + chiSquared));
        }

        return TryInnovate(measured, noise) ? Score(chiSquared, false) : Evidence.None;
    }

    private bool TryDescend(BoardModel model, ReadOnlySpan<double> measured, ReadOnlySpan<double> noise, double expected, double smallest, ref double chiSquared)
    {
        for (var length = 1.0; length >= smallest; length /= 3)
        {
            for (var i = 0; i < p; i++) trialPhi[i] = phi[i] + length * step[i];
            double trial;
            try
            {
                model.Predict(trialPhi.AsSpan(0, p), trialPredicted.AsSpan(0, m), trialJacobian.AsSpan(0, m * p));
                trial = ChiSquared(measured, noise, trialPredicted, trialPhi);
            }
            catch (NoOperatingStateException)
            {
                model.Forget();
                continue;
            }

            if (!(trial <= chiSquared - 1e-4 * length * expected)) continue;
            chiSquared = trial;
            (phi, trialPhi) = (trialPhi, phi);
            (predicted, trialPredicted) = (trialPredicted, predicted);
            (jacobian, trialJacobian) = (trialJacobian, jacobian);
            return true;
        }

        return false;
    }

    private Evidence Score(double chiSquared, bool converged)
    {
        var logDeterminant = Cholesky.LogDeterminant(CovarianceFactor, m);
        return new Evidence(chiSquared, -0.5 * (chiSquared + logDeterminant + m * Math.Log(2 * Math.PI)), converged);
    }

    /// <summary>S = R + J Σ Jᵀ, its Cholesky factor, and S⁻¹ (y − f + J (φ − φ₀)).</summary>
    private bool TryInnovate(ReadOnlySpan<double> measured, ReadOnlySpan<double> noise)
    {
        for (var i = 0; i < m; i++)
        {
            var row = jacobian.AsSpan(i * p, p);
            var scaled = weighted.AsSpan(i * p, p);
            var shift = 0.0;
            for (var k = 0; k < p; k++)
            {
                scaled[k] = row[k] * variance[k];
                shift += row[k] * (phi[k] - mean[k]);
            }

            innovation[i] = measured[i] - predicted[i] + shift;
            for (var j = 0; j <= i; j++) covariance[i * m + j] = LuFactor.Dot(scaled, jacobian.AsSpan(j * p, p));
            covariance[i * m + i] += noise[i];
        }

        if (!Cholesky.Factor(covariance.AsSpan(0, m * m), m)) return false;
        Cholesky.Solve(covariance.AsSpan(0, m * m), m, innovation.AsSpan(0, m));
        return true;
    }

    /// <summary>dᵀ S⁻¹ d, the minimum of χ² if the model were linear.</summary>
    private double ForecastChiSquared(ReadOnlySpan<double> measured)
    {
        var sum = 0.0;
        for (var i = 0; i < m; i++)
        {
            var shift = 0.0;
            for (var k = 0; k < p; k++) shift += jacobian[i * p + k] * (phi[k] - mean[k]);
            sum += innovation[i] * (measured[i] - predicted[i] + shift);
        }

        return sum;
    }

    private double ChiSquared(ReadOnlySpan<double> measured, ReadOnlySpan<double> noise, double[] f, double[] at)
    {
        var sum = 0.0;
        for (var i = 0; i < m; i++) sum += (measured[i] - f[i]) * (measured[i] - f[i]) / noise[i];
        for (var k = 0; k < p; k++) sum += (at[k] - mean[k]) * (at[k] - mean[k]) / variance[k];
        return sum;
    }

    private void Prepare(BoardModel model)
    {
        ArgumentNullException.ThrowIfNull(model);
        isLinearised = false;
        (m, p) = (model.ReadingCount, model.Parameters.Length);
        if (predicted.Length < m || phi.Length < p || jacobian.Length < m * p) Grow();
        for (var k = 0; k < p; k++)
        {
            var parameter = model.Parameters[k];
            var sigma = !parameter.IsUnknown ? parameter.Sigma : parameter.IsLogarithmic ? UnknownLogSigma : UnknownLinearSigma;
            mean[k] = phi[k] = parameter.Mean;
            variance[k] = sigma * sigma;
        }
    }

    private void Grow()
    {
        var (rows, columns) = (Math.Max(m, predicted.Length), Math.Max(p, phi.Length));
        jacobian = new double[rows * columns];
        trialJacobian = new double[rows * columns];
        weighted = new double[rows * columns];
        covariance = new double[rows * rows];
        predicted = new double[rows];
        trialPredicted = new double[rows];
        innovation = new double[rows];
        whitened = new double[rows * columns];
        phi = new double[columns];
        trialPhi = new double[columns];
        step = new double[columns];
        mean = new double[columns];
        variance = new double[columns];
    }
}
