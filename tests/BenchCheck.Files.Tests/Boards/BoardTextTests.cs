using System.Collections.Immutable;
using BenchCheck.Core.Quantities;
using BenchCheck.Files;
using CsCheck;
using Xunit;

namespace BenchCheck.Files.Tests.Boards;

/// <summary>Board files changed part by part: what was not asked for stays as it was, to the byte.</summary>
public sealed class BoardTextTests
{
    private const string Small = """
        # a comment on top
        title = "Small"   # with a remark

        [parts]
        V1  = { kind = "supply",   value = "12 V 1%", pins = { plus = "VCC", minus = "GND" } }
        R1  = { kind = "resistor", value = "10k 5%",  pins = ["VCC", "OUT"], rating = "0.25 W" } # upper
        # the lower one
        R2  = { value = 4700, kind = 'resistor', pins = [ "OUT" , "GND" ], note = "say \"low\", please" }
        C1  = { kind = "capacitor", value = "10 uF", pins = ["OUT", "GND"] }

        [parts.Q1]   # in full
        kind = "npn"
        pins = { emitter = "GND", base = "OUT", collector = "VCC" }
        gain = "100..300"    # of the lot

        [conditions.powered]

        """;

    [Theory]
    [InlineData("R1", "value", "22k 1%", "\"10k 5%\"", "\"22k 1%\"")]
    [InlineData("R1", "rating", "", ", rating = \"0.25 W\"", "")]
    [InlineData("R1", "note", "hot", "rating = \"0.25 W\" }", "rating = \"0.25 W\", note = \"hot\" }")]
    [InlineData("R2", "value", "4k7 5%", "value = 4700", "value = \"4k7 5%\"")]
    [InlineData("R2", "note", "", ", note = \"say \\\"low\\\", please\"", "")]
    [InlineData("Q1", "gain", "200", "\"100..300\"    # of the lot", "\"200\"    # of the lot")]
    [InlineData("Q1", "rating", "0.3 W", "# of the lot", "# of the lot\nrating = \"0.3 W\"")]
    public void A_changed_value_changes_nothing_else(string part, string key, string value, string before, string after)
    {
        var text = BoardText.Of(Small);
        var changed = text.Changed(part, With(text.Part(part)!, key, value));
        Assert.Equal(Small.Replace(before, after, StringComparison.Ordinal), changed.Value.Text);
    }

    [Fact]
    public void A_part_moved_to_another_node_and_renamed_keeps_its_line()
    {
        var text = BoardText.Of(Small);
        var moved = text.Changed("R2", text.Part("R2")! with { Designator = "R7", Nodes = ["OUT", "VCC"] }).Value.Text;
        Assert.Equal(Small.Replace("R2  =", "R7  =", StringComparison.Ordinal).Replace("[ \"OUT\" , \"GND\" ]", "[ \"OUT\" , \"VCC\" ]", StringComparison.Ordinal), moved);
        var turned = text.Changed("Q1", text.Part("Q1")! with { Nodes = ["OUT", "VCC", "GND"] }).Value.Text;
        Assert.Equal(Small.Replace("base = \"OUT\", collector = \"VCC\"", "base = \"VCC\", collector = \"OUT\"", StringComparison.Ordinal), turned);
    }

    [Fact]
    public void A_part_comes_in_after_the_last_of_its_class_and_goes_out_with_its_line()
    {
        var text = BoardText.Of(Small);
        var part = new PartText("R3", "resistor", ["VCC", "GND"], Values(("value", "1M"), ("note", "a \"new\" one")));
        var added = text.Added(part).Value;
        var line = "R3  = { kind = \"resistor\", value = \"1M\", pins = [\"VCC\", \"GND\"], note = \"a \\\"new\\\" one\" }\n";
        Assert.Equal(Small.Replace("C1  =", line + "C1  =", StringComparison.Ordinal), added.Text);
        Assert.Equal(Small, added.Removed("R3").Value.Text);
        Assert.NotNull(text.Added(part with { Designator = "R1" }).Fault);
    }

    [Fact]
    public void A_part_written_as_a_table_goes_out_whole_and_the_comment_behind_it_stays()
    {
        var removed = BoardText.Of(Small.Replace("[conditions.powered]", "# then\n[conditions.powered]", StringComparison.Ordinal)).Removed("Q1").Value.Text;
        Assert.DoesNotContain("Q1", removed);
        Assert.DoesNotContain("gain", removed);
        Assert.Contains("# then\n[conditions.powered]", removed);
    }

    [Fact]
    public void Line_ends_of_the_file_are_kept()
    {
        var windows = Small.Replace("\n", "\r\n", StringComparison.Ordinal);
        var added = BoardText.Of(windows).Added(new PartText("R3", "resistor", ["VCC", "GND"], Values(("value", "1M")))).Value.Text;
        Assert.DoesNotContain('\n', added.Replace("\r\n", "", StringComparison.Ordinal));
        Assert.Equal(windows, BoardText.Of(added).Removed("R3").Value.Text);
    }

    [Fact]
    public void A_part_in_dotted_keys_is_left_to_an_editor()
    {
        var text = BoardText.Of("[parts]\nR1.kind = \"resistor\"\nR1.value = \"1k\"\nR1.pins = [\"A\", \"B\"]\n");
        Assert.Null(text.Part("R1"));
        Assert.NotNull(text.Removed("R1").Fault);
    }

    [Fact]
    public void Every_kind_can_be_added_with_every_key_that_its_form_asks_for_and_is_then_understood()
    {
        foreach (var kind in PartKeys.Kinds)
        {
            var part = Filled(kind, "X9");
            var text = BoardText.Of(Small).Added(part);
            Assert.True(text.IsValue, $"{kind}: {text.Fault?.Read}");
            var result = BoardFile.Parse(text.Value.Text, "board.toml");
            Assert.True(result.Bench is not null, kind + ": " + string.Join("\n", result.Problems));
            Assert.NotNull(result.Bench!.Board.Find("X9"));
        }
    }

    [Fact]
    public void Every_part_of_the_samples_is_read_and_written_back_as_it_was()
    {
        foreach (var file in Directory.EnumerateFiles(SampleFolder(), "*.toml"))
        {
            var text = BoardText.Of(File.ReadAllText(file));
            foreach (var part in BoardFile.Read(file).Bench!.Board.Parts)
            {
                var written = text.Part(part.Designator)!;
                Assert.Equal([.. part.Nodes], written.Nodes);
                Assert.Equal(text.Text, text.Changed(part.Designator, written).Value.Text);
                var other = text.Changed(part.Designator, With(written, "note", "seen")).Value;
                Assert.Equal(text.Text, other.Changed(part.Designator, written).Value.Text.Replace("seen", "", StringComparison.Ordinal));
            }
        }
    }

    [Fact]
    public void Whatever_is_typed_into_a_form_is_read_back_as_it_was_typed()
    {
        Gen.Select(Gen.String[0, 20], Gen.String[1, 12], Gen.String[1, 12], Gen.Int[0, 2].Select(i => new[] { "value", "rating", "note" }[i])).Sample((value, node, name, key) =>
        {
            var text = BoardText.Of(Small);
            var part = With(text.Part("R2")! with { Designator = name, Nodes = [node, "GND"] }, key, value);
            var changed = text.Changed("R2", part);
            if (changed.Fault is not null) return char.IsSurrogate(value.FirstOrDefault(char.IsSurrogate)) || name.Any(char.IsSurrogate) || node.Any(char.IsSurrogate);
            var read = changed.Value.Part(name)!;
            return read.Value(key) == value && read.Nodes[0] == node && changed.Value.Text.StartsWith(Small[..Small.IndexOf("R2", StringComparison.Ordinal)], StringComparison.Ordinal);
        });
    }

    private static string SampleFolder()
    {
        var folder = new DirectoryInfo(AppContext.BaseDirectory);
        while (!Directory.Exists(Path.Combine(folder!.FullName, "sample-measurements"))) folder = folder.Parent;
        return Path.Combine(folder.FullName, "sample-measurements");
    }

    private static PartText Filled(string kind, string designator)
    {
        var nodes = PartKeys.PinsOf(kind).Select((_, i) => i % 2 == 0 ? "VCC" : "OUT").ToImmutableArray();
        return new PartText(designator, kind, nodes, Values([.. PartKeys.Of(kind).Select(k => (k.Name, ExampleOf(k)))]));
    }

    /// <summary>The example of a key as far as it is a value.</summary>
    private static string ExampleOf(PartKey key) => key.Name switch
    {
        "state" => "open",
        "control" when key.Example.Contains("nodes", StringComparison.Ordinal) => "OUT, GND",
        "control" => "R1",
        _ => key.Example.Split(',')[0],
    };

    private static PartText With(PartText part, string key, string value) =>
        part with { Values = value.Length == 0 ? part.Values.Remove(key) : part.Values.SetItem(key, value) };

    private static ImmutableSortedDictionary<string, string> Values(params (string Key, string Value)[] pairs) =>
        pairs.ToImmutableSortedDictionary(p => p.Key, p => p.Value, StringComparer.Ordinal);
}
