using System.Text.Json;
using System.Text.Json.Serialization;
using BenchCheck.Core.Checking;
using BenchCheck.Core.Equations;

namespace BenchCheck.Commands.Log;

/// <summary>The settings of a check as a record keeps them.</summary>
internal sealed record FiledSettings(double Confidence, BandMethod Bands, JunctionLaw Law, int Draws, int Seed, bool FindFaults, bool SkipBadRows)
{
    private static readonly JsonSerializerOptions Json = new(JsonSerializerDefaults.Web) { Converters = { new JsonStringEnumConverter(JsonNamingPolicy.KebabCaseLower) } };

    [JsonIgnore]
    public CheckSettings Settings => CheckSettings.Default with
    {
        Confidence = Confidence, Bands = Bands, Law = Law, Draws = Draws, Seed = Seed, FindFaults = FindFaults,
    };

    public static string Text(CheckSettings settings, bool skipBadRows) => JsonSerializer.Serialize(
        new FiledSettings(settings.Confidence, settings.Bands, settings.Law, settings.Draws, settings.Seed, settings.FindFaults, skipBadRows), Json);

    /// <exception cref="JsonException">not the settings of a check</exception>
    public static FiledSettings Parse(string text) => JsonSerializer.Deserialize<FiledSettings>(text, Json) ?? throw new JsonException("no settings");
}
