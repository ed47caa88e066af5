namespace BenchCheck.Records.Databases;

/// <summary>How the tables came to be, step by step; a log of any age is brought forward when it is opened for writing.</summary>
/// <remarks>Steps are only ever added: step n makes version n out of version n − 1.</remarks>
internal static class Migrations
{
    private static readonly string[] Steps =
    [
        """
        CREATE TABLE inputs (sha256 {text} PRIMARY KEY, body {bytes} NOT NULL);
        CREATE TABLE records (
            number {number} PRIMARY KEY, filed_at {text} NOT NULL, program {text} NOT NULL, board {text} NOT NULL, serial {text},
            verdict {text} NOT NULL, settings {text} NOT NULL, result {text} NOT NULL,
            board_file {text} NOT NULL REFERENCES inputs (sha256), readings_file {text} NOT NULL REFERENCES inputs (sha256),
            rates_file {text} REFERENCES inputs (sha256), previous {text} NOT NULL UNIQUE, hash {text} NOT NULL UNIQUE);
        {guard records}
        {guard inputs}
        """,
        """
        CREATE INDEX records_by_serial ON records (serial, number);
        CREATE INDEX records_by_time ON records (filed_at);
        """,
        "ALTER TABLE records ADD COLUMN plot {text} REFERENCES inputs (sha256);",
    ];

    public static int Newest => Steps.Length;

    /// <summary>Version of the tables; 0 for none.</summary>
    /// <exception cref="BenchLogException">made by a newer program</exception>
    public static int Version(LogDatabase database)
    {
        if (!database.HasTable("log_version")) return 0;
        using var command = database.Command("SELECT max(version) FROM log_version");
        var version = Convert.ToInt32(command.ExecuteScalar(), System.Globalization.CultureInfo.InvariantCulture);
        return version <= Newest ? version
            : throw new BenchLogException($"the bench log is of version {version}, made by a newer program; this one knows versions up to {Newest}: use the newer program");
    }

    /// <summary>Brings the tables forward to <paramref name="target"/>; whole or not at all.</summary>
    public static void Run(LogDatabase database, int target)
    {
        if (Version(database) >= target) return;
        using var transaction = database.BeginWriting();
        var version = Version(database);
        if (version == 0) database.Execute("CREATE TABLE IF NOT EXISTS log_version (version {number} NOT NULL PRIMARY KEY)");
        for (var next = version + 1; next <= target; next++)
        {
            database.Execute(Steps[next - 1]);
            using var done = database.Command("INSERT INTO log_version (version) VALUES (@version)", ("@version", (long)next));
            done.ExecuteNonQuery();
        }

        transaction.Commit();
    }
}
