using System.Text;
using System.Text.Json;

namespace BenchCheck.Records;

/// <summary>Writes records as JSON lines: a line a record, and before the first record that needs it a line for each file.</summary>
/// <remarks>
/// <c>{"sha256": …, "text": …}</c> for a file that is UTF-8 text (<c>"base64"</c> for any other), then <c>{"number": …, "filedAt": …, …, "settings":
/// {…}, "result": {…}}</c>. Settings and result stand as they were filed. The same records give the same bytes whatever database held them.
/// </remarks>
public static class LogExport
{
    private static readonly UTF8Encoding Strict = new(false, true);

    /// <summary>Writes every record that matches.</summary>
    /// <param name="target">receives UTF-8; stays open</param>
    /// <returns>how many records were written</returns>
    public static long Write(BenchLog log, LogQuery query, Stream target, CancellationToken cancel = default)
    {
        ArgumentNullException.ThrowIfNull(log);
        ArgumentNullException.ThrowIfNull(target);
        var written = new HashSet<string>(StringComparer.Ordinal);
        using var json = new Utf8JsonWriter(target);
        var count = 0L;
        foreach (var record in log.Records(query))
        {
            cancel.ThrowIfCancellationRequested();
            foreach (var file in record.Files)
            {
                if (written.Add(file)) WriteFile(json, file, log.Input(file));
                EndLine(json, target);
            }

            WriteRecord(json, record);
            EndLine(json, target);
            count++;
        }

        return count;
    }

    private static void WriteFile(Utf8JsonWriter json, string sha256, byte[]? body)
    {
        json.WriteStartObject();
        json.WriteString("sha256", sha256);
        if (body is null) json.WriteNull("text");
        else if (Text(body) is { } text) json.WriteString("text", text);
        else json.WriteBase64String("base64", body);
        json.WriteEndObject();
    }

    private static void WriteRecord(Utf8JsonWriter json, LogRecord record)
    {
        json.WriteStartObject();
        json.WriteNumber("number", record.Entry.Number);
        json.WriteString("filedAt", record.Entry.FiledAt);
        json.WriteString("program", record.Entry.Program);
        json.WriteString("board", record.Entry.BoardTitle);
        json.WriteString("serial", record.Entry.Serial);
        json.WriteString("verdict", record.Entry.Verdict);
        json.WriteString("boardFile", record.BoardFile);
        json.WriteString("readingsFile", record.ReadingsFile);
        json.WriteString("ratesFile", record.RatesFile);
        json.WriteString("plot", record.Plot);
        json.WriteString("previous", record.Previous);
        json.WriteString("hash", record.Entry.Hash);
        Verbatim(json, "settings", record.Settings);
        Verbatim(json, "result", record.Result);
        json.WriteEndObject();
    }

    /// <summary>JSON as it was filed; as a string where it is none, so that a changed record cannot break the export.</summary>
    private static void Verbatim(Utf8JsonWriter json, string name, string text)
    {
        json.WritePropertyName(name);
        try
        {
            using var _ = JsonDocument.Parse(text);
            if (text.AsSpan().ContainsAny('\n', '\r')) json.WriteStringValue(text);
            else json.WriteRawValue(text);
        }
        catch (JsonException)
        {
            json.WriteStringValue(text);
        }
    }

    private static void EndLine(Utf8JsonWriter json, Stream target)
    {
        if (json.BytesCommitted + json.BytesPending == 0) return;
        json.Flush();
        json.Reset();
        target.WriteByte((byte)'\n');
    }

    private static string? Text(byte[] body)
    {
        try
        {
            return Strict.GetString(body);
        }
        catch (DecoderFallbackException)
        {
            return null;
        }
    }
}
