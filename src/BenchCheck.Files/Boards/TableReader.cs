using System.Collections.Immutable;
using BenchCheck.Core.Quantities;

namespace BenchCheck.Files;

/// <summary>Takes the keys of one table, one after the other; what is left over at the end is an unknown key.</summary>
/// <param name="subject">what the table describes, as messages name it: "R3", "meter handheld"</param>
internal sealed class TableReader(TomlTable table, string subject, ProblemList problems)
{
    private readonly HashSet<string> known = new(StringComparer.Ordinal);

    public TomlPlace Place => table.Place;

    public string Subject => subject;

    public ProblemList Problems => problems;

    public TomlEntry? Take(string key)
    {
        known.Add(key);
        return table.TryGet(key, out var entry) ? entry : null;
    }

    /// <summary>A text; null when the key is absent or holds something else, which is then an error.</summary>
    public TomlText? TakeText(string key)
    {
        if (Take(key) is not { } entry) return null;
        if (entry.Value is TomlText text) return text;
        problems.Error(entry.Value.Place, $"{subject}: {key} is {entry.Value.Describe}", "a text in double quotes");
        return null;
    }

    public TomlTable? TakeTable(string key)
    {
        if (Take(key) is not { } entry) return null;
        if (entry.Value is TomlTable inner) return inner;
        problems.Error(entry.Value.Place, $"{subject}: {key} is {entry.Value.Describe}", $"a table: {key} = {{ … }}");
        return null;
    }

    /// <summary>A list of texts; null when absent or not such a list.</summary>
    public ImmutableArray<TomlText>? TakeTexts(string key)
    {
        if (Take(key) is not { } entry) return null;
        if (entry.Value is TomlList list && list.Items.All(i => i is TomlText)) return [.. list.Items.Cast<TomlText>()];
        problems.Error(entry.Value.Place, $"{subject}: {key} is {entry.Value.Describe}", $"a list of texts: {key} = [\"…\", \"…\"]");
        return null;
    }

    /// <summary>One quantity without tolerance, within limits; null when absent or wrong.</summary>
    public double? TakeNumber(string key, Unit unit, Limits limits)
    {
        if (TakeText(key) is not { } text) return null;
        var parsed = QuantityText.Number(text.Text, unit);
        if (parsed.Fault is { } fault)
        {
            problems.Error(text.Place, $"{subject}: {key}", fault);
            return null;
        }

        return limits.Check(parsed.Value, parsed.Value, parsed.Value) is not { } expected
            ? parsed.Value
            : Absurd(text, key, expected, limits.Hint);
    }

    /// <summary>A value with its tolerance, within limits; null when absent or wrong.</summary>
    public Nominal? TakeNominal(string key, Unit unit, Tolerance usual, Limits limits)
    {
        if (TakeText(key) is not { } text) return null;
        var parsed = QuantityText.Nominal(text.Text, unit, usual);
        if (parsed.Fault is { } fault)
        {
            problems.Error(text.Place, $"{subject}: {key}", fault);
            return null;
        }

        var nominal = parsed.Value;
        if (nominal.IsUnknown || limits.Check(nominal.Value, nominal.Low, nominal.High) is not { } expected) return nominal;
        Absurd(text, key, expected, limits.Hint);
        return null;
    }

    /// <summary>Reports every key that nobody took.</summary>
    public void Finish()
    {
        foreach (var entry in table.Entries.Where(e => !known.Contains(e.Key)))
        {
            problems.Error(entry.Place, $"{subject}: unknown key {TextFault.Quote(entry.Key)}", NearMiss.List(known.Order(StringComparer.Ordinal)),
                NearMiss.Suggest(entry.Key, known));
        }
    }

    private double? Absurd(TomlText text, string key, string expected, string? hint)
    {
        problems.Error(text.Place, $"{subject}: {key} {TextFault.Quote(text.Text)}", expected, hint);
        return null;
    }
}
