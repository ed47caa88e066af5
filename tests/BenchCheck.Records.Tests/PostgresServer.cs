using System.Diagnostics;
using Npgsql;
using Xunit;

[assembly: AssemblyFixture(typeof(BenchCheck.Records.Tests.PostgresServer))]

namespace BenchCheck.Records.Tests;

/// <summary>
/// A real PostgreSQL server for the tests: the one that BENCHCHECK_TEST_POSTGRES names (a connection string whose user may create databases), or
/// one of its own, made in a temporary folder out of Debian's packages and reached by a socket in it.
/// </summary>
public sealed class PostgresServer : IDisposable
{
    private const string Variable = "BENCHCHECK_TEST_POSTGRES";

    private readonly Lock gate = new();
    private readonly string? named = Environment.GetEnvironmentVariable(Variable);
    private string? folder;
    private string? programs;

    /// <summary>A connection string of a new, empty database.</summary>
    public string NewDatabase()
    {
        string server;
        lock (gate) server = string.IsNullOrEmpty(named) ? Own() : named;
        var name = $"bench_{Guid.NewGuid():N}";
        using var connection = new NpgsqlConnection(server);
        connection.Open();
        using var create = new NpgsqlCommand($"CREATE DATABASE {name}", connection);
        create.ExecuteNonQuery();
        return new NpgsqlConnectionStringBuilder(server) { Database = name }.ConnectionString;
    }

    public static void Drop(IEnumerable<string> databases)
    {
        foreach (var database in databases)
        {
            var name = new NpgsqlConnectionStringBuilder(database).Database;
            using var connection = new NpgsqlConnection(new NpgsqlConnectionStringBuilder(database) { Database = "postgres" }.ConnectionString);
            connection.Open();
            using var drop = new NpgsqlCommand($"DROP DATABASE {name} WITH (FORCE)", connection);
            drop.ExecuteNonQuery();
        }
    }

    public void Dispose()
    {
        if (folder is null) return;
        Run("pg_ctl", "-D", Path.Combine(folder, "data"), "-m", "immediate", "stop");
        Directory.Delete(folder, true);
    }

    private string Own()
    {
        if (folder is not null) return Connection();
        programs = Directory.Exists("/usr/lib/postgresql")
            ? Directory.GetDirectories("/usr/lib/postgresql").Select(d => Path.Combine(d, "bin")).FirstOrDefault(d => File.Exists(Path.Combine(d, "initdb"))) : null;
        Assert.SkipWhen(programs is null, $"no PostgreSQL: install Debian's package postgresql, or name a server in {Variable}");
        folder = Directory.CreateTempSubdirectory("benchpg").FullName;
        if (Environment.IsPrivilegedProcess) Run("chown", "postgres", folder);
        Run("initdb", "-D", Path.Combine(folder, "data"), "-U", "bench", "-A", "trust", "-E", "UTF8", "--no-locale", "--no-sync");
        Run("pg_ctl", "-D", Path.Combine(folder, "data"), "-l", Path.Combine(folder, "server.log"), "-w", "-t", "60",
            "-o", $"-c listen_addresses='' -c unix_socket_directories='{folder}' -c max_connections=60 -c fsync=off", "start");
        return Connection();
    }

    private string Connection() => $"Host={folder};Username=bench;Database=postgres";

    /// <summary>The server refuses to run as root, so root starts it as the user that Debian's package makes for it.</summary>
    private void Run(string program, params string[] arguments)
    {
        var path = program == "chown" ? program : Path.Combine(programs!, program);
        var isHanded = program != "chown" && Environment.IsPrivilegedProcess;
        var start = new ProcessStartInfo(isHanded ? "runuser" : path) { WorkingDirectory = folder };
        foreach (var argument in isHanded ? ["-u", "postgres", "--", path, .. arguments] : arguments) start.ArgumentList.Add(argument);
        start.RedirectStandardOutput = program != "pg_ctl";
        using var process = Process.Start(start)!;
        if (start.RedirectStandardOutput) process.StandardOutput.ReadToEnd();
        process.WaitForExit();
        if (process.ExitCode != 0) throw new InvalidOperationException($"{program} ended with {process.ExitCode}");
    }
}
