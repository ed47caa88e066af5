namespace BenchCheck.Core.Fitting;

/// <summary>Coverage interval of one parameter of a fit; an end is infinite when the readings set no bound there.</summary>
internal readonly record struct CoverageInterval(double Low, double High);

/// <summary>Coverage intervals of single parameters by profiling: where the least cost with the parameter held rises by ½ z².</summary>
/// <remarks>
/// With C(v) = min ½‖r‖² over all other parameters, θ_j = v, the signed root √(2 (C(v) − Ĉ)) is standard normal to higher order than
/// (v − θ̂_j)/u and does not depend on how the parameter is expressed. It is near a straight line, so its crossing of z is found by false
/// position. One instance owns its buffers and serves any number of parameters of one model, on one thread.
/// Source: Bates and Watts, Nonlinear Regression Analysis and its Applications (1988), 6.1.2; Dowell and Jarratt, BIT 11 (1971) 168.
/// </remarks>
internal sealed class ProfileInterval
{
    /// <summary>Steps outwards that may fail to reach z, each twice as long as the one before.</summary>
    private const int Expansions = 48;

    private const int Refinements = 40;

    /// <summary>How closely z must be met.</summary>
    private const double RootTolerance = 1e-6;

    private readonly Residuals _held;
    private readonly LeastSquaresWorkspace _workspace;
    private readonly LeastSquaresTolerances _tolerances;
    private readonly double[] _minimiser;
    private readonly double[] _near;
    private readonly double[] _trial;
    private int _parameter;
    private readonly double _least;

    /// <param name="model">m residuals of n parameters</param>
    /// <param name="rows">m</param>
    /// <param name="minimiser">θ̂, n</param>
    /// <param name="cost">½‖r(θ̂)‖²</param>
    public ProfileInterval(Residuals model, int rows, ReadOnlySpan<double> minimiser, double cost, LeastSquaresTolerances tolerances)
    {
        _workspace = new LeastSquaresWorkspace(rows, minimiser.Length);
        _minimiser = minimiser.ToArray();
        _near = new double[minimiser.Length];
        _trial = new double[minimiser.Length];
        _least = cost;
        _tolerances = tolerances;
        // A column of zeros holds its parameter where it is.
        _held = (theta, residuals, jacobian) =>
        {
            model(theta, residuals, jacobian);
            for (var i = _parameter; i < jacobian.Length; i += theta.Length) jacobian[i] = 0;
        };
    }

    /// <summary>Finds the interval of θ_j.</summary>
    /// <param name="parameter">j</param>
    /// <param name="uncertainty">u(θ̂_j), the first step; may be infinite</param>
    /// <param name="z">coverage factor, positive</param>
    /// <param name="lowest">where the search downwards ends: finite, at most θ̂_j</param>
    /// <param name="highest">where the search upwards ends: finite, at least θ̂_j</param>
    public CoverageInterval Find(int parameter, double uncertainty, double z, double lowest, double highest)
    {
        ArgumentOutOfRangeException.ThrowIfNegativeOrZero(uncertainty);
        _parameter = parameter;
        return new CoverageInterval(Bound(uncertainty, z, lowest, double.NegativeInfinity), Bound(uncertainty, z, highest, double.PositiveInfinity));
    }

    /// <summary>One end of the interval, or <paramref name="unbounded"/> when the root stays below z up to the limit.</summary>
    private double Bound(double uncertainty, double z, double limit, double unbounded)
    {
        var centre = _minimiser[_parameter];
        var room = limit - centre;
        var step = double.IsFinite(uncertainty) ? Math.Sign(room) * z * uncertainty : room / 1024;
        _minimiser.CopyTo(_near, 0);
        double inside = centre, insideExcess = -z;
        for (var i = 0; i < Expansions && inside != limit; i++)
        {
            var at = Math.Abs(step) < Math.Abs(room) ? centre + step : limit;
            var excess = Root(at) - z;
            if (Math.Abs(excess) <= RootTolerance * z) return at;
            if (excess > 0) return Refine(inside, insideExcess, at, excess, z);
            (inside, insideExcess) = (at, excess);
            _trial.CopyTo(_near, 0);
            step *= 2;
        }

        return unbounded;
    }

    /// <summary>Crossing of z between a point below and a point above, by false position with the Illinois correction.</summary>
    private double Refine(double inside, double insideExcess, double outside, double outsideExcess, double z)
    {
        var side = 0;
        for (var i = 0; i < Refinements; i++)
        {
            var share = insideExcess / (insideExcess - outsideExcess);
            var at = inside + (outside - inside) * (share > 0.001 && share < 0.999 ? share : 0.5);
            if (at == inside || at == outside) break;
            var excess = Root(at) - z;
            if (Math.Abs(excess) <= RootTolerance * z) return at;
            if (excess > 0)
            {
                (outside, outsideExcess) = (at, excess);
                if (side > 0) insideExcess /= 2;
                side = 1;
            }
            else
            {
                (inside, insideExcess) = (at, excess);
                if (side < 0) outsideExcess /= 2;
                side = -1;
                _trial.CopyTo(_near, 0);
            }
        }

        return inside;
    }

    /// <summary>√(2 (C(v) − Ĉ)), from the nearest minimum found inside; infinite where the model has no meaning.</summary>
    private double Root(double value)
    {
        _near.CopyTo(_trial, 0);
        _trial[_parameter] = value;
        var summary = LevenbergMarquardt.Minimise(_held, _trial, _workspace, _tolerances);
        return summary.Reason == StopReason.NotFiniteAtStart ? double.PositiveInfinity : Math.Sqrt(2 * Math.Max(0, summary.Cost - _least));
    }
}
