using System.Globalization;
using System.Text;
using EvapMonitor.Service.Api.Wire;
using EvapMonitor.Service.Tests.Support;

namespace EvapMonitor.Service.Tests.Api;

public sealed class TrendGapTests(PostgresServer server)
{
    /// <summary>Ten hours of production, a spike of ten minutes at 02:00, no readings at all from 04:00 to 07:00, no steam flow from 08:00 to 08:30.</summary>
    [PostgreSqlFact]
    public async Task ThinnedSeries_KeepsSpikesAndGaps()
    {
        await using RunningService service = await RunningService.StartAsync(server, SmallPlant.Text, SmallPlant.Now);
        await service.ImportAsync(TenHours());
        await service.EvaluatedAsync();
        const string address = "/api/v1/lines/one/effects/E1/trend?from=2026-04-10T00:00:00Z&to=2026-04-10T12:00:00Z";
        TrendWire all = await service.GetAsync<TrendWire>(address), thin = await service.GetAsync<TrendWire>(address + "&points=24");
        Assert.InRange(thin.Value.Count, 12, 26);
        Assert.True(all.Value.Count > 80, $"{all.Value.Count} windows");

        double usual = all.Value[2]!.Value;
        Assert.Equal(all.Value.Max(), thin.Value.Max());
        Assert.True(thin.Value.Max() > 1.3 * usual, "the spike is gone");
        // The gap without readings breaks the line between the last value before it and the first after it.
        int after = Enumerable.Range(0, thin.Value.Count).First(i => thin.OffsetS[i] >= 7 * 3600 - 600);
        Assert.Contains(Enumerable.Range(0, after), i => thin.OffsetS[i] >= 4 * 3600 && thin.Value[i] is null);
        // The gap with a reason keeps it.
        int without = Enumerable.Range(0, thin.Value.Count).Last(i => thin.Value[i] is null && thin.OffsetS[i] is >= 8 * 3600 and < 9 * 3600);
        Assert.Contains("FT-2", thin.Reasons[thin.Reason[without]]);
    }

    private static string TenHours()
    {
        var text = new StringBuilder("time,FT-1,TT-1,FT-2,PT-2,PT-1\n");
        for (int minute = 0; minute < 600; minute++)
        {
            if (minute is >= 240 and < 420) continue;
            double steam = minute is >= 120 and < 130 ? 15 : 10 + (0.1 * double.Sin(minute));
            string flow = minute is >= 480 and < 510 ? "" : steam.ToString("0.###", CultureInfo.InvariantCulture);
            text.Append(CultureInfo.InvariantCulture, $"2026-04-10T{minute / 60:00}:{minute % 60:00}:00Z,{60 + double.Cos(minute):0.###},{90 + (minute % 7 * 0.05)},{flow},{1.43 + (minute % 5 * 0.001)},{1.01 + (minute % 3 * 0.001)}\n");
        }

        return text.ToString();
    }
}
