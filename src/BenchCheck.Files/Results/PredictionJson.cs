using System.Text;
using System.Text.Encodings.Web;
using System.Text.Json;
using BenchCheck.Core.Checking;
using BenchCheck.Core.Metering;

namespace BenchCheck.Files;

/// <summary>Writes a prediction as one JSON object on one line, SI units.</summary>
public static class PredictionJson
{
    /// <param name="condition">only this condition; null for all</param>
    public static string Line(Prediction prediction, string? condition)
    {
        ArgumentNullException.ThrowIfNull(prediction);
        using var buffer = new MemoryStream();
        using (var json = new Utf8JsonWriter(buffer, new JsonWriterOptions { Encoder = JavaScriptEncoder.Default }))
        {
            json.WriteStartObject();
            json.WriteNumber("format", 1);
            json.WriteString("board", prediction.BoardTitle);
            Array(json, "nodes", prediction.Nodes.Where(n => Wanted(n.Condition)), n =>
            {
                json.WriteString("condition", n.Condition);
                json.WriteString("at", n.Node);
                Number(json, "predicted", n.Volts);
                Number(json, "bandLow", n.BandLow);
                Number(json, "bandHigh", n.BandHigh);
                Number(json, "resistance", n.TheveninOhms);
                Influences(json, n.Influences);
            });
            Array(json, "signals", prediction.Signals.Where(s => Wanted(s.Condition)), s =>
            {
                json.WriteString("condition", s.Condition);
                json.WriteString("quantity", s.Quantity.Name());
                json.WriteString("at", s.At);
                json.WriteString("against", s.Against);
                json.WriteString("unit", s.Quantity.Unit().Symbol);
                Number(json, "predicted", s.Value);
                Number(json, "bandLow", s.BandLow);
                Number(json, "bandHigh", s.BandHigh);
                Influences(json, s.Influences);
            });
            Array(json, "lookingIn", prediction.LookingIn.Where(l => Wanted(l.Condition)), l =>
            {
                json.WriteString("condition", l.Condition);
                json.WriteString("at", l.At);
                json.WriteString("against", l.Against);
                Number(json, "openVoltage", l.Volts ?? double.NaN);
                Number(json, "resistance", l.Ohms);
                Number(json, "shortCurrent", l.ShortAmperes ?? double.NaN);
            });
            Array(json, "currents", prediction.Currents.Where(c => Wanted(c.Condition)), c =>
            {
                json.WriteString("condition", c.Condition);
                json.WriteString("at", c.At);
                Number(json, "amperes", c.Amperes);
            });
            Array(json, "states", prediction.States.Where(s => Wanted(s.Condition)), s =>
            {
                json.WriteString("part", s.Part);
                json.WriteString("condition", s.Condition);
                json.WriteString("state", s.State);
            });
            Array(json, "dissipation", prediction.Dissipation, d =>
            {
                json.WriteString("part", d.Part);
                json.WriteString("condition", d.Condition);
                Number(json, "watts", d.Watts);
                Number(json, "rating", d.RatedWatts ?? double.NaN);
                json.WriteBoolean("over", d.IsOver);
            });
            Strings(json, "cautions", prediction.Cautions);
            Strings(json, "assumed", prediction.Assumed);
            json.WriteEndObject();
        }

        return Encoding.UTF8.GetString(buffer.ToArray());

        bool Wanted(string name) => condition is null || name == condition;
    }

    private static void Influences(Utf8JsonWriter json, IEnumerable<Influence> influences) => Array(json, "influences", influences, i =>
    {
        json.WriteString("part", i.Part);
        json.WriteString("parameter", i.Parameter.Name);
        Number(json, "share", i.Share);
        Number(json, "slope", i.PerUnit);
    });

    private static void Array<T>(Utf8JsonWriter json, string name, IEnumerable<T> items, Action<T> write)
    {
        json.WriteStartArray(name);
        foreach (var item in items)
        {
            json.WriteStartObject();
            write(item);
            json.WriteEndObject();
        }

        json.WriteEndArray();
    }

    private static void Strings(Utf8JsonWriter json, string name, IEnumerable<string> items)
    {
        json.WriteStartArray(name);
        foreach (var item in items) json.WriteStringValue(item);
        json.WriteEndArray();
    }

    private static void Number(Utf8JsonWriter json, string name, double value)
    {
        if (double.IsFinite(value)) json.WriteNumber(name, value);
        else json.WriteNull(name);
    }
}
