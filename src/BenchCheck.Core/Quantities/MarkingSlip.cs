namespace BenchCheck.Core.Quantities;

/// <summary>The slip that would put one resistor in the place of another: a decade, exchanged or mistaken colour bands, the next value of the series.</summary>
/// <remarks>
/// Colour bands: digits and multipliers of IEC 60062. Which colours are mistaken for each other, and how often each slip happens, is common
/// practice, no source; the slips are tried in that order.
/// </remarks>
public static class MarkingSlip
{
    private const double WidestWindow = 0.15;

    private static readonly string[] Colours = ["black", "brown", "red", "orange", "yellow", "green", "blue", "violet", "grey", "white"];

    /// <summary>Digits whose colours look alike under poor light.</summary>
    private static readonly (int, int)[] LookAlikes = [(0, 1), (1, 2), (2, 3), (3, 4), (5, 6), (6, 7), (8, 9)];

    /// <summary>Plain words for the likeliest slip, or null when none of them leads from the wanted to the found value.</summary>
    /// <param name="wantedOhms">as the parts list says, above zero</param>
    /// <param name="foundOhms">as estimated, above zero</param>
    /// <param name="relativeSpread">how far a part's true value may lie from the one estimated: its uncertainty and tolerance, 0.05 for 5 %</param>
    /// <param name="tolerancePercent">of the wanted part, which tells the series in which its neighbours are</param>
    public static string? Explain(double wantedOhms, double foundOhms, double relativeSpread = 0.05, double tolerancePercent = 5)
    {
        if (!IsOrdinary(wantedOhms) || !IsOrdinary(foundOhms)) return null;
        var window = Math.Clamp(double.IsNaN(relativeSpread) ? 0 : relativeSpread, 0.01, WidestWindow);
        if (Math.Abs(Math.Log(foundOhms / wantedOhms)) <= window) return null;
        var candidates = Candidates(foundOhms, window);
        var (below, above) = PreferredSeries.ForTolerance(tolerancePercent).Neighbours(wantedOhms);
        return Decade(wantedOhms, foundOhms, window)
            ?? First(candidates, v => Exchanged(wantedOhms, v))
            ?? First(candidates, v => Mistaken(wantedOhms, v))
            ?? First([below, above], v => Math.Abs(Math.Log(foundOhms / v)) <= window ? $"{Ohms(v)} is the next value of the series to {Ohms(wantedOhms)}" : null);
    }

    private static bool IsOrdinary(double ohms) => ohms is > 1e-3 and < 1e12;

    private static string Ohms(double value) => EngineeringNotation.Format(value, Unit.Ohm, 3);

    private static string? First(IEnumerable<double> values, Func<double, string?> explain) => values.Select(explain).FirstOrDefault(words => words is not null);

    /// <summary>Parts that can be bought and might measure as found, nearest first.</summary>
    private static List<double> Candidates(double found, double window) =>
        [.. new[] { PreferredSeries.E24, PreferredSeries.E96 }
            .SelectMany(s => (double[])[s.Nearest(found), s.Neighbours(found).Below, s.Neighbours(found).Above])
            .Distinct().Where(v => Math.Abs(Math.Log(found / v)) <= window).OrderBy(v => Math.Abs(Math.Log(found / v)))];

    private static string? Decade(double wanted, double found, double window)
    {
        var decades = (int)Math.Round(Math.Log10(found / wanted));
        if (decades == 0 || Math.Abs(decades) > 6 || Math.Abs(Math.Log(found / wanted) - (decades * Math.Log(10))) > window) return null;
        var fitted = DecimalScale.Apply(wanted, decades);
        var bands = Marking.Of(wanted) is { } w && Marking.Of(fitted) is { } f ? $", multiplier band {w.MultiplierColour} read as {f.MultiplierColour} or the reverse" : "";
        return $"{Ohms(fitted)} for {Ohms(wanted)}: a decade slip (factor {DecimalScale.Apply(1, decades):0.######}{bands})";
    }

    /// <summary>The same bands in another order: two digits exchanged, or read from the wrong end.</summary>
    private static string? Exchanged(double wanted, double fitted)
    {
        if (Marking.Of(wanted) is not { } w || Marking.Of(fitted) is not { } f || w.Digits.Length != f.Digits.Length || w.Exponent < 0 || f.Exponent < 0) return null;
        int[] wantedBands = [.. w.Digits, w.Exponent];
        int[] fittedBands = [.. f.Digits, f.Exponent];
        if (wantedBands.SequenceEqual(fittedBands.Reverse())) return $"{Ohms(fitted)} for {Ohms(wanted)}: the same colour bands read from the wrong end ({Bands(wantedBands)})";
        var different = Enumerable.Range(0, wantedBands.Length).Where(i => wantedBands[i] != fittedBands[i]).ToList();
        if (different is not [var i, var j] || wantedBands[i] != fittedBands[j] || wantedBands[j] != fittedBands[i]) return null;
        return j == w.Digits.Length
            ? $"{Ohms(fitted)} for {Ohms(wanted)}: a digit band and the multiplier band exchanged ({Bands(fittedBands)} for {Bands(wantedBands)})"
            : $"{Ohms(fitted)} for {Ohms(wanted)}: two digits exchanged";
    }

    /// <summary>One digit band taken for a colour that looks alike.</summary>
    private static string? Mistaken(double wanted, double fitted)
    {
        if (Marking.Of(wanted) is not { } w || Marking.Of(fitted) is not { } f || w.Digits.Length != f.Digits.Length || w.Exponent != f.Exponent) return null;
        var different = Enumerable.Range(0, w.Digits.Length).Where(i => w.Digits[i] != f.Digits[i]).ToList();
        if (different is not [var i]) return null;
        var (a, b) = (w.Digits[i], f.Digits[i]);
        return LookAlikes.Contains((Math.Min(a, b), Math.Max(a, b)))
            ? FormattableString.Invariant($"{Ohms(fitted)} for {Ohms(wanted)}: colour band {i + 1} {Colours[b]} taken for {Colours[a]}")
            : null;
    }

    private static string Bands(IEnumerable<int> bands) => string.Join(", ", bands.Select(b => Colours[b]));

    /// <summary>A value as its colour bands say it: two or three digits and a power of ten.</summary>
    private sealed record Marking(int[] Digits, int Exponent)
    {
        public string MultiplierColour => Exponent switch
        {
            -2 => "silver",
            -1 => "gold",
            _ => Colours[Exponent],
        };

        public static Marking? Of(double ohms)
        {
            foreach (var count in (int[])[2, 3])
            {
                var exponent = (int)Math.Floor(Math.Log10(ohms) + 1e-12) - count + 1;
                var mantissa = DecimalScale.Apply(ohms, -exponent);
                var whole = (int)Math.Round(mantissa);
                if (exponent is < -2 or > 9 || Math.Abs(mantissa - whole) > 1e-6 * mantissa) continue;
                return new Marking(count == 2 ? [whole / 10, whole % 10] : [whole / 100, whole / 10 % 10, whole % 10], exponent);
            }

            return null;
        }
    }
}
