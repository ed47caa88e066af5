using BenchCheck.Core.Fitting;

namespace BenchCheck.Core.Tests.Fitting;

/// <summary>The model functions of the nonlinear NIST sets with their derivatives.</summary>
/// <remarks>Source: NIST/ITL StRD, nonlinear regression. Each function returns f(x) and fills ∂f/∂b when the span is not empty.</remarks>
internal static class CertifiedModels
{
    public delegate double Curve(double x, ReadOnlySpan<double> b, Span<double> d);

    public static Curve Of(string name) => name switch
    {
        "Misra1a" => Misra1a,
        "Misra1d" => Misra1d,
        "Chwirut2" => Chwirut2,
        "DanWood" => DanWood,
        "Lanczos3" => Lanczos3,
        "MGH09" => Mgh09,
        "Thurber" => Thurber,
        "Rat42" => Rat42,
        "Eckerle4" => Eckerle4,
        "Bennett5" => Bennett5,
        _ => throw new ArgumentOutOfRangeException(nameof(name)),
    };

    /// <summary>Residuals f(x_i) − y_i.</summary>
    public static Residuals ResidualsOf(CertifiedSet set)
    {
        var curve = Of(set.Name);
        var x = set.X.Select(r => r[0]).ToArray();
        return (theta, residuals, jacobian) =>
        {
            for (var i = 0; i < x.Length; i++)
                residuals[i] = curve(x[i], theta, jacobian.IsEmpty ? [] : jacobian.Slice(i * theta.Length, theta.Length)) - set.Y[i];
        };
    }

    private static double Misra1a(double x, ReadOnlySpan<double> b, Span<double> d)
    {
        var e = Math.Exp(-b[1] * x);
        if (!d.IsEmpty) (d[0], d[1]) = (1 - e, b[0] * x * e);
        return b[0] * (1 - e);
    }

    private static double Misra1d(double x, ReadOnlySpan<double> b, Span<double> d)
    {
        var q = 1 + b[1] * x;
        if (!d.IsEmpty) (d[0], d[1]) = (b[1] * x / q, b[0] * x / (q * q));
        return b[0] * b[1] * x / q;
    }

    private static double Chwirut2(double x, ReadOnlySpan<double> b, Span<double> d)
    {
        var q = b[1] + b[2] * x;
        var f = Math.Exp(-b[0] * x) / q;
        if (!d.IsEmpty) (d[0], d[1], d[2]) = (-x * f, -f / q, -x * f / q);
        return f;
    }

    private static double DanWood(double x, ReadOnlySpan<double> b, Span<double> d)
    {
        var power = Math.Pow(x, b[1]);
        if (!d.IsEmpty) (d[0], d[1]) = (power, b[0] * power * Math.Log(x));
        return b[0] * power;
    }

    private static double Lanczos3(double x, ReadOnlySpan<double> b, Span<double> d)
    {
        var f = 0.0;
        for (var k = 0; k < 6; k += 2)
        {
            var e = Math.Exp(-b[k + 1] * x);
            f += b[k] * e;
            if (!d.IsEmpty) (d[k], d[k + 1]) = (e, -b[k] * x * e);
        }

        return f;
    }

    private static double Mgh09(double x, ReadOnlySpan<double> b, Span<double> d)
    {
        double p = x * x + x * b[1], q = x * x + x * b[2] + b[3];
        if (!d.IsEmpty) (d[0], d[1], d[2], d[3]) = (p / q, b[0] * x / q, -b[0] * p * x / (q * q), -b[0] * p / (q * q));
        return b[0] * p / q;
    }

    private static double Thurber(double x, ReadOnlySpan<double> b, Span<double> d)
    {
        var p = b[0] + x * (b[1] + x * (b[2] + x * b[3]));
        var q = 1 + x * (b[4] + x * (b[5] + x * b[6]));
        for (var k = 0; k < 4 && !d.IsEmpty; k++) d[k] = Math.Pow(x, k) / q;
        for (var k = 1; k < 4 && !d.IsEmpty; k++) d[3 + k] = -p * Math.Pow(x, k) / (q * q);
        return p / q;
    }

    private static double Rat42(double x, ReadOnlySpan<double> b, Span<double> d)
    {
        var e = Math.Exp(b[1] - b[2] * x);
        var q = 1 + e;
        if (!d.IsEmpty) (d[0], d[1], d[2]) = (1 / q, -b[0] * e / (q * q), b[0] * x * e / (q * q));
        return b[0] / q;
    }

    private static double Eckerle4(double x, ReadOnlySpan<double> b, Span<double> d)
    {
        var t = (x - b[2]) / b[1];
        var g = Math.Exp(-0.5 * t * t) / b[1];
        if (!d.IsEmpty) (d[0], d[1], d[2]) = (g, b[0] * g * (t * t - 1) / b[1], b[0] * g * t / b[1]);
        return b[0] * g;
    }

    private static double Bennett5(double x, ReadOnlySpan<double> b, Span<double> d)
    {
        var root = Math.Pow(b[1] + x, -1 / b[2]);
        var f = b[0] * root;
        if (!d.IsEmpty) (d[0], d[1], d[2]) = (root, -f / (b[2] * (b[1] + x)), f * Math.Log(b[1] + x) / (b[2] * b[2]));
        return f;
    }
}
