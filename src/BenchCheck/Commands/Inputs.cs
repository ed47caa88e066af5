using System.Collections.Immutable;
using System.CommandLine;
using BenchCheck.Core.Metering;
using BenchCheck.Files;

namespace BenchCheck.Commands;

/// <summary>The files that a command reads; what is wrong with them goes to the error stream, all of it at once.</summary>
internal sealed class Inputs
{
    private readonly Argument<string> board = new("BOARD") { Description = "Board file (TOML)." };
    private readonly Argument<string> readings = new("READINGS") { Description = "Readings file (CSV)." };
    private readonly Option<bool> skipBadRows = new("--skip-bad-rows") { Description = "Leave out rows that cannot be used instead of stopping; each is named." };
    private readonly Option<string?> serial = new("--serial") { Description = "Only the board of this serial.", HelpName = "SERIAL" };
    private readonly Terminal terminal;

    private Inputs(Command command, Terminal terminal)
    {
        this.terminal = terminal;
        command.Add(board);
    }

    public static Inputs BoardOnly(Command command, Terminal terminal) => new(command, terminal);

    public static Inputs BoardAndReadings(Command command, Terminal terminal)
    {
        var inputs = new Inputs(command, terminal);
        command.Add(inputs.readings);
        command.Add(inputs.skipBadRows);
        command.Add(inputs.serial);
        return inputs;
    }

    public string BoardPath(ParseResult parsed) => parsed.GetRequiredValue(board);

    public string ReadingsPath(ParseResult parsed) => parsed.GetRequiredValue(readings);

    public bool SkipsBadRows(ParseResult parsed) => parsed.GetValue(skipBadRows);

    public Bench? Bench(ParseResult parsed)
    {
        var result = BoardFile.Read(parsed.GetRequiredValue(board));
        Say(result.Problems);
        return result.Bench;
    }

    /// <summary>The readings of every board asked for; null when the file cannot be used.</summary>
    public IEnumerable<ReadingSet>? Readings(ParseResult parsed, Bench bench)
    {
        var path = parsed.GetRequiredValue(readings);
        var result = ReadingsFile.Read(path, bench, new ReadingsOptions { SkipBadRows = parsed.GetValue(skipBadRows) });
        Say(result.Problems);
        if (!result.IsUsable) return null;
        if (parsed.GetValue(serial) is not { } wanted) return result.Sets;
        var sets = result.Sets.Where(s => s.Serial == wanted).ToArray();
        if (sets.Length > 0) return sets;
        terminal.Error.WriteLine($"{Printable.Text(path)}: no board of serial \"{Printable.Text(wanted)}\"");
        return null;
    }

    private void Say(ImmutableArray<FileProblem> problems)
    {
        foreach (var problem in problems) terminal.Error.WriteLine(Printable.Text(problem.ToString()));
    }
}
