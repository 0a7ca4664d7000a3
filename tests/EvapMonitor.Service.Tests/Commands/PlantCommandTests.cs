using EvapMonitor.Service.Tests.Revisions;
using EvapMonitor.Service.Tests.Support;

namespace EvapMonitor.Service.Tests.Commands;

/// <summary>The commands that change the plant and have days computed anew in a running service.</summary>
public sealed class PlantCommandTests(PostgresServer server) : IDisposable
{
    private readonly string _folder = TemporaryFolder.Create();

    public void Dispose() => Directory.Delete(_folder, recursive: true);

    [PostgreSqlFact]
    public async Task Plant_IsGiven_Listed_AndDaysAreRecomputed()
    {
        await using RunningService service = await RunningService.StartAsync(server, SteadyHistory.Plant(), SmallPlant.Now);
        await service.ImportAsync(SteadyHistory.Days(2));
        await service.EvaluatedAsync();
        string file = Path.Combine(_folder, "plant.yaml");
        await File.WriteAllTextAsync(file, SteadyHistory.Plant(200), TestContext.Current.CancellationToken);

        (int exit, string said, string error) = await RunAsync("plant", "--in-force-from", "2026-04-15T00:00:00Z", file);
        Assert.Equal((0, ""), (exit, error));
        Assert.StartsWith("Accepted: revision 2, in force, from 2026-04-15T00:00:00Z, accepted 2026-04-20T12:", said);
        Assert.Contains("1: Plant revision 2 was accepted. all lines, 2026-04-15 to 2026-04-16: done, 2 of 2 days computed", said);

        (exit, said, _) = await RunAsync("plant", file);
        Assert.Equal(0, exit);
        Assert.StartsWith("Nothing changed: the file holds then already as revision 2", said);

        (exit, said, _) = await RunAsync("plant");
        Assert.Equal((0, 2), (exit, said.Split('\n', StringSplitOptions.RemoveEmptyEntries).Length));
        Assert.Contains("revision 1, past, from 2025-08-31T22:00:00Z until 2026-04-15T00:00:00Z", said);

        (exit, said, error) = await RunAsync("recompute", "--line", "one", "--from", "2026-04-14", "--to", "2026-04-15");
        Assert.Equal((0, ""), (exit, error));
        Assert.Contains("one, 2026-04-14 to 2026-04-15: done, 2 of 2 days computed", said);

        await File.WriteAllTextAsync(file, SteadyHistory.Plant().Replace("100 m2", "100", StringComparison.Ordinal), TestContext.Current.CancellationToken);
        (exit, _, error) = await RunAsync("plant", file);
        Assert.Equal(1, exit);
        Assert.Matches(@"^plant\.yaml:\d+:\d+ lines\.one\.effects\[0\]\.area: found ", Assert.Single(error.Split('\n', StringSplitOptions.RemoveEmptyEntries)));

        async Task<(int Exit, string Out, string Error)> RunAsync(params string[] arguments) => await ChildService.CommandAsync([.. arguments, "--service", service.Address]);
    }

    [PostgreSqlFact]
    public async Task WhatTheServiceRefuses_IsOneLine_AndWrongUse()
    {
        await using RunningService service = await RunningService.StartAsync(server, SteadyHistory.Plant(), SmallPlant.Now);
        string file = Path.Combine(_folder, "plant.yaml");
        await File.WriteAllTextAsync(file, SteadyHistory.Plant(200), TestContext.Current.CancellationToken);
        foreach (string[] arguments in new string[][]
        {
            ["plant", "--in-force-from", "2026-04-15T06:00:00Z", file], ["recompute", "--line", "two"], ["recompute", "--from", "yesterday"], ["recompute", "--cancel", "9"],
            ["recompute", "--cancel", "1", "--line", "one"], ["plant", "--in-force-from", "2026-04-15T00:00:00Z"],
        })
        {
            (int exit, string said, string error) = await ChildService.CommandAsync([.. arguments, "--service", service.Address]);
            Assert.Equal((2, ""), (exit, said));
            Assert.Single(error.Split('\n', StringSplitOptions.RemoveEmptyEntries));
        }
    }
}
