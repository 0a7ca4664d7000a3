using EvapMonitor.Service.Tests.Support;
using Npgsql;

namespace EvapMonitor.Service.Tests.Security;

public sealed class SecretsTests(PostgresServer server)
{
    private const string Secret = "Kr0nenWasser-17";

    /// <summary>Every way in which a start can go wrong with a password in hand; what is said must not hold it.</summary>
    [PostgreSqlTheory]
    [InlineData("Database=nothing_here")]
    [InlineData("Username=nobody_here")]
    [InlineData("Host=127.0.0.1;Port=1")]
    [InlineData("Host=no-such-host.invalid")]
    [InlineData("Timeout=soon")]
    [InlineData("Colour=red")]
    public async Task FailingConnection_NeverShowsThePassword(string change)
    {
        string connection = await server.CreateDatabaseAsync() + $";Password={Secret};{change};Timeout=3";
        if (change.StartsWith("Timeout", StringComparison.Ordinal)) connection = $"Host=localhost;Password={Secret};{change}";
        string folder = TemporaryFolder.Create();
        try
        {
            var options = new ServiceOptions { Data = folder, Connection = connection, Listen = "http://127.0.0.1:0" };
            Exception error = await Assert.ThrowsAnyAsync<Exception>(() => ServiceHost.StartAsync(options, TestContext.Current.CancellationToken));
            Assert.IsType<StartException>(error);
            Assert.DoesNotContain(Secret, error.ToString());
            Assert.Equal("service.lock", Path.GetFileName(Assert.Single(Directory.GetFiles(folder).DefaultIfEmpty("service.lock"))));
        }
        finally
        {
            Directory.Delete(folder, recursive: true);
        }
    }

    [PostgreSqlFact]
    public async Task RefusedPassword_IsNotShown()
    {
        string connection = await server.CreateDatabaseAsync();
        await using var database = NpgsqlDataSource.Create(connection);
        await RunAsync(database, "CREATE ROLE guest LOGIN PASSWORD 'another'");
        // The private server trusts everybody who reaches its socket: one role must be asked for its password.
        string rules = (await File.ReadAllTextAsync(await TextAsync(database, "SHOW hba_file"), TestContext.Current.CancellationToken));
        string file = await TextAsync(database, "SHOW hba_file");
        await File.WriteAllTextAsync(file, "local all guest scram-sha-256\n" + rules, TestContext.Current.CancellationToken);
        await RunAsync(database, "SELECT pg_reload_conf()");
        var wrong = new NpgsqlConnectionStringBuilder(connection) { Username = "guest", Password = Secret };
        string folder = TemporaryFolder.Create();
        try
        {
            string told = await Poll.UntilAsync("a refusal", async () =>
            {
                Exception? error = await Record.ExceptionAsync(() => ServiceHost.StartAsync(
                    new ServiceOptions { Data = folder, Connection = wrong.ConnectionString, Listen = "http://127.0.0.1:0" }, TestContext.Current.CancellationToken));
                return error?.ToString() is { } text && text.Contains("28P01", StringComparison.Ordinal) ? text : null;
            });
            Assert.DoesNotContain(Secret, told);
        }
        finally
        {
            Directory.Delete(folder, recursive: true);
        }
    }

    private static async Task RunAsync(NpgsqlDataSource database, string sql)
    {
        await using NpgsqlCommand command = database.CreateCommand(sql);
        await command.ExecuteNonQueryAsync(TestContext.Current.CancellationToken);
    }

    private static async Task<string> TextAsync(NpgsqlDataSource database, string sql)
    {
        await using NpgsqlCommand command = database.CreateCommand(sql);
        return (string)(await command.ExecuteScalarAsync(TestContext.Current.CancellationToken))!;
    }
}
