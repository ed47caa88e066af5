using BenchCheck.Core.Equations;
using BenchCheck.Core.Fitting;
using BenchCheck.Core.Metering;
using MathNet.Numerics.Statistics;

namespace BenchCheck.Core.Checking;

/// <summary>Range of a predicted reading that the part tolerances allow.</summary>
public readonly record struct PredictedBand(double Low, double High)
{
    /// <summary>Largest number of toleranced parameters for which every corner of the tolerance box is tried.</summary>
    private const int AllCorners = 12;

    /// <summary>Bands of every reading of a model around φ; the meter's own errors are not part of a band.</summary>
    /// <param name="start">p values: nominal, unknowns at their estimates</param>
    /// <param name="predicted">m predictions at start</param>
    /// <param name="jacobian">m×p derivatives at start</param>
    /// <param name="drawn">told how many draws of a Monte Carlo band are done</param>
    public static PredictedBand[] Of(
        BoardModel model, ReadOnlySpan<double> start, ReadOnlySpan<double> predicted, ReadOnlySpan<double> jacobian, CheckSettings settings, Action<int>? drawn = null)
    {
        ArgumentNullException.ThrowIfNull(model);
        ArgumentNullException.ThrowIfNull(settings);
        return settings.Bands switch
        {
            BandMethod.MonteCarlo => MonteCarlo(model, start, settings, drawn),
            BandMethod.WorstCase => WorstCase(model, start, predicted, jacobian),
            _ => FirstOrder(model, predicted, jacobian, settings.Confidence),
        };
    }

    /// <summary>JCGM 100:2008, 5.1.2, with the coverage factor of a normal distribution.</summary>
    private static PredictedBand[] FirstOrder(BoardModel model, ReadOnlySpan<double> predicted, ReadOnlySpan<double> jacobian, double confidence)
    {
        var k = CoverageFactor.Normal(confidence);
        var p = model.Parameters.Length;
        var bands = new PredictedBand[predicted.Length];
        for (var i = 0; i < bands.Length; i++)
        {
            var half = k * Math.Sqrt(Variance(model, jacobian.Slice(i * p, p)));
            bands[i] = new PredictedBand(predicted[i] - half, predicted[i] + half);
        }

        return bands;
    }

    /// <summary>Variance that the tolerances give one reading.</summary>
    /// <param name="row">its p derivatives</param>
    internal static double Variance(BoardModel model, ReadOnlySpan<double> row)
    {
        var sum = 0.0;
        for (var k = 0; k < model.BoardParameterCount; k++)
        {
            if (model.Fitted[k].IsUnknown) continue;
            var term = row[k] * model.Fitted[k].Sigma;
            sum += term * term;
        }

        return sum;
    }

    /// <summary>JCGM 101:2008: rectangular within each tolerance, probabilistically symmetric interval.</summary>
    private static PredictedBand[] MonteCarlo(BoardModel model, ReadOnlySpan<double> start, CheckSettings settings, Action<int>? drawn)
    {
        var random = new Random(settings.Seed);
        var values = new List<double>[model.ReadingCount];
        for (var i = 0; i < values.Length; i++) values[i] = new List<double>(settings.Draws);
        var phi = start.ToArray();
        var predicted = new double[model.ReadingCount];
        for (var draw = 0; draw < settings.Draws; draw++)
        {
            drawn?.Invoke(draw);
            for (var k = 0; k < model.BoardParameterCount; k++)
            {
                if (!model.Fitted[k].IsUnknown) phi[k] = start[k] + HalfWidth(model, k) * (2 * random.NextDouble() - 1);
            }

            try
            {
                model.Predict(phi, predicted, []);
            }
            catch (NoOperatingStateException)
            {
                // A draw without an operating state shows nothing.
                model.Forget();
                continue;
            }

            for (var i = 0; i < predicted.Length; i++) values[i].Add(predicted[i]);
        }

        var tail = (1 - settings.Confidence) / 2;
        return [.. values.Select(v => v.Count == 0 ? new PredictedBand(double.NaN, double.NaN) : Interval([.. v.Order()], tail))];

        static PredictedBand Interval(double[] sorted, double tail) =>
            new(SortedArrayStatistics.Quantile(sorted, tail), SortedArrayStatistics.Quantile(sorted, 1 - tail));
    }

    /// <summary>Every corner of the tolerance box on small boards; else, for each reading, the two corners to which its derivatives point.</summary>
    private static PredictedBand[] WorstCase(BoardModel model, ReadOnlySpan<double> start, ReadOnlySpan<double> predicted, ReadOnlySpan<double> jacobian)
    {
        var p = model.Parameters.Length;
        int[] free = [.. Enumerable.Range(0, model.BoardParameterCount).Where(k => !model.Parameters[k].IsUnknown)];
        var low = predicted.ToArray();
        var high = predicted.ToArray();
        var phi = start.ToArray();
        var values = new double[predicted.Length];
        if (free.Length <= AllCorners)
        {
            for (var corner = 0; corner < 1 << free.Length; corner++)
            {
                for (var k = 0; k < free.Length; k++) phi[free[k]] = start[free[k]] + ((corner >> k & 1) == 0 ? -1 : 1) * HalfWidth(model, free[k]);
                Widen(model, phi, values, low, high);
            }
        }
        else
        {
            for (var i = 0; i < predicted.Length; i++)
            {
                foreach (var side in new[] { -1, 1 })
                {
                    foreach (var k in free) phi[k] = start[k] + side * Math.Sign(jacobian[i * p + k]) * HalfWidth(model, k);
                    Widen(model, phi, values, low, high);
                }
            }
        }

        return [.. low.Zip(high, (a, b) => new PredictedBand(a, b))];
    }

    private static void Widen(BoardModel model, double[] phi, double[] values, double[] low, double[] high)
    {
        try
        {
            model.Predict(phi, values, []);
        }
        catch (NoOperatingStateException)
        {
            model.Forget();
            return;
        }

        for (var i = 0; i < values.Length; i++)
        {
            low[i] = Math.Min(low[i], values[i]);
            high[i] = Math.Max(high[i], values[i]);
        }
    }

    private static double HalfWidth(BoardModel model, int parameter) => model.Fitted[parameter].Sigma * Math.Sqrt(3);
}
