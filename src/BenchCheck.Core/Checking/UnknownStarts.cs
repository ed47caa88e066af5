using BenchCheck.Core.Fitting;

namespace BenchCheck.Core.Checking;

/// <summary>Where to begin when the parts list leaves numbers unknown: the start that forecasts the least χ², one unknown after the other.</summary>
internal static class UnknownStarts
{
    private static readonly double[] Decades = [-4, -3, -2, -1, 0, 1, 2, 3];

    public static Evidence Fit(BoardModel model, ReadingPlan plan, EvidenceFit fit)
    {
        var best = fit.Fit(model, plan.Measured, plan.Noise);
        for (var k = 0; k < model.BoardParameterCount; k++)
        {
            var parameter = model.Parameters[k];
            if (!parameter.IsUnknown || !parameter.IsLogarithmic) continue;
            StartPoint? chosen = null;
            var least = double.PositiveInfinity;
            foreach (var decade in Decades)
            {
                if (fit.Linearise(model, k, parameter.Mean + decade * Math.Log(10)) is not { } start) continue;
                var forecast = fit.Forecast(model, plan.Measured, plan.Noise, start);
                if (forecast < least) (chosen, least) = (start, forecast);
            }

            if (chosen is null) continue;
            model.Forget();
            var evidence = fit.Fit(model, plan.Measured, plan.Noise, chosen, double.PositiveInfinity);
            if (evidence.ChiSquared < best.ChiSquared - 1e-6) best = evidence;
            else best = fit.Fit(model, plan.Measured, plan.Noise);
        }

        return best;
    }
}
