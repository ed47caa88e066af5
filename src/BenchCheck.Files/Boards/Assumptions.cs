using System.Collections.Immutable;

namespace BenchCheck.Files;

/// <summary>Collects what a board file left open; parts for which the same was taken share one sentence.</summary>
internal sealed class Assumptions
{
    private readonly List<(string Text, List<string> Subjects)> sentences = [];

    /// <param name="subject">designator or other name; empty for the file as a whole</param>
    /// <param name="text">what was not said and what was taken instead</param>
    public void Add(string subject, string text)
    {
        var sentence = sentences.Find(s => s.Text == text);
        if (sentence.Subjects is null) sentences.Add(sentence = (text, []));
        if (subject.Length > 0) sentence.Subjects.Add(subject);
    }

    public ImmutableArray<string> Sentences() =>
        [.. sentences.Select(s => s.Subjects.Count == 0 ? s.Text : $"{string.Join(", ", s.Subjects)}: {s.Text}")];
}
