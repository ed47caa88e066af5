using System.Globalization;

namespace BenchCheck.Benchmarks.Scoreboard.Faults;

/// <summary>How a person misreads or miswrites one reading of a column.</summary>
public static class ReadingSlip
{
    /// <summary>A wrong row with what stands there now and how; null when the column has no row that a slip would change.</summary>
    /// <param name="values">what the meter showed</param>
    /// <param name="resolutions">its least digit in each row</param>
    public static (int Row, double Value, string How)? From(double[] values, double[] resolutions, Random random)
    {
        ArgumentNullException.ThrowIfNull(values);
        ArgumentNullException.ThrowIfNull(resolutions);
        ArgumentNullException.ThrowIfNull(random);
        for (var attempt = 0; attempt < 50; attempt++)
        {
            var row = random.Next(values.Length);
            var (value, how) = Slip(values, row, resolutions[row], random);
            if (Math.Abs(value - values[row]) > 10 * resolutions[row]) return (row, value, how);
        }

        return null;
    }

    private static (double Value, string How) Slip(double[] values, int row, double resolution, Random random)
    {
        var value = values[row];
        switch (random.Next(5))
        {
            case 0:
                return (-value, "sign");
            case 1:
                return (random.Next(2) == 0 ? value * 10 : value / 10, "decade");
            case 2:
                return (Exchanged(value, resolution, random), "digits");
            case 3:
                return (values[random.Next(values.Length)], "neighbour");
            default:
                var other = values.Max(Math.Abs) * (2 * random.NextDouble() - 0.5);
                return (Math.Round(other / resolution) * resolution, "wrong");
        }
    }

    /// <summary>Two digits side by side exchanged, as the display shows them.</summary>
    private static double Exchanged(double value, double resolution, Random random)
    {
        var digits = Math.Round(Math.Abs(value) / resolution).ToString("F0", CultureInfo.InvariantCulture).ToCharArray();
        if (digits.Length < 2) return value;
        var k = random.Next(digits.Length - 1);
        (digits[k], digits[k + 1]) = (digits[k + 1], digits[k]);
        return Math.Sign(value) * double.Parse(digits, CultureInfo.InvariantCulture) * resolution;
    }
}
