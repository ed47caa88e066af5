using System.Text;

namespace BenchCheck.Files;

/// <summary>Writes a part, and the values in it, as a board file does.</summary>
internal static class PartLine
{
    /// <summary><c>R3 = { kind = "resistor", value = "1k8 5%", pins = ["VCC", "C1"] }</c>, without a line end.</summary>
    /// <param name="nameWidth">columns of the designator, so that the line stands as its neighbours do</param>
    public static string Of(PartText part, int nameWidth)
    {
        var pins = PartKeys.PinsOf(part.Kind);
        var isSymmetric = PartSyntax.Find(part.Kind) is { Kind.IsSymmetric: true };
        var line = new StringBuilder(Key(part.Designator).PadRight(nameWidth)).Append(" = { kind = ").Append(Quoted(part.Kind));
        var keys = PartKeys.Of(part.Kind).Where(k => part.Value(k.Name).Length > 0).ToLookup(k => k.Name is "rating" or "note");
        foreach (var key in keys[false]) line.Append(", ").Append(Pair(key.Name, part));
        line.Append(", pins = ");
        line.Append(isSymmetric
            ? $"[{string.Join(", ", part.Nodes.Select(Quoted))}]"
            : $"{{ {string.Join(", ", pins.Select((pin, i) => $"{pin} = {Quoted(part.Nodes[i])}"))} }}");
        foreach (var key in keys[true]) line.Append(", ").Append(Pair(key.Name, part));
        return line.Append(" }").ToString();
    }

    public static string Pair(string key, PartText part) => $"{key} = {Value(key, part.Value(key))}";

    /// <summary>A key's value; two nodes that control a source are a list.</summary>
    public static string Value(string key, string text) =>
        key == "control" && text.Contains(',', StringComparison.Ordinal)
            ? $"[{string.Join(", ", text.Split(',', StringSplitOptions.TrimEntries).Select(Quoted))}]"
            : Quoted(text);

    /// <summary>A bare key where TOML allows one.</summary>
    public static string Key(string name) => name.Length > 0 && name.All(c => char.IsAsciiLetterOrDigit(c) || c is '_' or '-') ? name : Quoted(name);

    /// <summary>A basic string (TOML 1.0.0, "String").</summary>
    public static string Quoted(string text)
    {
        var quoted = new StringBuilder("\"");
        foreach (var c in text)
        {
            if (c is '"' or '\\') quoted.Append('\\').Append(c);
            else if (char.IsControl(c)) quoted.Append("\\u").Append(((int)c).ToString("x4", System.Globalization.CultureInfo.InvariantCulture));
            else quoted.Append(c);
        }

        return quoted.Append('"').ToString();
    }
}
