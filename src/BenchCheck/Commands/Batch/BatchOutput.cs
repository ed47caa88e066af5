using System.Text;
using BenchCheck.Core.Batches;
using BenchCheck.Core.Checking;
using BenchCheck.Core.Metering;
using BenchCheck.Files;

namespace BenchCheck.Commands.Batch;

/// <summary>The file that a batch writes its results to, a line a board: CSV or JSON lines, by the ending of its name.</summary>
internal sealed class BatchOutput : IDisposable
{
    private readonly BatchCsv? csv;
    private readonly FileStream stream;

    private BatchOutput(FileStream stream, BatchCsv? csv) => (this.stream, this.csv) = (stream, csv);

    /// <summary>Begins a new file.</summary>
    /// <param name="columns">of a CSV</param>
    /// <exception cref="IOException">the file is there already, cannot be made, or has another ending</exception>
    public static BatchOutput Create(string path, Func<BatchCsv> columns)
    {
        var csv = CsvFor(path, columns);
        if (File.Exists(path)) throw new IOException($"{path} is there already; --resume goes on with it, or name another file");
        var output = new BatchOutput(new FileStream(path, FileMode.CreateNew, FileAccess.ReadWrite, FileShare.Read), csv);
        if (csv is not null) output.Write(csv.Header);
        return output;
    }

    /// <summary>Opens a file that an earlier run left, cuts off a line that it did not finish, and reads what is there.</summary>
    /// <exception cref="IOException">there is none, or it is not of this board</exception>
    public static (BatchOutput Output, List<BoardOutcome> Done) Resume(string path, Func<BatchCsv> columns)
    {
        if (!File.Exists(path)) return (Create(path, columns), []);
        var csv = CsvFor(path, columns);
        var output = new BatchOutput(new FileStream(path, FileMode.Open, FileAccess.ReadWrite, FileShare.Read), csv);
        try
        {
            output.CutUnfinished();
            return (output, output.ReadDone(path));
        }
        catch
        {
            output.Dispose();
            throw;
        }
    }

    public string Line(CheckResult result) => csv?.Row(result) ?? ResultJson.Line(result);

    public string FailureLine(ReadingSet board, string reason) => csv?.FailureRow(board, reason) ?? BatchJson.FailureLine(board, reason);

    /// <summary>The serial as a line of this file gives it back.</summary>
    public string? Kept(string? serial) => csv is null ? serial : BatchCsv.Kept(serial);

    public void Write(string line)
    {
        stream.Write(Encoding.UTF8.GetBytes(line + (csv is null ? "\n" : "\r\n")));
        stream.Flush();
    }

    public void Dispose() => stream.Dispose();

    private static BatchCsv? CsvFor(string path, Func<BatchCsv> columns) => Path.GetExtension(path).ToUpperInvariant() switch
    {
        ".CSV" => columns(),
        ".JSONL" => null,
        _ => throw new IOException($"{path}: results go to a file that ends in .csv or .jsonl"),
    };

    private void CutUnfinished()
    {
        var end = stream.Length;
        while (end > 0)
        {
            stream.Position = end - 1;
            if (stream.ReadByte() == '\n') break;
            end--;
        }

        stream.SetLength(end);
    }

    private List<BoardOutcome> ReadDone(string path)
    {
        stream.Position = 0;
        var done = new List<BoardOutcome>();
        using (var reader = new StreamReader(stream, Encoding.UTF8, false, 1 << 16, leaveOpen: true))
        {
            var isFirst = csv is not null;
            while (reader.ReadLine() is { } line)
            {
                if (isFirst && line != csv!.Header) throw new IOException($"{path} was not written for this board with these options, or by another version; name another file");
                if (!isFirst)
                {
                    done.Add((csv is null ? BatchJson.Outcome(line) : csv.Outcome(line))
                        ?? throw new IOException($"{path}: line {done.Count + (csv is null ? 1 : 2)} is no result of this batch; name another file"));
                }

                isFirst = false;
            }
        }

        if (stream.Length == 0 && csv is not null) Write(csv.Header);
        stream.Position = stream.Length;
        return done;
    }
}
