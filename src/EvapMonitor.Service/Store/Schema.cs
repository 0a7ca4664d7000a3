using System.Reflection;
using DbUp;
using DbUp.Engine;
using DbUp.Engine.Output;
using Npgsql;

namespace EvapMonitor.Service.Store;

/// <summary>Brings a database to the schema of this program: numbered scripts, each in its own transaction, forward only.</summary>
public static class Schema
{
    /// <summary>Applies the scripts that the database lacks.</summary>
    /// <returns>Names of the scripts applied now.</returns>
    /// <exception cref="InvalidOperationException">A script failed; the database is as the last whole script left it.</exception>
    public static IReadOnlyList<string> Upgrade(string connection)
    {
        // A pooled connection would stay open, unused, as long as the program runs.
        string unpooled = new NpgsqlConnectionStringBuilder(connection) { Pooling = false }.ConnectionString;
        UpgradeEngine engine = DeployChanges.To
            .PostgresqlDatabase(unpooled)
            .WithScriptsEmbeddedInAssembly(Assembly.GetExecutingAssembly(), name => name.Contains(".Store.Migrations.", StringComparison.Ordinal))
            .WithTransactionPerScript()
            .LogTo(new NoOpUpgradeLog())
            .Build();
        engine.ScriptExecuted += (_, _) => KillPoint.Pass("migration-after-script");
        DatabaseUpgradeResult result = engine.PerformUpgrade();
        return result.Successful
            ? [.. result.Scripts.Select(script => script.Name)]
            : throw new InvalidOperationException($"The database could not be brought up to date: script {result.ErrorScript?.Name} failed: {result.Error.Message}", result.Error);
    }
}
