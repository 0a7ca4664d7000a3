using EvapMonitor.Service.Tests.Support;
using Npgsql;

namespace EvapMonitor.Service.Tests.Store;

/// <summary>What every table keeps to, so that a distributed PostgreSQL can place a line's data together.</summary>
public sealed class CatalogueTests(PostgresServer server)
{
    /// <summary>Small tables that every node may hold whole.</summary>
    private static readonly string[] Reference = ["plant_revision", "line", "signal", "import_file", "refused_reading", "recomputation", "schemaversions"];

    [PostgreSqlFact]
    public async Task EveryTableButReferenceTables_HasTheLineInEveryKey_AndPointsToNoOther()
    {
        await using var database = NpgsqlDataSource.Create(await server.CreateDatabaseAsync());
        EvapMonitor.Service.Store.Schema.Upgrade(database.ConnectionString);
        await using NpgsqlCommand command = database.CreateCommand(
            """
            SELECT c.relname, coalesce(bool_and('line_id' = ANY(ARRAY(SELECT a.attname FROM pg_attribute a WHERE a.attrelid = c.oid AND a.attnum = ANY(i.indkey)))), false),
                (SELECT count(*) FROM pg_constraint f WHERE f.conrelid = c.oid AND f.contype = 'f')
            FROM pg_class c JOIN pg_namespace n ON n.oid = c.relnamespace AND n.nspname = 'public' LEFT JOIN pg_index i ON i.indrelid = c.oid AND i.indisunique
            WHERE c.relkind IN ('r', 'p') AND NOT c.relispartition GROUP BY c.oid, c.relname ORDER BY c.relname
            """);
        await using NpgsqlDataReader reader = await command.ExecuteReaderAsync(TestContext.Current.CancellationToken);
        var tables = new List<string>();
        while (await reader.ReadAsync(TestContext.Current.CancellationToken))
        {
            string table = reader.GetString(0);
            tables.Add(table);
            Assert.True(reader.GetInt64(2) == 0, $"{table} points to another table");
            Assert.True(Reference.Contains(table) || reader.GetBoolean(1), $"{table} has a key without line_id");
        }

        Assert.Contains("balance_window", tables);
        Assert.Contains("balance_layout", tables);
    }
}
