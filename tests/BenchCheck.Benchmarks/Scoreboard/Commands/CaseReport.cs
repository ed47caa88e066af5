using System.Globalization;
using BenchCheck.Benchmarks.Scoreboard.Cases;
using BenchCheck.Benchmarks.Scoreboard.Physics;
using BenchCheck.Benchmarks.Scoreboard.Scoring;
using BenchCheck.Core.Checking;
using BenchCheck.Core.Diagnosis;

namespace BenchCheck.Benchmarks.Scoreboard.Commands;

/// <summary>Everything about one case: the board, the truth, the readings beside what the program made of them, its suspects.</summary>
internal static class CaseReport
{
    public static int Print(TextWriter output, TruthCase truth)
    {
        output.WriteLine(BoardText.Of(truth.Bench));
        output.WriteLine($"truth: {(truth.Faults.IsEmpty ? "healthy" : string.Join(" + ", truth.Faults))}; visibility {truth.Visibility:F1}");
        foreach (var part in truth.Faulty.Parts) output.WriteLine($"  {part}");
        var result = new Reconciliation(truth.Bench, CheckSettings.Default).Run(truth.Readings);
        var score = new CaseScorer(new TruthSolver(), CheckSettings.Default).Score(KnownCase.Of(truth));
        var table = new Table("reading", "shown", "predicted", "u", "En", "verdict", "first suspect gives");
        for (var i = 0; i < result.Readings.Length; i++)
        {
            var r = result.Readings[i];
            var first = result.Suspects.IsEmpty || result.Suspects[0].Explained.Length <= i ? "-" : Number(result.Suspects[0].Explained[i]);
            table.Row($"{r.Reading.Condition} {r.Reading.At}-{r.Reading.Against}", Number(r.Reading.Value), Number(r.Predicted), Number(r.StandardUncertainty), $"{r.En:F2}", $"{r.Verdict}", first);
        }

        table.Write(output, $"{result.Verdict}: {result.Reason}");
        var suspects = new Table("probability", "χ²", "right", "suspect and its alternatives");
        foreach (var (suspect, group) in result.Suspects.Zip(score.Groups))
        {
            var right = group.IsExact ? "exact" : group.IsNamed ? "named" : group.IsAlike ? "alike" : group.IsPartly ? "partly" : "";
            suspects.Row($"{100 * suspect.Probability:F1} %", $"{suspect.ChiSquared:F1}", right, " " + string.Join(" | ", suspect.Alike.Prepend(suspect.Fault).Select(f => f.Text)));
        }

        suspects.Write(output, "Suspects");
        foreach (var estimate in result.Parameters)
            output.WriteLine($"  {estimate.Part} {estimate.Kind.Name} {estimate.Condition}: {Number(estimate.Value)} in {Number(estimate.Low)} .. {Number(estimate.High)} ({estimate.Determined})");
        foreach (var (name, gain) in truth.Gains) output.WriteLine($"  true gain of {name}: {Number(gain)}");
        foreach (var next in result.Next) output.WriteLine($"  next: {next.Bits:F2} bits {next.Text}");
        return 0;
    }

    private static string Number(double value) => value.ToString("G5", CultureInfo.InvariantCulture);
}
