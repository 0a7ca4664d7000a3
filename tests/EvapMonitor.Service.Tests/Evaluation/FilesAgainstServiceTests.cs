using EvapMonitor.Core.Fouling;
using EvapMonitor.Service.Api;
using EvapMonitor.Core.Coefficients;
using EvapMonitor.Service.Evaluation;
using EvapMonitor.Service.Store;
using EvapMonitor.Service.Tests.Support;
using Microsoft.Extensions.DependencyInjection;

namespace EvapMonitor.Service.Tests.Evaluation;

/// <summary>The command line and the service compute the same: coefficients.csv and balance.csv of `evaluate` against what the service has in its database, to the last printed digit.</summary>
public sealed class FilesAgainstServiceTests(ApiService api) : IClassFixture<ApiService>
{
    private static CancellationToken Stop => TestContext.Current.CancellationToken;

    [PostgreSqlFact]
    public async Task Evaluate_GivesTheServicesNumbers()
    {
        string folder = TemporaryFolder.Create(), plant = Path.Combine(folder, "plant.yaml"), readings = Path.Combine(folder, "history.csv");
        try
        {
            await File.WriteAllTextAsync(plant, ApiService.Plant, Stop);
            await File.WriteAllTextAsync(readings, ApiService.History, Stop);
            (int exit, string said, string error) = await ChildService.CommandAsync("evaluate", plant, readings, "--out", Path.Combine(folder, "out"));
            Assert.True(exit == 0, error);
            Assert.Contains("0 rejected", said);
            string[] rows = await File.ReadAllLinesAsync(Path.Combine(folder, "out", "coefficients.csv"), Stop);
            string[] own = await OfServiceAsync(Path.Combine(folder, "service.csv"));
            Assert.Equal(1 + (576 * 4), rows.Length);
            // Of all but the coefficient the store keeps the whole uncertainty, which the file does not print: the rows must be alike letter for letter.
            Assert.Equal(rows.Order(StringComparer.Ordinal), own.Order(StringComparer.Ordinal));
            Assert.True(rows.Count(row => row.Split(',')[10].Length > 0) > 2000);
            string[] balance = await File.ReadAllLinesAsync(Path.Combine(folder, "out", "balance.csv"), Stop);
            Assert.Equal(await BalanceOfServiceAsync(Path.Combine(folder, "service-balance.csv")), balance);
            Assert.True(balance.Length > 576 * 40);
            string[] campaigns = await File.ReadAllLinesAsync(Path.Combine(folder, "out", "campaigns.csv"), Stop);
            Assert.Equal(5, campaigns.Length);
            Assert.All(campaigns[1..], row => Assert.Contains(",first data,", row));
            Assert.Contains(balance, row => row.StartsWith("2026-03-02T01:00:00Z,north,leaving_solids N2,kg/kg,0.", StringComparison.Ordinal));
        }
        finally
        {
            Directory.Delete(folder, recursive: true);
        }
    }

    private async Task<string[]> BalanceOfServiceAsync(string path)
    {
        LinePlace place = api.Service.Services.GetRequiredService<PlantHolder>().Current.Find("north")!;
        using (var file = new BalanceFile(path))
        {
            file.WriteHeader();
            foreach (StoredBalance stored in await api.Service.Services.GetRequiredService<BalanceStore>().WindowsAsync(place.LineId, ApiService.Start, ApiService.End.AddDays(1), Stop))
                file.Write("north", stored.At, stored.Balance);
        }

        return await File.ReadAllLinesAsync(path, Stop);
    }

    /// <summary>Writes the stored windows with the writer of the command line.</summary>
    private async Task<string[]> OfServiceAsync(string path)
    {
        LinePlace place = api.Service.Services.GetRequiredService<PlantHolder>().Current.Find("north")!;
        var trends = api.Service.Services.GetRequiredService<TrendStore>();
        using (var file = new CoefficientFile(path))
        {
            var effects = place.EffectIds.Select(id => trends.Windows(place.LineId, id, ApiService.Start, ApiService.End.AddDays(1))).ToList();
            for (int i = 0; i < effects[0].Count; i++)
                file.Write(place.Line, new LineWindow(effects[0][i].At, effects[0][i].State, double.NaN, [.. effects.Select(effect => effect[i])]));
            var surfaces = api.Service.Services.GetRequiredService<SurfaceStates>();
            var clean = new List<CleanInTime>();
            for (int k = 0; k < effects.Count; k++)
                clean.Add(await surfaces.CleanAsync(place.LineId, place.EffectIds[k], place.Line.Effects[k].Name, ApiService.Start, ApiService.End.AddDays(1), Stop));
            file.Complete(Enumerable.Range(0, effects[0].Count).SelectMany(i => effects.Select((effect, k) => clean[k].Compare(effect[i]))));
        }

        return await File.ReadAllLinesAsync(path, Stop);
    }
}
