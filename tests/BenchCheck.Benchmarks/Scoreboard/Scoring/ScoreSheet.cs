using System.Globalization;
using BenchCheck.Core.Boards;
using BenchCheck.Core.Checking;
using BenchCheck.Core.Diagnosis;

namespace BenchCheck.Benchmarks.Scoreboard.Scoring;

/// <summary>Prints what many scored cases say of the program.</summary>
public static class ScoreSheet
{
    /// <summary>Faults that move a reading by more than this many standard uncertainties have to be found.</summary>
    public const double Plain = 10;

    private const int FailuresShown = 40;

    private static readonly double[] Bins = [0, 1, 2, 3, 5, 10, 30, double.PositiveInfinity];

    public static void Print(TextWriter output, IReadOnlyList<CaseScore> all)
    {
        ArgumentNullException.ThrowIfNull(output);
        ArgumentNullException.ThrowIfNull(all);
        Summary(output, all);
        ByVisibility(output, all);
        Calibration(output, all);
        Intervals(output, all);
        ByKind(output, all);
        ByBoard(output, all);
        Failures(output, all);
    }

    private static void Summary(TextWriter output, IReadOnlyList<CaseScore> all)
    {
        var healthy = all.Where(s => s.Case.IsHealthy).ToArray();
        var plain = all.Where(s => s.IsSingle && s.Case.Visibility > Plain).ToArray();
        var pairs = all.Where(s => s.Case.Faults.Length == 2 && s.Case.Visibility > Plain).ToArray();
        var times = all.Where(s => s.Failure is null).Select(s => s.Elapsed.TotalMilliseconds).Order().ToArray();
        new Table("", "measured", "floor")
            .Row("false alarms on healthy boards", $"{Table.Share(healthy, s => s.Verdict == BoardVerdict.Disagrees)} of {healthy.Length}", "at most 5 %")
            .Row("undecided on healthy boards", Table.Share(healthy, s => s.Verdict == BoardVerdict.Undecided), "-")
            .Row($"single faults of visibility over {Plain}: called disagreeing", $"{Table.Share(plain, s => s.Verdict == BoardVerdict.Disagrees)} of {plain.Length}", "97 %")
            .Row("… first suspect is the truth to the letter", Table.Share(plain, s => s.IsFirst(g => g.IsExact)), "-")
            .Row("… first group names the truth", Table.Share(plain, s => s.IsFirst(g => g.IsNamed)), "-")
            .Row("… first group names it or its like", Table.Share(plain, s => s.IsFirst(g => g.IsAlike)), "90 %")
            .Row("… first three groups name the truth", Table.Share(plain, s => s.IsInFirstThree(g => g.IsNamed)), "-")
            .Row("… first three groups name it or its like", Table.Share(plain, s => s.IsInFirstThree(g => g.IsAlike)), "97 %")
            .Row($"two faults, visibility over {Plain}: called disagreeing", $"{Table.Share(pairs, s => s.Verdict == BoardVerdict.Disagrees)} of {pairs.Length}", "-")
            .Row("… first group names both, or their like", Table.Share(pairs, s => s.IsFirst(g => g.IsAlike)), "-")
            .Row("… first group names at least one", Table.Share(pairs, s => s.IsFirst(g => g.IsPartly || g.IsAlike)), "-")
            .Row("… first three groups name at least one", Table.Share(pairs, s => s.IsInFirstThree(g => g.IsPartly || g.IsAlike)), "-")
            .Row("checks that ended in an exception", all.Count(s => s.Failure is not null).ToString(CultureInfo.InvariantCulture), "0")
            .Row("time a check, mean / median / 95 %", times.Length == 0 ? "-" : $"{times.Average():F0} / {times[times.Length / 2]:F0} / {times[times.Length * 95 / 100]:F0} ms", "-")
            .Write(output, $"{all.Count} cases");
        output.WriteLine("  visibility: largest |with fault − without| of a reading of the same specimen, over √(u² of the meter there + variance of that reading over healthy specimens)");
        output.WriteLine("  its like: on the board of middle values every reading within one standard uncertainty of the meter of what the true fault gives");
    }

    private static void ByVisibility(TextWriter output, IReadOnlyList<CaseScore> all)
    {
        var table = new Table("visibility", "faults", "disagrees", "undecided", "agrees", "first named", "first alike", "in three alike");
        for (var b = 0; b + 1 < Bins.Length; b++)
        {
            var bin = all.Where(s => s.IsSingle && s.Failure is null && s.Case.Visibility >= Bins[b] && s.Case.Visibility < Bins[b + 1]).ToArray();
            table.Row(
                double.IsInfinity(Bins[b + 1]) ? $"over {Bins[b]}" : $"{Bins[b]} to {Bins[b + 1]}", $"{bin.Length}", Table.Share(bin, s => s.Verdict == BoardVerdict.Disagrees),
                Table.Share(bin, s => s.Verdict == BoardVerdict.Undecided), Table.Share(bin, s => s.Verdict == BoardVerdict.Agrees),
                Table.Share(bin, s => s.IsFirst(g => g.IsNamed)), Table.Share(bin, s => s.IsFirst(g => g.IsAlike)), Table.Share(bin, s => s.IsInFirstThree(g => g.IsAlike)));
        }

        table.Write(output, "Single faults by visibility");
    }

    private static void Calibration(TextWriter output, IReadOnlyList<CaseScore> all)
    {
        // A board with two faults that no entry names is what "unexplained" stands for.
        var entries = all.SelectMany(s => s.Groups.Select(g =>
            (g.Probability, IsRight: g.IsNamed || (g.Kind == FaultKind.Unexplained && s.Case.Faults.Length > 1 && !s.Groups.Any(x => x.IsNamed)), g.IsAlike))).ToArray();
        var table = new Table("stated", "groups", "mean stated", "truth named", "off by", "named or alike");
        for (var decile = 0; decile < 10; decile++)
        {
            var bin = entries.Where(e => Math.Min(9, (int)(e.Probability * 10)) == decile).ToArray();
            var stated = bin.Length == 0 ? 0 : bin.Average(e => e.Probability);
            var observed = bin.Length == 0 ? 0 : bin.Count(e => e.IsRight) / (double)bin.Length;
            table.Row(
                string.Create(CultureInfo.InvariantCulture, $"{decile / 10.0:F1} to {(decile + 1) / 10.0:F1}"), $"{bin.Length}", $"{100 * stated:F1} %", $"{100 * observed:F1} %",
                $"{100 * (observed - stated):+0.0;-0.0} points", Table.Share(bin, e => e.IsAlike));
        }

        table.Write(output, "Calibration of the probabilities, every group of every case (floor: within 10 points a decile)");
    }

    private static void Intervals(TextWriter output, IReadOnlyList<CaseScore> all)
    {
        var table = new Table("95 % interval", "determined", "intervals", "hold the truth");
        var intervals = all.SelectMany(s => s.Intervals).ToArray();
        foreach (var kind in new[] { ParameterKind.Gain, ParameterKind.Resistance, ParameterKind.Voltage })
        {
            foreach (var determined in Enum.GetValues<Determination>().Reverse())
            {
                var bin = intervals.Where(i => i.Kind == kind && i.Determined == determined).ToArray();
                table.Row(kind.Name, $"{determined}", $"{bin.Length}", Table.Share(bin, i => i.IsCovered));
            }

            var whole = intervals.Where(i => i.Kind == kind).ToArray();
            table.Row(kind.Name, "all", $"{whole.Length}", Table.Share(whole, i => i.IsCovered));
        }

        table.Write(output, "Coverage on healthy boards; the true gain is I_C/I_B where the transistor is active");
    }

    private static void ByKind(TextWriter output, IReadOnlyList<CaseScore> all)
    {
        var table = new Table("true fault", "faults", "disagrees", "exact", "named", "alike", "three alike", "taken for (neither named nor alike)");
        foreach (var kind in all.Where(s => s.IsSingle && s.Case.Visibility > Plain).GroupBy(s => s.Case.Faults[0].Kind).OrderBy(g => g.Key, StringComparer.Ordinal))
        {
            var scores = kind.ToArray();
            var taken = scores.Where(s => s.First is not null && !s.IsFirst(g => g.IsAlike)).GroupBy(s => s.First!.Kind).OrderByDescending(g => g.Count()).Select(g => $"{g.Key} {g.Count()}");
            table.Row(
                kind.Key, $"{scores.Length}", Table.Share(scores, s => s.Verdict == BoardVerdict.Disagrees), Table.Share(scores, s => s.IsFirst(g => g.IsExact)),
                Table.Share(scores, s => s.IsFirst(g => g.IsNamed)), Table.Share(scores, s => s.IsFirst(g => g.IsAlike)),
                Table.Share(scores, s => s.IsInFirstThree(g => g.IsAlike)), " " + string.Join(", ", taken));
        }

        table.Write(output, $"Single faults of visibility over {Plain} by kind");
    }

    private static void ByBoard(TextWriter output, IReadOnlyList<CaseScore> all)
    {
        var table = new Table("board", "healthy", "false alarms", "plain faults", "disagrees", "first alike", "three alike", "mean ms");
        foreach (var board in all.GroupBy(s => s.Case.Bench.Board.Title).OrderBy(g => g.Key, StringComparer.Ordinal))
        {
            var healthy = board.Where(s => s.Case.IsHealthy).ToArray();
            var plain = board.Where(s => s.IsSingle && s.Case.Visibility > Plain).ToArray();
            table.Row(
                board.Key, $"{healthy.Length}", Table.Share(healthy, s => s.Verdict == BoardVerdict.Disagrees), $"{plain.Length}",
                Table.Share(plain, s => s.Verdict == BoardVerdict.Disagrees), Table.Share(plain, s => s.IsFirst(g => g.IsAlike)),
                Table.Share(plain, s => s.IsInFirstThree(g => g.IsAlike)), $"{board.Average(s => s.Elapsed.TotalMilliseconds):F0}");
        }

        table.Write(output, "By board");
    }

    private static void Failures(TextWriter output, IReadOnlyList<CaseScore> all)
    {
        Listed(output, "False alarms", all.Where(s => s.Case.IsHealthy && s.Verdict == BoardVerdict.Disagrees));
        Listed(output, $"Missed though of visibility over {Plain}", all.Where(s => s.IsSingle && s.Case.Visibility > Plain && s.Verdict is not null and not BoardVerdict.Disagrees));
        Listed(output, $"Not in the first three though of visibility over {Plain}", all.Where(s => s.IsSingle && s.Case.Visibility > Plain && s.Failure is null && !s.IsInFirstThree(g => g.IsAlike)));
        Listed(output, $"Not first though of visibility over {Plain}", all.Where(s => s.IsSingle && s.Case.Visibility > Plain && s.IsInFirstThree(g => g.IsAlike) && !s.IsFirst(g => g.IsAlike)));
        Listed(output, "Exceptions", all.Where(s => s.Failure is not null));
    }

    private static void Listed(TextWriter output, string title, IEnumerable<CaseScore> scores)
    {
        var list = scores.ToArray();
        if (list.Length == 0) return;
        var table = new Table("case", "visibility", "board: truth → said");
        foreach (var s in list.Take(FailuresShown))
        {
            var truth = s.Case.IsHealthy ? "healthy" : string.Join(" + ", s.Case.Faults);
            var said = s.Failure ?? string.Join("; ", s.Groups.Take(3).Select(g => $"{100 * g.Probability:F0} % {g.Text}"));
            table.Row(s.Case.Name, $"{s.Case.Visibility:F1}", $" {s.Case.Bench.Board.Title}: {truth} → {said}");
        }

        table.Write(output, $"{title}: {list.Length}{(list.Length > FailuresShown ? $", the first {FailuresShown}" : "")}");
    }
}
