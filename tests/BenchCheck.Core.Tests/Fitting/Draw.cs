using CsCheck;

namespace BenchCheck.Core.Tests.Fitting;

internal static class Draw
{
    /// <summary>Numbers without the denormal-like extremes that CsCheck favours: the kernels state that squares below 1e-154 are lost.</summary>
    public static Gen<double> Plain(double low, double high) => Gen.Double[low, high].Select(x => Math.Abs(x) < 1e-9 ? 0 : x);
}
