using System.CommandLine;
using BenchCheck.Core.Checking;
using BenchCheck.Core.Diagnosis;
using BenchCheck.Core.Equations;
using BenchCheck.Core.Metering;

namespace BenchCheck.Commands;

/// <summary>The options that every command takes which checks or predicts.</summary>
internal sealed class CheckOptions
{
    private const string FirstOrder = "first-order";
    private const string MonteCarlo = "monte-carlo";
    private const string WorstCase = "worst-case";
    private const string FollowsCurrent = "junction";
    private const string ConstantDrop = "constant-drop";

    private readonly Option<double> confidence = new("--confidence")
    {
        Description = "Confidence of verdicts and intervals, in percent.", DefaultValueFactory = _ => 95, HelpName = "PERCENT",
    };

    private readonly Option<string> bands = new("--bands")
    {
        Description = "How bands are computed: first-order, monte-carlo or worst-case.", DefaultValueFactory = _ => FirstOrder, HelpName = "METHOD",
    };

    private readonly Option<string> law = new("--law")
    {
        Description = "Voltage of a conducting junction: junction (follows its current) or constant-drop.", DefaultValueFactory = _ => FollowsCurrent, HelpName = "LAW",
    };

    private readonly Option<int> seed = new("--seed")
    {
        Description = "Seed of the Monte Carlo draws.", DefaultValueFactory = _ => 1, HelpName = "N",
    };

    private readonly Option<int> draws = new("--draws")
    {
        Description = "How many boards a Monte Carlo band draws.", DefaultValueFactory = _ => CheckSettings.Default.Draws, HelpName = "N",
    };

    private readonly Option<string?> rates = new("--rates")
    {
        Description = "Your own fault rates: lines \"kind,new build,service\"; kinds left out keep the usual rate.", HelpName = "FILE",
    };

    public CheckOptions(Command command)
    {
        bands.AcceptOnlyFromAmong(FirstOrder, MonteCarlo, WorstCase);
        law.AcceptOnlyFromAmong(FollowsCurrent, ConstantDrop);
        confidence.Validators.Add(result =>
        {
            if (result.GetValueOrDefault<double>() is not (>= 50 and <= 99.99)) result.AddError("--confidence takes a percentage from 50 to 99.99");
        });
        draws.Validators.Add(result =>
        {
            if (result.GetValueOrDefault<int>() is not (>= 100 and <= 10_000_000)) result.AddError("--draws takes a number from 100 to 10000000");
        });
        command.Add(confidence);
        command.Add(bands);
        command.Add(law);
        command.Add(seed);
        command.Add(draws);
        command.Add(rates);
    }

    public CheckSettings Settings(ParseResult parsed) => CheckSettings.Default with
    {
        Confidence = parsed.GetValue(confidence) / 100,
        Bands = parsed.GetValue(bands) switch { MonteCarlo => BandMethod.MonteCarlo, WorstCase => BandMethod.WorstCase, _ => BandMethod.FirstOrder },
        Law = parsed.GetValue(law) == ConstantDrop ? JunctionLaw.ConstantDrop : JunctionLaw.Exponential,
        Seed = parsed.GetValue(seed),
        Draws = parsed.GetValue(draws),
    };

    /// <summary>The file of fault rates; null when the usual rates are meant.</summary>
    public string? RatesPath(ParseResult parsed) => parsed.GetValue(rates);

    /// <summary>The fault rates to use; null when the file named cannot be used, which is then said.</summary>
    public FaultRates? Rates(ParseResult parsed, Bench bench, Terminal terminal)
    {
        var usual = FaultRates.For(bench.Board.Origin);
        if (parsed.GetValue(rates) is not { } path) return usual;
        try
        {
            return FaultRates.Parse(File.ReadAllText(path), bench.Board.Origin, usual);
        }
        catch (Exception failure) when (failure is FormatException or IOException or UnauthorizedAccessException)
        {
            terminal.Error.WriteLine($"{Printable.Text(path)}: {Printable.Text(failure.Message)}");
            return null;
        }
    }
}
