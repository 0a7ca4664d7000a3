using EvapMonitor.Core;
using EvapMonitor.Service.Tests.Support;

namespace EvapMonitor.Service.Tests.Evaluation;

/// <summary>Days that an older program evaluated.</summary>
public sealed class OlderModelTests(PostgresServer server)
{
    [PostgreSqlFact]
    public async Task DaysOfAnOlderModel_AreEvaluatedAgain_AfterAStart()
    {
        string connection = await server.CreateDatabaseAsync(), sums = "SELECT count(*) || ' ' || sum(reconciled[1]) FROM balance_window";
        string before;
        long version;
        await using (RunningService service = await RunningService.StartAsync(connection, SmallPlant.Text, SmallPlant.Now))
        {
            await service.ImportAsync(History.Long(20_000));
            await service.EvaluatedAsync();
            before = await service.TextAsync(sums);
            Assert.NotEqual("0 ", before);
            Assert.Equal(0, await service.CountAsync($"SELECT count(*) FROM line_day WHERE model <> {LineEvaluation.ModelNumber}"));
            // As a program before balances left it.
            await service.TextAsync("DELETE FROM balance_window RETURNING 1");
            await service.TextAsync("UPDATE line_day SET model = 2 RETURNING 1");
            version = await service.CountAsync("SELECT sum(result_version) FROM line_day");
        }

        await using (RunningService service = await RunningService.StartAsync(connection, SmallPlant.Text, SmallPlant.Now))
        {
            await service.EvaluatedAsync();
            Assert.Equal(before, await service.TextAsync(sums));
            Assert.Equal(0, await service.CountAsync($"SELECT count(*) FROM line_day WHERE model <> {LineEvaluation.ModelNumber}"));
        }

        // Once is enough.
        await using (RunningService service = await RunningService.StartAsync(connection, SmallPlant.Text, SmallPlant.Now))
        {
            await service.EvaluatedAsync();
            Assert.Equal(version + await service.CountAsync("SELECT count(*) FROM line_day"), await service.CountAsync("SELECT sum(result_version) FROM line_day"));
        }
    }
}
