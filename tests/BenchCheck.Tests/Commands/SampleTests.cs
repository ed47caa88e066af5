using System.Text.Json;
using BenchCheck.Tests.Screens;
using Xunit;

namespace BenchCheck.Tests.Commands;

/// <summary>What the samples are said to show is what the program says of them.</summary>
public sealed class SampleTests : IDisposable
{
    private readonly CommandLine line = new();

    [Fact]
    public async Task The_dried_out_capacitor_of_the_drip_sensor_is_named_while_every_voltage_is_in()
    {
        var sample = Path.Combine(WorkFolder.Samples, "drip-sensor");
        Assert.Equal(1, await line.Run("check", sample + ".toml", sample + ".csv", "--json"));
        using var json = JsonDocument.Parse(line.Output);
        var suspect = json.RootElement.GetProperty("suspects")[0];
        Assert.Equal("wrong value", suspect.GetProperty("fault").GetString());
        Assert.Equal("C2", suspect.GetProperty("parts")[0].GetString());
        Assert.True(suspect.GetProperty("probability").GetDouble() > 0.9);

        // 1.5 µF were left.
        Assert.Equal(1.5e-6, suspect.GetProperty("value").GetDouble(), 0.2e-6);
        var atRest = json.RootElement.GetProperty("readings").EnumerateArray().Where(r => r.GetProperty("condition").GetString() == "powered").ToList();
        Assert.Equal(6, atRest.Count);
        Assert.All(atRest, r => Assert.Equal("in", r.GetProperty("verdict").GetString()));
    }

    public void Dispose() => line.Dispose();
}
